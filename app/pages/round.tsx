import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Navigate, useNavigate, useParams, useSearchParams } from 'react-router-dom';
import type { RoundAnswer } from '../../shared/schemas/round.ts';
import type { TodayThing } from '../../shared/schemas/today.ts';
import { viewerQuery } from '../features/people/viewer.queries.ts';
import { RoundBoard } from '../features/rounds/round-board.tsx';
import { RoundForm } from '../features/rounds/round-form.tsx';
import { boardQuery, roundActs, roundChoicesQuery } from '../features/rounds/rounds.queries.ts';
import { refusalOf, useRoundAct } from '../features/rounds/use-round-act.ts';
import { todayQuery } from '../features/today/today.queries.ts';
import { ApiProblem } from '../lib/api.ts';
import { paths } from '../lib/paths.ts';
import { Button } from '../ui/button.tsx';
import { ConfirmDialog } from '../ui/dialog.tsx';
import { Head, Page } from '../ui/page.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { showToast } from '../ui/toast-store.ts';
import { ZoneProvider } from '../ui/time.tsx';
import { NotFound } from './not-found.tsx';

/** The board, for the staff of the round's class; everyone else goes on to what this round asks of them. */
export function Component() {
  const { roundId = '' } = useParams();
  const board = useQuery(boardQuery(roundId));
  const viewer = useQuery(viewerQuery);
  const [search, setSearch] = useSearchParams();
  if (board.error instanceof ApiProblem && board.error.type === 'not-found') {
    return viewer.data?.user.role === 'student' ? <ToWhatIsDue roundId={roundId} /> : <NotFound />;
  }
  if (!board.data) {
    return (
      <Page wide>
        <div className="head">
          {board.isError ? (
            <ErrorState error={board.error} onRetry={() => void board.refetch()} />
          ) : (
            <Waiting lines={5} />
          )}
        </div>
      </Page>
    );
  }
  const { round } = board.data;
  return (
    <ZoneProvider zone={round.timeZone}>
      <Page wide={!search.has('settings')}>
        <title>{`${round.title}, round ${round.number} · Slipstone`}</title>
        {search.has('settings') && round.role === 'teacher' && round.stage !== 'settled' ? (
          <Settings round={round} onDone={() => setSearch({})} />
        ) : (
          <RoundBoard board={board.data} onSettings={() => setSearch({ settings: '' })} />
        )}
      </Page>
    </ZoneProvider>
  );
}

function addressOf(thing: TodayThing | undefined): string {
  if (thing?.kind === 'write') return paths.write(thing.roundId);
  if (thing?.kind === 'review') {
    const next = thing.reviews.find(({ state }) => state === 'begun' || state === 'not-begun');
    return next ? paths.review(next.reviewId) : paths.today();
  }
  if (thing?.kind === 'answer') return paths.derivation(thing.derivationId);
  return thing?.own ? paths.derivation(thing.own.derivationId) : paths.today();
}

function ToWhatIsDue({ roundId }: { readonly roundId: string }) {
  const today = useQuery(todayQuery);
  if (!today.data) {
    return (
      <Page>
        <div className="head">
          {today.isError ? <ErrorState error={today.error} onRetry={() => void today.refetch()} /> : <Waiting />}
        </div>
      </Page>
    );
  }
  return <Navigate to={addressOf(today.data.things.find((thing) => thing.roundId === roundId))} replace />;
}

function Settings({ round, onDone }: { readonly round: RoundAnswer; readonly onDone: () => void }) {
  const choices = useQuery(roundChoicesQuery);
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const [isDeleting, setDeleting] = useState(false);
  const acts = roundActs(round.id);
  const remove = useRoundAct(acts.remove, 'The round is deleted.', () => void navigate(paths.today()));
  const [first] = useState(round);
  return (
    <>
      <Head where={`${first.className} · round ${first.number}`} h1="Round settings" both />
      <div className="both">
        {choices.isPending ? <Waiting /> : null}
        {choices.isError ? <ErrorState error={choices.error} onRetry={() => void choices.refetch()} /> : null}
        {choices.data ? (
          <RoundForm
            choices={{
              classes: choices.data.classes,
              tasks: choices.data.tasks.some(({ id }) => id === first.taskId)
                ? choices.data.tasks
                : [{ id: first.taskId, title: first.title, given: '' }, ...choices.data.tasks],
            }}
            stage={first.stage}
            submitLabel="Save"
            initial={{
              classId: first.classId,
              taskId: first.taskId,
              ...first.instants,
              reviewsPerDerivation: first.reviewsPerDerivation,
              lateRule: first.lateRule,
            }}
            onSubmit={async (form) => {
              await acts.change({ ...form, version: first.version });
              await queryClient.invalidateQueries({ queryKey: ['rounds', first.id] });
              showToast('Saved.');
              onDone();
            }}
            acts={
              <>
                <Button kind="quiet" small onClick={onDone}>
                  Back to the board
                </Button>
                {first.stage === 'planned' ? (
                  <Button kind="quiet" small onClick={() => setDeleting(true)}>
                    Delete this round
                  </Button>
                ) : null}
              </>
            }
          />
        ) : null}
      </div>
      <ConfirmDialog
        isOpen={isDeleting}
        grave
        title="Delete this round?"
        confirm="Delete"
        busy={remove.isPending}
        error={refusalOf(remove.error)}
        effects={['Nobody has been asked to write yet; the task stays in your collection.']}
        onClose={() => setDeleting(false)}
        onConfirm={() => remove.mutate()}
      />
    </>
  );
}
