import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useSearchParams } from 'react-router-dom';
import type { RoundChoices } from '../../shared/schemas/round.ts';
import { RoundForm } from '../features/rounds/round-form.tsx';
import { proposeInstants } from '../features/rounds/round-rhythms.ts';
import { planRound, roundChoicesQuery } from '../features/rounds/rounds.queries.ts';
import { paths } from '../lib/paths.ts';
import { LinkButton } from '../ui/button.tsx';
import { Head, Page } from '../ui/page.tsx';
import { EmptyState, ErrorState, Waiting } from '../ui/states.tsx';

/** Planning a round: everything is proposed, so that a class and a task are enough. */
export function Component() {
  const choices = useQuery(roundChoicesQuery);
  return (
    <Page>
      <Head h1="Plan a round" lead="Choose a class and a task; the times are a proposal." both />
      <div className="both">
        {choices.isPending ? <Waiting /> : null}
        {choices.isError ? <ErrorState error={choices.error} onRetry={() => void choices.refetch()} /> : null}
        {choices.data ? <Plan choices={choices.data} /> : null}
      </div>
    </Page>
  );
}

function Plan({ choices }: { readonly choices: RoundChoices }) {
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const [search] = useSearchParams();
  const chosen = choices.classes.find(({ id }) => id === search.get('classId')) ?? choices.classes[0];
  const task = choices.tasks.find(({ id }) => id === search.get('taskId'));
  const [instants] = useState(() => proposeInstants('week', chosen?.timeZone ?? 'UTC', new Date()));
  if (!chosen) {
    return (
      <EmptyState
        title="No class yet"
        acts={
          <LinkButton kind="primary" to={paths.classes()}>
            Make a class
          </LinkButton>
        }
      >
        A round is run with a class.
      </EmptyState>
    );
  }
  if (choices.tasks.length === 0) {
    return (
      <EmptyState
        title="No task yet"
        acts={
          <LinkButton kind="primary" to={paths.task('new')}>
            Write a task
          </LinkButton>
        }
      >
        A round needs a given line and a goal.
      </EmptyState>
    );
  }
  return (
    <RoundForm
      choices={choices}
      stage="planned"
      isNew
      submitLabel="Plan this round"
      initial={{
        classId: chosen.id,
        taskId: task?.id ?? (choices.tasks.length === 1 ? (choices.tasks[0]?.id ?? '') : ''),
        ...instants,
        reviewsPerDerivation: 2,
        lateRule: 'closed',
      }}
      onSubmit={async (form) => {
        const { id } = await planRound(form);
        await queryClient.invalidateQueries({ queryKey: ['today'] });
        await navigate(paths.round(id));
      }}
    />
  );
}
