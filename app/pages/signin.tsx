import { Link, useSearchParams } from 'react-router-dom';
import { signInSchema } from '../../shared/schemas/people.ts';
import { DemoAccounts } from '../features/people/demo-accounts.tsx';
import { FormError } from '../features/people/form-error.tsx';
import { people } from '../features/people/people.queries.ts';
import { SplitPage } from '../features/people/split-page.tsx';
import { useFormSubmit } from '../features/people/use-form-submit.ts';
import { useSignedIn } from '../features/people/use-signed-in.ts';
import { paths } from '../lib/paths.ts';
import { Button, LinkButton } from '../ui/button.tsx';
import { PasswordField, TextField } from '../ui/text-field.tsx';

export function Component() {
  const [search] = useSearchParams();
  const signedIn = useSignedIn();
  const { form, onSubmit, isBusy, rootError, errorOf } = useFormSubmit({
    schema: signInSchema,
    defaultValues: { name: '', password: '' },
    submit: async (values) => {
      await people.signIn(values);
      await signedIn(search.get('next') ?? undefined);
    },
  });
  return (
    <SplitPage h1="Find the first slip." lead="A workshop for derivations">
      <form onSubmit={onSubmit} noValidate>
        <TextField
          label="E-mail or user name"
          autoComplete="username"
          autoCapitalize="none"
          error={errorOf('name')}
          {...form.register('name')}
        />
        <PasswordField
          label="Password"
          autoComplete="current-password"
          error={errorOf('password')}
          {...form.register('password')}
        />
        <FormError>{rootError}</FormError>
        <div className="acts">
          <Button kind="primary" type="submit" wide busy={isBusy}>
            Sign in
          </Button>
          <LinkButton small to={paths.askReset()}>
            I cannot sign in
          </LinkButton>
        </div>
      </form>
      <p className="small join">
        New here? Your teacher gave you a class code.{' '}
        <Link className="lk whitespace-nowrap" to={paths.signUp()}>
          Join a class
        </Link>
      </p>
      <DemoAccounts
        onChoose={(name, password) => {
          form.setValue('name', name);
          form.setValue('password', password);
        }}
      />
    </SplitPage>
  );
}
