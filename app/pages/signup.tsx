import { useState } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import { joinByCodeSchema, signUpByMailSchema, signUpByNameSchema } from '../../shared/schemas/people.ts';
import { FormError } from '../features/people/form-error.tsx';
import { people } from '../features/people/people.queries.ts';
import { NewPasswordField, UserNameField } from '../features/people/sign-up-fields.tsx';
import { SplitPage } from '../features/people/split-page.tsx';
import { useFormSubmit } from '../features/people/use-form-submit.ts';
import { useSignedIn } from '../features/people/use-signed-in.ts';
import { paths } from '../lib/paths.ts';
import { Button } from '../ui/button.tsx';
import { TextField } from '../ui/text-field.tsx';

interface FoundClass {
  readonly code: string;
  readonly className: string;
  readonly hasEmail: boolean;
}

export function Component() {
  const [found, setFound] = useState<FoundClass | null>(null);
  if (!found) return <CodePage onFound={setFound} />;
  return found.hasEmail ? <MailPage found={found} /> : <NamePage found={found} />;
}

function CodePage({ onFound }: { readonly onFound: (found: FoundClass) => void }) {
  const [search] = useSearchParams();
  const { form, onSubmit, isBusy, rootError, errorOf } = useFormSubmit({
    schema: joinByCodeSchema,
    defaultValues: { code: search.get('code') ?? '' },
    submit: async ({ code }) => onFound({ code, ...(await people.findClassOfCode(code)) }),
  });
  return (
    <SplitPage h1="Join a class." lead="Your teacher gave you a class code of ten letters and digits.">
      <form onSubmit={onSubmit} noValidate>
        <TextField
          label="Class code"
          autoComplete="off"
          autoCapitalize="characters"
          spellCheck={false}
          error={errorOf('code')}
          {...form.register('code')}
        />
        <FormError>{rootError}</FormError>
        <div className="acts">
          <Button kind="primary" type="submit" wide busy={isBusy}>
            Go on
          </Button>
        </div>
      </form>
      <HaveAccount />
    </SplitPage>
  );
}

function MailPage({ found }: { readonly found: FoundClass }) {
  const { form, onSubmit, isBusy, isDone, rootError, errorOf } = useFormSubmit({
    schema: signUpByMailSchema,
    defaultValues: { code: found.code, email: '' },
    submit: ({ code, email }) => people.signUpByMail(code, email),
  });
  if (isDone) {
    return (
      <SplitPage h1="Look into your mail." lead={`A letter with a link is on its way to ${form.getValues('email')}.`}>
        <p className="mt-5">
          Open the link to choose your name and password. It works once, within three days. Nothing there? Look among
          the unwanted mail, or ask your teacher.
        </p>
        <HaveAccount />
      </SplitPage>
    );
  }
  return (
    <SplitPage h1={`Join ${found.className}.`} lead="You get a letter with a link; your teacher then lets you in.">
      <form onSubmit={onSubmit} noValidate>
        <TextField
          label="School e-mail"
          type="email"
          autoComplete="email"
          error={errorOf('email')}
          {...form.register('email')}
        />
        <FormError>{rootError}</FormError>
        <div className="acts">
          <Button kind="primary" type="submit" wide busy={isBusy}>
            Send the link
          </Button>
        </div>
      </form>
      <HaveAccount />
    </SplitPage>
  );
}

function NamePage({ found }: { readonly found: FoundClass }) {
  const signedIn = useSignedIn();
  const { form, onSubmit, isBusy, rootError, errorOf } = useFormSubmit({
    schema: signUpByNameSchema,
    defaultValues: { code: found.code, name: '', userName: '', password: '' },
    submit: async (values) => {
      await people.signUpByName(values);
      await signedIn();
    },
  });
  return (
    <SplitPage h1={`Join ${found.className}.`} lead="This class needs no e-mail. Your teacher lets you in.">
      <form onSubmit={onSubmit} noValidate>
        <TextField
          label="Your name, as your teacher knows it"
          autoComplete="name"
          error={errorOf('name')}
          {...form.register('name')}
        />
        <UserNameField error={errorOf('userName')} {...form.register('userName')} />
        <NewPasswordField error={errorOf('password')} {...form.register('password')} />
        <FormError>{rootError}</FormError>
        <div className="acts">
          <Button kind="primary" type="submit" wide busy={isBusy}>
            Ask to join
          </Button>
        </div>
      </form>
    </SplitPage>
  );
}

function HaveAccount() {
  return (
    <p className="small join">
      You have an account?{' '}
      <Link className="lk whitespace-nowrap" to={paths.signIn(paths.account())}>
        Sign in and join with the code
      </Link>
    </p>
  );
}
