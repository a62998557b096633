import { useParams } from 'react-router-dom';
import { newPasswordFormSchema, resetRequestSchema, signInCodeSchema } from '../../shared/schemas/people.ts';
import { FormError } from '../features/people/form-error.tsx';
import { people } from '../features/people/people.queries.ts';
import { NewPasswordField } from '../features/people/sign-up-fields.tsx';
import { SplitPage } from '../features/people/split-page.tsx';
import { useFormSubmit } from '../features/people/use-form-submit.ts';
import { useSignedIn } from '../features/people/use-signed-in.ts';
import { paths } from '../lib/paths.ts';
import { Button, LinkButton } from '../ui/button.tsx';
import { TextField } from '../ui/text-field.tsx';

export function Component() {
  const { token } = useParams();
  return token ? <NewPassword token={token} /> : <Ways />;
}

function Ways() {
  return (
    <SplitPage h1="You cannot sign in." lead="Two ways back, whichever you have.">
      <MailForm />
      <CodeForm />
      <div className="acts">
        <LinkButton small to={paths.signIn()}>
          Back to sign in
        </LinkButton>
      </div>
    </SplitPage>
  );
}

function MailForm() {
  const { form, onSubmit, isBusy, isDone, rootError, errorOf } = useFormSubmit({
    schema: resetRequestSchema,
    defaultValues: { email: '' },
    submit: ({ email }) => people.askForReset(email),
  });
  return (
    <form onSubmit={onSubmit} noValidate className="join">
      <h2>With your e-mail</h2>
      <TextField
        label="School e-mail"
        type="email"
        autoComplete="email"
        error={errorOf('email')}
        {...form.register('email')}
      />
      <FormError>{rootError}</FormError>
      <output className="block">
        {isDone ? (
          <span className="notice small mt-4 block">
            If an account has this address, a link is on its way. It works once, within two hours.
          </span>
        ) : null}
      </output>
      <div className="acts">
        <Button kind="second" type="submit" wide busy={isBusy}>
          Send me a link
        </Button>
      </div>
    </form>
  );
}

function CodeForm() {
  const signedIn = useSignedIn();
  const { form, onSubmit, isBusy, rootError, errorOf } = useFormSubmit({
    schema: signInCodeSchema,
    defaultValues: { name: '', code: '', password: '' },
    submit: async (values) => {
      await people.signInByCode(values);
      await signedIn();
    },
  });
  return (
    <form onSubmit={onSubmit} noValidate className="join">
      <h2>With a code from your teacher</h2>
      <TextField
        label="User name or e-mail"
        autoComplete="username"
        autoCapitalize="none"
        error={errorOf('name')}
        {...form.register('name')}
      />
      <TextField
        label="Code"
        autoComplete="one-time-code"
        autoCapitalize="characters"
        spellCheck={false}
        hint="Ten letters and digits, good for a day."
        error={errorOf('code')}
        {...form.register('code')}
      />
      <NewPasswordField label="New password" error={errorOf('password')} {...form.register('password')} />
      <FormError>{rootError}</FormError>
      <div className="acts">
        <Button kind="second" type="submit" wide busy={isBusy}>
          Sign in with the code
        </Button>
      </div>
    </form>
  );
}

function NewPassword({ token }: { readonly token: string }) {
  const signedIn = useSignedIn();
  const { form, onSubmit, isBusy, rootError, errorOf } = useFormSubmit({
    schema: newPasswordFormSchema,
    defaultValues: { password: '' },
    submit: async ({ password }) => {
      await people.resetPassword(token, password);
      await signedIn();
    },
  });
  return (
    <SplitPage h1="Choose a new password." lead="It ends every session you had, on every device.">
      <form onSubmit={onSubmit} noValidate>
        <NewPasswordField label="New password" error={errorOf('password')} {...form.register('password')} />
        <FormError>{rootError}</FormError>
        <div className="acts">
          <Button kind="primary" type="submit" wide busy={isBusy}>
            Save and sign in
          </Button>
          <LinkButton small to={paths.askReset()}>
            Ask for another link
          </LinkButton>
        </div>
      </form>
    </SplitPage>
  );
}
