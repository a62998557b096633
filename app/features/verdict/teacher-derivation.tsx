import { useState } from 'react';
import type { ReadVerdict, TeacherDerivation, TeacherFinding } from '../../../shared/schemas/review.ts';
import { OUTCOME_WORDS, slipKindLabel } from '../../lib/finding-words.ts';
import { toEdgeLines } from '../../lib/edge-lines.ts';
import { Button } from '../../ui/button.tsx';
import { Derivation } from '../../ui/derivation.tsx';
import { SURE_WORDS } from '../../ui/how-sure.tsx';
import { signed } from '../../ui/num.tsx';
import { Both, Head } from '../../ui/page.tsx';
import { EmptyState, problemWords } from '../../ui/states.tsx';
import { Table, type Column } from '../../ui/table.tsx';
import { Select, TextArea } from '../../ui/text-field.tsx';
import { Time } from '../../ui/time.tsx';
import { VerdictEdge, type WordStep } from './verdict-edge.tsx';
import { headline, leadOf } from './verdict-words.ts';

export interface TeacherDerivationViewProps {
  readonly derivation: TeacherDerivation;
  readonly wordStep: WordStep;
  readonly onOverrule: (firstFault: number | null, reason: string) => Promise<unknown>;
}

/** A derivation from the teacher's side: both names, the verdict at any stage, and overruling it. */
export function TeacherDerivationView({ derivation, wordStep, onOverrule }: TeacherDerivationViewProps) {
  const { round, task, lines, verdict, author, planted, findings } = derivation;
  const isHidden = round.stage !== 'settled';
  return (
    <>
      <Head
        both
        where={
          <>
            Round {round.number} · {task.title} · {planted ? 'planted' : (author ?? 'no author')}
          </>
        }
        h1={
          verdict
            ? headline(verdict)
            : lines.length > 1
              ? 'This derivation is not checked yet.'
              : 'Nothing is handed in yet.'
        }
        lead={verdict ? leadOf(verdict) : null}
      />
      {verdict ? (
        <VerdictEdge lines={lines} verdict={verdict} wordStep={wordStep} />
      ) : (
        <Derivation lines={toEdgeLines(lines, ({ number }) => ({ state: number === 0 ? undefined : 'plain' }))} />
      )}
      <Both className="found">
        <h2>Findings</h2>
        <Table
          caption="Findings on this derivation"
          columns={COLUMNS}
          rows={findings}
          rowKey={(finding) => finding.findingId}
          empty={<EmptyState title="No finding yet" />}
        />
        <div className="teacher-foot">
          <Overrule steps={lines.length - 1} verdict={verdict} onOverrule={onOverrule} />
          <Rulings derivation={derivation} />
        </div>
        <div className="decides mt-6">
          <p>
            The checker advises, you decide.{' '}
            {isHidden
              ? 'No student sees any of this before the round is settled.'
              : 'A ruling scores again at once and is mailed to everyone concerned.'}{' '}
            <span className="muted">School rules and local law on pupils’ data and marks stand above this.</span>
          </p>
        </div>
      </Both>
    </>
  );
}

const COLUMNS: readonly Column<TeacherFinding>[] = [
  { id: 'who', head: 'Reviewer', cell: ({ reviewer }) => reviewer ?? '—' },
  { id: 'pick', head: 'Says', cell: saysWords },
  { id: 'why', head: 'Why', cell: ({ why }) => (why ? `“${why}”` : '—') },
  {
    id: 'answer',
    head: 'The author',
    cell: ({ answer }) =>
      answer ? (answer.kind === 'accept' ? 'accepted' : `contested: “${answer.reason}”`) : 'no answer',
  },
  { id: 'points', head: 'Points', isFigure: true, cell: ({ points }) => (points === null ? '' : signed(points)) },
];

function saysWords({ pick, noFault, sureness, slipKind, outcome }: TeacherFinding) {
  const kind = slipKindLabel(slipKind);
  const place = noFault ? 'no fault' : pick === null ? 'can’t tell' : `step ${pick}`;
  return (
    <span>
      {place}
      {pick !== null || noFault ? `, ${SURE_WORDS[sureness]}` : null}
      {kind ? <em>, {kind.toLowerCase()}</em> : null}
      {outcome ? <span className="fine muted block">{OUTCOME_WORDS[outcome]}</span> : null}
    </span>
  );
}

function Overrule({
  steps,
  verdict,
  onOverrule,
}: {
  steps: number;
  verdict: ReadVerdict | null;
  onOverrule: TeacherDerivationViewProps['onOverrule'];
}) {
  const [fault, setFault] = useState('');
  const [reason, setReason] = useState('');
  const [error, setError] = useState<string>();
  const [isBusy, setBusy] = useState(false);
  const send = async () => {
    setBusy(true);
    try {
      await onOverrule(fault === 'none' ? null : Number(fault), reason);
      setReason('');
      setFault('');
      setError(undefined);
    } catch (problem) {
      setError(problemWords(problem).detail || problemWords(problem).title);
    }
    setBusy(false);
  };
  const now =
    verdict === null
      ? ''
      : verdict.firstFault === null
        ? verdict.outcome === 'sound'
          ? 'none'
          : ''
        : String(verdict.firstFault);
  return (
    <form
      className="stack"
      onSubmit={(event) => {
        event.preventDefault();
        void send();
      }}
    >
      <h3>Overrule the verdict</h3>
      <Select
        label="The first fault is"
        placeholder="choose"
        value={fault}
        options={[
          { value: 'none', label: 'nowhere: every step follows', disabled: now === 'none' },
          ...Array.from({ length: Math.max(0, steps) }, (_, i) => ({
            value: String(i + 1),
            label: `step ${i + 1}`,
            disabled: now === String(i + 1),
          })),
        ]}
        onChange={(event) => setFault(event.currentTarget.value)}
      />
      <TextArea
        label="Reason, which everyone concerned will read"
        rows={3}
        maxLength={2000}
        value={reason}
        error={error}
        onChange={(event) => setReason(event.currentTarget.value)}
      />
      <Button type="submit" busy={isBusy} disabled={fault === '' || reason.trim() === ''}>
        Rule so
      </Button>
    </form>
  );
}

function Rulings({ derivation }: { derivation: TeacherDerivation }) {
  if (derivation.rulings.length === 0)
    return <p className="small muted">No ruling yet: the checker’s verdict stands.</p>;
  return (
    <div className="stack">
      <h3>Rulings</h3>
      {derivation.rulings.map((ruling) => (
        <p key={ruling.rulingId} className="small">
          {ruling.step ? `Step ${ruling.step} ` : 'Every step '}
          <b>{ruling.decision === 'presentation' ? 'presentation only' : ruling.decision}.</b> “{ruling.reason}”{' '}
          <span className="muted">
            <Time iso={ruling.at} />
          </span>
        </p>
      ))}
    </div>
  );
}
