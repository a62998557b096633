import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { SheetView } from '../../../shared/schemas/derivation.ts';
import { givenLine } from '../../../shared/schemas/sheet.ts';
import { Button } from '../../ui/button.tsx';
import { Notice } from '../../ui/notice.tsx';
import { Head, Page } from '../../ui/page.tsx';
import { problemWords } from '../../ui/states.tsx';
import { Time, TimeLeft, ZoneProvider } from '../../ui/time.tsx';
import { Conflict } from './conflict.tsx';
import { Assumptions, GoalWords } from './goal-words.tsx';
import { HandIn } from './hand-in.tsx';
import { HandedIn } from './handed-in.tsx';
import { SavedState } from './saved-state.tsx';
import { SheetEditor, useNewSheetStore } from './sheet-editor.tsx';
import { saveSheet, sheetQuery, takeBackSheet } from './sheet.queries.ts';
import { useSheetFacts, type SheetFacts, type SheetStore } from './sheet-store.ts';
import { useSheetSync, type RunningSync } from './use-sheet-sync.ts';

interface SheetProps {
  readonly sheet: SheetView;
  readonly userId: string;
}

/** The author's sheet in a round: to write on, handed in, or closed. */
export function Sheet({ sheet, userId }: SheetProps) {
  return (
    <ZoneProvider zone={sheet.timeZone}>
      <Page work>
        <SheetHead sheet={sheet} />
        {sheet.handedIn ? <HandedInSheet sheet={sheet} /> : <OpenSheet sheet={sheet} userId={userId} />}
      </Page>
    </ZoneProvider>
  );
}

function SheetHead({ sheet }: { readonly sheet: SheetView }) {
  const { task } = sheet;
  return (
    <Head
      where={
        <>
          Round {sheet.roundNumber} · {whenWords(sheet)}
        </>
      }
      h1={task.title}
      lead={
        <>
          <GoalWords goal={task.goal} />
          <Assumptions assumptions={task.assumptions} />
        </>
      }
    />
  );
}

function whenWords({ stage, canWrite, lateNow, writingEndsAt }: SheetView) {
  if (stage === 'settled') return 'settled';
  if (lateNow) return canWrite ? 'late work is still taken' : 'handed in';
  if (!canWrite && stage !== 'writing') return stage;
  return (
    <>
      writing until <Time iso={writingEndsAt} />
    </>
  );
}

function OpenSheet({ sheet, userId }: SheetProps) {
  const { task, roundId } = sheet;
  const fixed = [givenLine(task.given)];
  const store = useNewSheetStore(task.settings, fixed);
  const running = useSheetSync({
    scope: `${userId}.${sheet.derivationId}.submission`,
    draft: sheet.draft,
    save: (body) => saveSheet(roundId, body),
  });
  const { state, sync } = running;
  return (
    <>
      <aside className="side sheet-side small" aria-label="Saved and due">
        <SavedState state={state} />
        {sheet.canWrite ? <TimeWords sheet={sheet} /> : null}
        {task.instructions ? <p className="muted sheet-note">Note from your teacher: {task.instructions}</p> : null}
      </aside>
      {sheet.canWrite ? null : (
        <Notice title="The time for writing is over.">Nothing was handed in. What you wrote is kept here.</Notice>
      )}
      {state.kind === 'conflict' && sync ? <Conflict state={state} onKeep={(keep) => sync.resolve(keep)} /> : null}
      <ColumnHeads />
      <SheetEditor
        document={sheet.draft.document}
        fixed={fixed}
        editable={sheet.canWrite}
        store={store}
        onChange={running.onChange}
        onReady={running.onReady}
      />
      {sheet.canWrite ? <Foot sheet={sheet} store={store} running={running} /> : null}
    </>
  );
}

function TimeWords({ sheet }: { readonly sheet: SheetView }) {
  if (sheet.lateNow) return <p className="muted">Writing has ended; late work is marked as late.</p>;
  return (
    <p className="muted">
      <TimeLeft iso={sheet.writingEndsAt} />
    </p>
  );
}

