import './disputes.css';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useId, useRef, useState } from 'react';
import type { DisputeCase, DisputeItem, DisputeNames } from '../../../shared/schemas/dispute.ts';
import { ErrorState, problemWords, Waiting } from '../../ui/states.tsx';
import { showToast } from '../../ui/toast-store.ts';
import { CaseView, type WordStep } from './case-view.tsx';
import { askAuthor, disputeQuery, makeRuling, revealNames } from './disputes.queries.ts';
import { Queue } from './queue.tsx';
import { CHOICES, RuleColumn, type Choice } from './rule-column.tsx';

export interface DeskProps {
  readonly items: readonly DisputeItem[];
  readonly openId: string;
  readonly onOpen: (disputeId: string | null) => void;
  readonly wordStep: WordStep;
}

/** The desk: the queue, the open case, and the rulings by key. */
export function Desk({ items, openId, onOpen, wordStep }: DeskProps) {
  const [isUnfolded, setUnfolded] = useState(false);
  const dispute = useQuery(disputeQuery(openId));
  const move = (by: -1 | 1) => {
    const at = items.findIndex((item) => item.disputeId === openId);
    const next = items[at + by];
    if (next) onOpen(next.disputeId);
  };
  useKeys({ ArrowDown: () => move(1), ArrowUp: () => move(-1) });
  const next = nextAfter(items, openId);
  return (
    <div className="desk-grid desk">
      <Queue items={items} openId={openId} isUnfolded={isUnfolded} onUnfold={() => setUnfolded(true)} />
      {dispute.data ? (
        <OpenCase
          key={openId}
          dispute={dispute.data}
          wordStep={wordStep}
          isLast={next === null}
          onDone={() => {
            setUnfolded(false);
            onOpen(next);
          }}
        />
      ) : (
        <div className="case">
          {dispute.isError ? <ErrorState error={dispute.error} onRetry={() => void dispute.refetch()} /> : <Waiting />}
        </div>
      )}
    </div>
  );
}

interface OpenCaseProps {
  readonly dispute: DisputeCase;
  readonly wordStep: WordStep;
  readonly isLast: boolean;
  readonly onDone: () => void;
}

function OpenCase({ dispute, wordStep, isLast, onDone }: OpenCaseProps) {
  const client = useQueryClient();
  const [choice, setChoice] = useState<Choice | null>(null);
  const [reason, setReason] = useState('');
  const [along, setAlong] = useState(dispute.sameStep > 0);
  const [names, setNames] = useState<DisputeNames | null>(null);
  const reasonId = useId();
  const reveal = useMutation({ mutationFn: () => revealNames(dispute.disputeId), onSuccess: setNames });
  const act = useMutation({
    mutationFn: async () => {
      if (choice === 'ask') await askAuthor(dispute.disputeId, reason);
      else if (choice) await makeRuling(dispute.disputeId, choice, reason, along);
    },
    onSuccess: async () => {
      showToast(choice === 'ask' ? 'The author is asked.' : 'Ruled.');
      onDone();
      await client.invalidateQueries({ queryKey: ['disputes', 'open'] });
      await client.invalidateQueries({ queryKey: ['derivations'] });
    },
  });
  const isReady = choice !== null && reason.trim() !== '' && !act.isPending;
  const choose = (chosen: Choice) => {
    if (chosen === 'ask' && !dispute.mayAsk) return;
    setChoice(chosen);
    document.getElementById(reasonId)?.focus();
  };
  useKeys({
    ...Object.fromEntries(CHOICES.map((each, i) => [String(i + 1), () => choose(each)])),
    Enter: () => isReady && act.mutate(),
  });
  const refused = act.error ?? reveal.error;
  return (
    <>
      <CaseView dispute={dispute} names={names} wordStep={wordStep} onReveal={() => reveal.mutate()} />
      <RuleColumn
        dispute={dispute}
        choice={choice}
        onChoose={choose}
        reason={reason}
        onReason={setReason}
        along={along}
        onAlong={setAlong}
        onRule={() => act.mutate()}
        isBusy={act.isPending}
        error={refused ? problemWords(refused).detail || problemWords(refused).title : undefined}
        isLast={isLast}
        reasonId={reasonId}
        onReasonEnter={() => isReady && act.mutate()}
      />
    </>
  );
}

function nextAfter(items: readonly DisputeItem[], openId: string): string | null {
  const at = items.findIndex((item) => item.disputeId === openId);
  return (items[at + 1] ?? items[at - 1])?.disputeId ?? null;
}

/** Keys of the page; where one types or stands on another control, they do what they always do. */
function useKeys(keys: Readonly<Record<string, () => unknown>>): void {
  const latest = useRef(keys);
  useEffect(() => {
    latest.current = keys;
  });
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      const act = latest.current[event.key];
      const { target } = event;
      const isTaken = isTyping(target) || (event.key.startsWith('Arrow') && target instanceof HTMLInputElement);
      const isPressed = event.key === 'Enter' && target instanceof Element && target.closest('button, a, summary');
      if (!act || isTaken || isPressed || event.ctrlKey || event.metaKey || event.altKey) return;
      event.preventDefault();
      act();
    };
    document.addEventListener('keydown', onKeyDown);
    return () => document.removeEventListener('keydown', onKeyDown);
  }, []);
}

function isTyping(target: EventTarget | null): boolean {
  if (target instanceof HTMLInputElement) return target.type !== 'radio' && target.type !== 'checkbox';
  return target instanceof Element && target.closest('textarea, select, [role="dialog"], math-field') !== null;
}
