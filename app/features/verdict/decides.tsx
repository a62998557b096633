import { useState, type ReactNode } from 'react';
import type { ReadContest } from '../../../shared/schemas/review.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Notice } from '../../ui/notice.tsx';
import { problemWords } from '../../ui/states.tsx';
import { Select, TextArea } from '../../ui/text-field.tsx';
import { Time } from '../../ui/time.tsx';

export interface DecidesProps {
  /** `this verdict` or `these points`. */
  readonly what: string;
  readonly contest: ReadContest;
  /** Steps to choose from, where the contest is about one; the first is proposed. */
  readonly steps?: { readonly count: number; readonly proposed: number };
  readonly onContest: (words: string, step: number) => Promise<unknown>;
  readonly children?: ReactNode;
}

/** Who decides, until when one can contest, and what became of a contest. */
export function Decides({ what, contest, steps, onContest, children }: DecidesProps) {
  const [isOpen, setOpen] = useState(false);
  const { mine, openUntil } = contest;
  const isWaiting = mine?.open === true && mine.words !== '';
  return (
    <div className="stack">
      {isWaiting ? (
        <Notice kind="plum" title={`You contested ${what}.`}>
          “{mine.words}” It is on your teacher’s desk.
        </Notice>
      ) : null}
      {children}
      <div className="decides">
        <p>
          The checker advises, your teacher decides.{' '}
          {openUntil ? (
            <>
              You can contest {what} until <Time iso={openUntil} />.
            </>
          ) : null}
        </p>
        {openUntil && !isWaiting ? (
          <Button kind="quiet" small onClick={() => setOpen(true)}>
            Contest {what}
          </Button>
        ) : null}
      </div>
      <p className="fine muted">School rules and local law on pupils’ data and marks stand above this.</p>
      {isOpen ? <ContestDialog what={what} steps={steps} onContest={onContest} onClose={() => setOpen(false)} /> : null}
    </div>
  );
}

function ContestDialog({ what, steps, onContest, onClose }: Omit<DecidesProps, 'contest'> & { onClose: () => void }) {
  const [words, setWords] = useState('');
  const [step, setStep] = useState(steps?.proposed ?? 1);
  const [error, setError] = useState<string>();
  const [isBusy, setBusy] = useState(false);
  const send = async () => {
    setBusy(true);
    try {
      await onContest(words, step);
      onClose();
    } catch (problem) {
      setError(problemWords(problem).detail);
      setBusy(false);
    }
  };
  return (
    <Dialog isOpen onClose={onClose} title={`Contest ${what}`} isLocked={isBusy}>
      <form
        className="stack"
        onSubmit={(event) => {
          event.preventDefault();
          void send();
        }}
      >
        {steps && steps.count > 1 ? (
          <Select
            label="The step it is about"
            value={String(step)}
            options={Array.from({ length: steps.count }, (_, i) => ({ value: String(i + 1), label: `step ${i + 1}` }))}
            onChange={(event) => setStep(Number(event.currentTarget.value))}
          />
        ) : null}
        <TextArea
          label="What is contested, and why"
          rows={4}
          maxLength={2000}
          value={words}
          error={error}
          onChange={(event) => setWords(event.currentTarget.value)}
        />
        <div className="acts">
          <Button kind="primary" type="submit" busy={isBusy} disabled={words.trim() === ''}>
            Send to the teacher
          </Button>
          <Button kind="quiet" small onClick={onClose}>
            Not now
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
