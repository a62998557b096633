import { useEffect, useRef, useState } from 'react';
import { wordReadError } from '../../../shared/maths/reads-as.ts';
import { lineInWords } from '../../../shared/maths/words.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';
import type { LineFacts, SheetStore } from './sheet-store.ts';
import { useSheetFacts } from './sheet-store.ts';

/** Says in words how a line was read when it is left: screen readers do not read maths out of a live region. */
export function LineAnnouncer({ store }: { readonly store: SheetStore }) {
  const facts = useSheetFacts(store);
  const [words, setWords] = useState('');
  const before = useRef<string | null>(null);
  useEffect(() => {
    const left = before.current;
    before.current = facts.activeId;
    const line = left !== null && left !== facts.activeId ? facts.lines.get(left) : null;
    if (line) setWords(announcement(line));
  }, [facts]);
  return (
    <p className="sr-only" aria-live="polite">
      {words}
    </p>
  );
}

export function announcement({ number, reading }: Pick<LineFacts, 'number' | 'reading'>): string {
  if (!reading) return '';
  if (!reading.ok) return `line ${number} cannot be read yet: ${wordReadError(explainRefusal(reading.refusal))}`;
  const question = reading.alternatives.length > 0 ? '. It can be read in two ways: please choose' : '';
  return `line ${number} reads as ${lineInWords(reading.line)}${question}`;
}
