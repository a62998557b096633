import { useMutation } from '@tanstack/react-query';
import { useRef, useState, type ReactNode } from 'react';
import type { Reading } from '../../../shared/maths/expression.ts';
import { readLines } from '../../../shared/maths/read-lines.ts';
import type { TryTask } from '../../../shared/schemas/derivation.ts';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Derivation } from '../../ui/derivation.tsx';
import type { EdgeLine } from '../../ui/edge-line.tsx';
import type { StepState } from '../../../shared/lib/step-words.ts';
import { MathsField, type MathsFieldHandle } from '../../ui/maths-field.tsx';
import { MathsReading } from '../../ui/maths-reading.tsx';
import { problemWords } from '../../ui/states.tsx';
import { StepEvidence } from './step-evidence.tsx';
import { edgeStates, stepWords, verdictHeadline } from '../../../shared/lib/step-words.ts';
import './try-it.css';

export interface TryItProps {
  /** The task as it stands in the form, saved or not. */
  readonly task: Omit<TryTask, 'lines'>;
}

interface Line {
  readonly id: number;
  readonly tex: string;
}

/** A model derivation on a task: how each line is read, and how each step is ruled. Nothing of it is kept. */
export function TryIt({ task }: TryItProps) {
  const [lines, setLines] = useState<readonly Line[]>([{ id: 1, tex: '' }]);
  const fields = useRef(new Map<number, MathsFieldHandle>());
  const nextId = useRef(2);
  const rule = useMutation({
    mutationFn: async (asked: TryTask) => ({
      asked: JSON.stringify(asked),
      verdict: await api.post<Verdict>('/api/tasks/try', asked),
    }),
  });
  const written = lines.filter(({ tex }) => tex.trim() !== '');
  const asked: TryTask = { ...task, lines: written.map(({ tex }) => tex) };
  // A ruling on other lines, or under other terms, says nothing about these.
  const verdict = rule.data?.asked === JSON.stringify(asked) ? rule.data.verdict : null;
  const [, ...readings] = readLines([task.given, ...asked.lines], task.settings);

  const write = (id: number, tex: string) => setLines(lines.map((line) => (line.id === id ? { ...line, tex } : line)));
  const addAfter = (id: number) => {
    const at = lines.findIndex((line) => line.id === id) + 1;
    const added = { id: nextId.current, tex: lines[at - 1]?.tex ?? '' };
    nextId.current += 1;
    setLines([...lines.slice(0, at), added, ...lines.slice(at)]);
    setTimeout(() => fields.current.get(added.id)?.focus());
  };
  const remove = (id: number) =>
    setLines(lines.length > 1 ? lines.filter((line) => line.id !== id) : [{ id, tex: '' }]);

  return (
    <section aria-label="Try it">
      <Derivation
        className="try-it"
        layout="narrow"
        label="A model derivation"
        lines={[
          { id: 'given', tex: task.given },
          ...lines.map((line, i) => ({
            ...ruled(line, written.indexOf(line), verdict),
            content: (
              <MathsField
                handle={(handle) => {
                  if (handle) fields.current.set(line.id, handle);
                  else fields.current.delete(line.id);
                }}
                value={line.tex}
                onChange={(tex) => write(line.id, tex)}
                label={`line ${i + 1}`}
                decimal={task.settings.decimal}
                onEnter={() => addAfter(line.id)}
                keys
              />
            ),
            under: (
              <Under
                line={line}
                step={written.indexOf(line) + 1}
                reading={readings[written.indexOf(line)]}
                decimal={task.settings.decimal}
                verdict={verdict}
                onChange={(tex) => write(line.id, tex)}
              >
                <Button kind="quiet" small onClick={() => remove(line.id)}>
                  Delete line {i + 1}
                </Button>
              </Under>
            ),
          })),
        ]}
      />
      <div className="acts mt-4">
        <Button busy={rule.isPending} disabled={written.length === 0} onClick={() => rule.mutate(asked)}>
          See how it is ruled
        </Button>
        <Button kind="quiet" small onClick={() => addAfter(lines.at(-1)?.id ?? 0)}>
          Next line
        </Button>
      </div>
      <output className="small mt-3 block">{verdict ? verdictHeadline(verdict) : ''}</output>
      {rule.isError ? (
        <p className="msg err" role="alert">
          {problemWords(rule.error).detail || problemWords(rule.error).title}
        </p>
      ) : null}
    </section>
  );
}

function ruled(line: Line, index: number, verdict: Verdict | null): EdgeLine {
  const state: StepState = (verdict && index >= 0 ? edgeStates(verdict)[index] : undefined) ?? 'plain';
  return { id: String(line.id), state };
}

interface UnderProps {
  readonly line: Line;
  /** Among the lines that hold maths; 0 for an empty one. */
  readonly step: number;
  /** Behind the lines before it; undefined for an empty one. */
  readonly reading: Reading | undefined;
  readonly decimal: 'point' | 'comma';
  readonly verdict: Verdict | null;
  readonly onChange: (tex: string) => void;
  readonly children: ReactNode;
}

function Under({ line, step, reading, decimal, verdict, onChange, children }: UnderProps) {
  const ruling = verdict?.steps.find((each) => each.step === step);
  const state = verdict && edgeStates(verdict)[step - 1];
  return (
    <>
      {reading ? (
        <MathsReading id={`try-${line.id}`} tex={line.tex} reading={reading} decimal={decimal} onChange={onChange} />
      ) : null}
      {ruling && state ? <StepEvidence words={stepWords(ruling, state)} /> : null}
      {children}
    </>
  );
}
