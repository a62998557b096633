import { useMutation } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { people } from '../features/people/people.queries.ts';
import { SplitPage } from '../features/people/split-page.tsx';
import { paths } from '../lib/paths.ts';
import { Button, LinkButton } from '../ui/button.tsx';
import { ErrorState } from '../ui/states.tsx';

/** The link from the letter; a press confirms, because mail programs open links by themselves. */
export function Component() {
  const { token = '' } = useParams();
  const confirm = useMutation({ mutationFn: () => people.confirmEmail(token) });
  if (confirm.isSuccess) {
    return (
      <SplitPage h1="Your address is changed." lead="From now on you sign in with it, and letters go there.">
        <div className="acts">
          <LinkButton kind="primary" to={paths.today()}>
            Go on
          </LinkButton>
        </div>
      </SplitPage>
    );
  }
  return (
    <SplitPage h1="Use this address." lead="You asked to sign in with a new e-mail address.">
      {confirm.isError ? (
        <div className="mt-5">
          <ErrorState error={confirm.error} />
        </div>
      ) : null}
      <div className="acts">
        <Button kind="primary" busy={confirm.isPending} onClick={() => confirm.mutate()}>
          Use it from now on
        </Button>
      </div>
    </SplitPage>
  );
}
