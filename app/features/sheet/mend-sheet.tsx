import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { MendHandedIn, MendView } from '../../../shared/schemas/derivation.ts';
import { Button } from '../../ui/button.tsx';
import { ErrorState, problemWords, Waiting } from '../../ui/states.tsx';
import { Time, ZoneProvider } from '../../ui/time.tsx';
import { Conflict } from './conflict.tsx';
import { SavedState } from './saved-state.tsx';
import { SheetEditor, useNewSheetStore } from './sheet-editor.tsx';
import { handInMend, mendQuery, saveMend } from './sheet.queries.ts';
import { useSheetFacts } from './sheet-store.ts';
import { useSheetSync } from './use-sheet-sync.ts';

export interface MendSheetProps {
  readonly derivationId: string;
  readonly userId: string;
  /** Draws the verdict on a mend along the edge; handed in by the page, which knows how verdicts are worded. */
  readonly showVerdict: (mend: MendHandedIn & { readonly verdict: NonNullable<MendHandedIn['verdict']> }) => ReactNode;
}

/**
 * The author's corrected derivation, from the first fault on, in the same editor; it is checked like the first. Stands
 * within a page's grid.
 */
export function MendSheet({ derivationId, userId, showVerdict }: MendSheetProps) {
  const mend = useQuery(mendQuery(derivationId));
  if (mend.data) return <Mend mend={mend.data} userId={userId} showVerdict={showVerdict} />;
  if (mend.isError) return <ErrorState error={mend.error} onRetry={() => void mend.refetch()} />;
  return <Waiting>Your mend…</Waiting>;
}

interface MendProps extends Omit<MendSheetProps, 'derivationId'> {
  readonly mend: MendView;
}

function Mend({ mend, userId, showVerdict }: MendProps) {
  const queryClient = useQueryClient();
  const { derivationId, fixed } = mend;
  const store = useNewSheetStore(mend.task.settings, fixed);
  const facts = useSheetFacts(store);
  const { sync, state, onChange, onReady } = useSheetSync({
    scope: `${userId}.${derivationId}.mend`,
    draft: mend.draft,
    save: (body) => saveMend(derivationId, body),
  });
  const post = useMutation({
    mutationFn: async () => handInMend(derivationId, (await sync?.flush()) ?? mend.draft.version),
    onSuccess: (next) => queryClient.setQueryData(mendQuery(derivationId).queryKey, next),
  });
  return (
    <ZoneProvider zone={mend.timeZone}>
      <div className="page-in-page">
        {state.kind === 'conflict' && sync ? <Conflict state={state} onKeep={(keep) => sync.resolve(keep)} /> : null}
        <SheetEditor document={mend.draft.document} editable {...{ fixed, store, onChange, onReady }} />
        <div className="sheet-foot">
          <div className="acts">
            <Button
              kind="primary"
              wide
              busy={post.isPending}
              disabled={facts.written === 0 || state.kind === 'conflict'}
              onClick={() => post.mutate()}
            >
              Have the mend checked
            </Button>
            <SavedState state={state} />
          </div>
          {post.isError ? (
            <p className="msg err" role="alert">
              {problemWords(post.error).detail || 'It could not be handed in. Nothing you typed is lost.'}
            </p>
          ) : null}
        </div>
        {mend.handedIn ? <Checked handedIn={mend.handedIn} showVerdict={showVerdict} /> : null}
      </div>
    </ZoneProvider>
  );
}

interface CheckedProps extends Pick<MendSheetProps, 'showVerdict'> {
  readonly handedIn: MendHandedIn;
}

function Checked({ handedIn, showVerdict }: CheckedProps) {
  const { verdict } = handedIn;
  if (!verdict) {
    return (
      <output className="sheet-foot small muted block">
        Handed in <Time iso={handedIn.at} style="time" />; it is being checked.
      </output>
    );
  }
  return showVerdict({ ...handedIn, verdict });
}
