import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { acceptInvitationSchema, type InvitationAnswer } from '../../shared/schemas/people.ts';
import { FormError } from '../features/people/form-error.tsx';
import { invitationQuery, people } from '../features/people/people.queries.ts';
import { NewPasswordField, UserNameField } from '../features/people/sign-up-fields.tsx';
import { SplitPage } from '../features/people/split-page.tsx';
import { useFormSubmit } from '../features/people/use-form-submit.ts';
import { useSignedIn } from '../features/people/use-signed-in.ts';
import { viewerQuery } from '../features/people/viewer.queries.ts';
import { paths } from '../lib/paths.ts';
import { Button, LinkButton } from '../ui/button.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { TextField } from '../ui/text-field.tsx';

export function Component() {
  const { token = '' } = useParams();
  const invitation = useQuery(invitationQuery(token));
  const viewer = useQuery(viewerQuery);
  if (invitation.isError) {
    return (
      <SplitPage h1="This link does not open.">
        <div className="mt-5">
          <ErrorState error={invitation.error} />
        </div>
        <div className="acts">
          <LinkButton to={paths.signIn()}>Sign in</LinkButton>
        </div>
      </SplitPage>
    );
  }
  if (!invitation.data || viewer.isPending) {
    return (
      <SplitPage h1="Join.">
        <Waiting />
      </SplitPage>
    );
  }
  if (viewer.data) return <AcceptSignedIn token={token} invitation={invitation.data} name={viewer.data.user.name} />;
  return invitation.data.hasAccount ? (
    <SplitPage h1={titleOf(invitation.data)} lead="You have an account with this address.">
      <div className="acts">
        <LinkButton kind="primary" to={paths.signIn(paths.join(token))}>
          Sign in to accept
        </LinkButton>
      </div>
    </SplitPage>
  ) : (
    <NewAccountForm token={token} invitation={invitation.data} />
  );
}

function titleOf({ className, schoolName }: InvitationAnswer): string {
  return `Join ${className ?? schoolName}.`;
}

function leadOf({ role, schoolName, asksToJoin }: InvitationAnswer): string {
  if (asksToJoin) return `${schoolName}. Your teacher lets you in.`;
  return `${schoolName} invites you as ${role === 'assistant' || role === 'admin' ? 'an' : 'a'} ${role}.`;
}

function AcceptSignedIn({
  token,
  invitation,
  name,
}: {
  readonly token: string;
  readonly invitation: InvitationAnswer;
  readonly name: string;
}) {
  const signedIn = useSignedIn();
  const { onSubmit, isBusy, rootError } = useFormSubmit({
    schema: acceptInvitationSchema.partial(),
    defaultValues: {},
    submit: async () => {
      await people.acceptInvitation(token);
      await signedIn();
    },
  });
  return (
    <SplitPage h1={titleOf(invitation)} lead={leadOf(invitation)}>
      <form onSubmit={onSubmit} noValidate>
        <p className="mt-5">You are signed in as {name}.</p>
        <FormError>{rootError}</FormError>
        <div className="acts">
          <Button kind="primary" type="submit" wide busy={isBusy}>
            Accept as {name}
          </Button>
        </div>
      </form>
    </SplitPage>
  );
}

function NewAccountForm({ token, invitation }: { readonly token: string; readonly invitation: InvitationAnswer }) {
  const signedIn = useSignedIn();
  const { form, onSubmit, isBusy, rootError, errorOf } = useFormSubmit({
    schema: acceptInvitationSchema,
    defaultValues: { name: invitation.name, password: '', ...(invitation.email === null && { userName: '' }) },
    submit: async (values) => {
      await people.makeAccount(token, values);
      await signedIn();
    },
  });
  return (
    <SplitPage h1={titleOf(invitation)} lead={leadOf(invitation)}>
      <form onSubmit={onSubmit} noValidate>
        <TextField
          label="Your name, as your class knows it"
          autoComplete="name"
          error={errorOf('name')}
          {...form.register('name')}
        />
        {invitation.email === null ? (
          <UserNameField error={errorOf('userName')} {...form.register('userName')} />
        ) : (
          <p className="small muted mt-4">You sign in with {invitation.email}.</p>
        )}
        <NewPasswordField error={errorOf('password')} {...form.register('password')} />
        <FormError>{rootError}</FormError>
        <div className="acts">
          <Button kind="primary" type="submit" wide busy={isBusy}>
            Make my account
          </Button>
        </div>
      </form>
    </SplitPage>
  );
}
