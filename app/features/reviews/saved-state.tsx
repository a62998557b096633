import { Button } from '../../ui/button.tsx';
import { Notice } from '../../ui/notice.tsx';
import type { DraftView } from './draft-keeper.ts';

/** Where what was typed is, in a few words. */
export function SavedState({ view, onKeep }: { view: DraftView; onKeep: (which: 'mine' | 'theirs') => void }) {
  const { state } = view;
  if (state.kind === 'conflict') {
    return (
      <Notice
        title="This review was changed in another window."
        isLive
        acts={
          <>
            <Button kind="quiet" small onClick={() => onKeep('mine')}>
              Keep what stands here
            </Button>
            <Button kind="quiet" small onClick={() => onKeep('theirs')}>
              Take the other
            </Button>
          </>
        }
      >
        Both are kept until you choose.
      </Notice>
    );
  }
  const words = {
    saved: 'Saved as you type',
    saving: 'Saving…',
    offline: 'No connection. Kept on this device, and sent when it is back.',
    refused: state.kind === 'refused' ? state.detail : '',
  }[state.kind];
  return (
    <output className="fine muted" aria-live="polite">
      {words}
    </output>
  );
}
