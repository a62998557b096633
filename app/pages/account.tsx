import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import {
  changeEmailSchema,
  changeNameSchema,
  changePasswordSchema,
  joinByCodeSchema,
} from '../../shared/schemas/people.ts';
import { OwnPlaces } from '../features/classes/own-places.tsx';
import { FormError } from '../features/people/form-error.tsx';
import { MailPreferences } from '../features/people/mail-preferences.tsx';
import { people } from '../features/people/people.queries.ts';
import { NewPasswordField } from '../features/people/sign-up-fields.tsx';
import { useFormSubmit } from '../features/people/use-form-submit.ts';
import { useSignedIn } from '../features/people/use-signed-in.ts';
import { viewerQuery, type Viewer } from '../features/people/viewer.queries.ts';
import { paths } from '../lib/paths.ts';
import { Button } from '../ui/button.tsx';
import { Head, Page } from '../ui/page.tsx';
import { Waiting } from '../ui/states.tsx';
import { PasswordField, TextField } from '../ui/text-field.tsx';

export function Component() {
  const viewer = useQuery(viewerQuery);
  if (!viewer.data) return <Waiting />;
  return (
    <Page>
      <Head h1="Your account" where={viewer.data.school.name} />
      <div className="grid gap-12">
        <NameForm viewer={viewer.data} />
        <OwnPlaces classes={viewer.data.classes} />
        <JoinForm />
        {viewer.data.user.email ? <EmailForm email={viewer.data.user.email} /> : null}
        {viewer.data.user.email ? <MailPreferences /> : null}
        <PasswordForm />
        <SignOut />
      </div>
    </Page>
  );
}

function NameForm({ viewer }: { readonly viewer: Viewer }) {
  const queryClient = useQueryClient();
  const { form, onSubmit, isBusy, isDone, rootError, errorOf } = useFormSubmit({
    schema: changeNameSchema,
    defaultValues: { name: viewer.user.name },
    submit: async ({ name }) => {
      await people.changeName(name);
      await queryClient.invalidateQueries({ queryKey: viewerQuery.queryKey });
    },
  });
  return (
    <form onSubmit={onSubmit} noValidate className="max-w-[26rem]">
      <h2>Name</h2>
      <TextField
        label="Your name, as your school knows it"
        autoComplete="name"
        hint="Teachers see it; classmates never do."
        error={errorOf('name')}
        {...form.register('name')}
      />
      <FormError>{rootError}</FormError>
      <Save isBusy={isBusy} isDone={isDone} label="Save the name" />
    </form>
  );
}

function JoinForm() {
  const queryClient = useQueryClient();
  const join = useMutation({
    mutationFn: people.joinByCode,
    onSuccess: () => queryClient.invalidateQueries({ queryKey: viewerQuery.queryKey }),
  });
  const { form, onSubmit, isBusy, rootError, errorOf } = useFormSubmit({
    schema: joinByCodeSchema,
    defaultValues: { code: '' },
    submit: async ({ code }) => void (await join.mutateAsync(code)),
  });
  return (
    <form onSubmit={onSubmit} noValidate className="max-w-[26rem]">
      <h2>Join a class</h2>
      <TextField
        label="Class code"
        autoComplete="off"
        autoCapitalize="characters"
        spellCheck={false}
        error={errorOf('code')}
        {...form.register('code')}
      />
      <FormError>{rootError}</FormError>
      <output className="block">
        {join.data ? (
          <span className="notice small mt-4 block">
            {join.data.accepted
              ? `You are in ${join.data.className}.`
              : `Asked. The teacher of ${join.data.className} lets you in.`}
          </span>
        ) : null}
      </output>
      <div className="acts mt-4">
        <Button type="submit" wide busy={isBusy}>
          Ask to join
        </Button>
      </div>
    </form>
  );
}

function EmailForm({ email }: { readonly email: string }) {
  const { form, onSubmit, isBusy, isDone, rootError, errorOf } = useFormSubmit({
    schema: changeEmailSchema,
    defaultValues: { email: '', password: '' },
    submit: ({ email: next, password }) => people.changeEmail(next, password),
  });
  return (
    <form onSubmit={onSubmit} noValidate className="max-w-[26rem]">
      <h2>E-mail</h2>
      <p className="small muted">Now {email}. It changes when you follow the link that is mailed to the new address.</p>
      <TextField
        label="New e-mail"
        type="email"
        autoComplete="email"
        error={errorOf('email')}
        {...form.register('email')}
      />
      <PasswordField
        label="Your password"
        autoComplete="current-password"
        error={errorOf('password')}
        {...form.register('password')}
      />
      <FormError>{rootError}</FormError>
      <Save isBusy={isBusy} isDone={isDone} label="Send the link" done="A letter is on its way to the new address." />
    </form>
  );
}

function PasswordForm() {
  const { form, onSubmit, isBusy, isDone, rootError, errorOf } = useFormSubmit({
    schema: changePasswordSchema,
    defaultValues: { current: '', password: '' },
    submit: async ({ current, password }) => {
      await people.changePassword(current, password);
      form.reset();
    },
  });
  return (
    <form onSubmit={onSubmit} noValidate className="max-w-[26rem]">
      <h2>Password</h2>
      <PasswordField
        label="Password now"
        autoComplete="current-password"
        error={errorOf('current')}
        {...form.register('current')}
      />
      <NewPasswordField
        label="New password"
        also="Your other devices are signed out."
        error={errorOf('password')}
        {...form.register('password')}
      />
      <FormError>{rootError}</FormError>
      <Save
        isBusy={isBusy}
        isDone={isDone}
        label="Change the password"
        done="Changed. Your other devices are signed out."
      />
    </form>
  );
}

function Save(props: {
  readonly isBusy: boolean;
  readonly isDone: boolean;
  readonly label: string;
  readonly done?: string;
}) {
  return (
    <div className="acts mt-4">
      <Button type="submit" wide busy={props.isBusy}>
        {props.label}
      </Button>
      <output className="small muted">{props.isDone ? (props.done ?? 'Saved.') : null}</output>
    </div>
  );
}

function SignOut() {
  const signedIn = useSignedIn();
  const here = useMutation({ mutationFn: people.signOut, onSuccess: () => signedIn(paths.signIn()) });
  const everywhere = useMutation({ mutationFn: people.signOutEverywhere, onSuccess: () => signedIn(paths.signIn()) });
  return (
    <section>
      <h2>Sign out</h2>
      <div className="acts mt-4">
        <Button busy={here.isPending} onClick={() => here.mutate()}>
          Sign out here
        </Button>
        <Button kind="quiet" small busy={everywhere.isPending} onClick={() => everywhere.mutate()}>
          Sign out on every device
        </Button>
      </div>
      <p className="small muted mt-6">
        A session ends by itself after a week without use.{' '}
        <Link className="lk s" to={paths.help('privacy')}>
          What is kept about you
        </Link>
      </p>
    </section>
  );
}