export function ColumnHeads() {
  return (
    <div className="deriv sheet-column-heads" aria-hidden="true">
      <span>Your lines</span>
      <span>Your reasons</span>
    </div>
  );
}

interface FootProps {
  readonly sheet: SheetView;
  readonly store: SheetStore;
  readonly running: RunningSync;
}

function Foot({ sheet, store, running }: FootProps) {
  const facts = useSheetFacts(store);
  return (
    <>
      <div className="sheet-foot">
        <hr />
        <div className="acts">
          <HandIn
            roundId={sheet.roundId}
            sync={running.sync}
            settings={sheet.task.settings}
            isLate={sheet.lateNow}
            disabled={facts.written === 0 || running.state.kind === 'conflict'}
          />
          <p className="small muted">
            {openWords(facts)}
            {sheet.lateNow ? null : (
              <>
                You may {facts.unread.length + facts.twoWays.length > 0 ? 'still ' : ''}hand in and come back until{' '}
                <Time iso={sheet.writingEndsAt} style="time" />.
              </>
            )}
          </p>
        </div>
      </div>
      <aside className="side sheet-tip small muted" aria-label="Who sees this">
        You see how each line was read, never whether it is right. {reviewerWords(sheet.reviewers)} will look; no one
        learns whose it is.
      </aside>
    </>
  );
}

function openWords({ unread, twoWays, written }: SheetFacts): string {
  if (written === 0) return 'Write at least one line. ';
  const questions = twoWays.length > 0 ? `${lineWords(twoWays)} ${twoWays.length > 1 ? 'need' : 'needs'} a choice` : '';
  const errors = unread.length > 0 ? `${lineWords(unread)} cannot be read` : '';
  const words = [questions, errors].filter(Boolean).join(' and ');
  return words ? `${words.charAt(0).toUpperCase()}${words.slice(1)}. ` : '';
}

function lineWords(numbers: readonly number[]): string {
  const listed = numbers.length > 1 ? `${numbers.slice(0, -1).join(', ')} and ${numbers.at(-1)}` : `${numbers[0]}`;
  return `${numbers.length > 1 ? 'lines' : 'line'} ${listed}`;
}

const COUNTS = ['No classmates', 'One classmate', 'Two classmates', 'Three classmates', 'Four classmates'];
const reviewerWords = (count: number) => COUNTS[count] ?? `${count} classmates`;

function HandedInSheet({ sheet }: { readonly sheet: SheetView }) {
  const queryClient = useQueryClient();
  const takeBack = useMutation({
    mutationFn: () => takeBackSheet(sheet.roundId),
    onSuccess: (next) => queryClient.setQueryData(sheetQuery(sheet.roundId).queryKey, next),
  });
  const { handedIn } = sheet;
  if (!handedIn) return null;
  return (
    <>
      <aside className="side sheet-side small" aria-label="Saved and due">
        <p>
          <b>Handed in</b> <Time iso={handedIn.at} />
          {handedIn.late ? ', late' : ''}
        </p>
        {sheet.canTakeBack && !sheet.lateNow ? <TimeWords sheet={sheet} /> : null}
      </aside>
      <HandedIn lines={handedIn.lines} />
      <div className="sheet-foot">
        <hr />
        <div className="acts">
          {sheet.canTakeBack ? (
            <Button busy={takeBack.isPending} onClick={() => takeBack.mutate()}>
              Take it back and go on writing
            </Button>
          ) : null}
          <p className="small muted">
            {sheet.canTakeBack ? 'While it is taken back, nothing is handed in.' : 'It can no longer be taken back.'}
          </p>
        </div>
        {takeBack.isError ? (
          <p className="msg err" role="alert">
            {problemWords(takeBack.error).detail || problemWords(takeBack.error).title}
          </p>
        ) : null}
      </div>
    </>
  );
}
