import type { DerivationInput, Note, StepRuling, Verdict } from '../../../shared/schemas/verdict.ts';

const noteWords: Record<Note, string> = {
  'given-miscopied': 'a miscopy of the given',
  domain: 'has values on a part only',
  constant: 'the constant of integration is missing',
  'one-way': 'cannot be turned round',
  presentation: 'a fault of presentation',
  empty: 'never true, or always true, on both lines',
  meaningless: 'has no value anywhere',
  unfinished: 'the goal is not reached',
  candidates: 'lists values that are still to be tried',
  'not-rejected': 'lists a value that is never rejected',
  remark: 'a remark',
  cases: 'one case of several',
  definition: 'a definition',
  continued: 'goes on from the line above',
};

/** A verdict for people: each line with its ruling and what shows it. */
export function explainVerdict(input: DerivationInput, verdict: Verdict): string {
  const summary =
    verdict.firstFault === null ? verdict.outcome : `${verdict.outcome}, first fault in step ${verdict.firstFault}`;
  const rows = input.lines.map((line, k) => {
    const step = verdict.steps[k - 1];
    return step ? `  ${k}. ${line}\n     ${explainStep(step)}` : `  ${k}. ${line}\n     the given`;
  });
  return [summary, ...rows].join('\n');
}

function explainStep(step: StepRuling): string {
  const { evidence } = step;
  const words = [step.reached ? `${step.ruling} (${step.reached})` : step.ruling];
  if (step.notes.length > 0) words.push(step.notes.map((note) => noteWords[note]).join(', '));
  if (evidence.lost) words.push(`lost: ${evidence.lost.join(', ')}`);
  if (evidence.gained) words.push(`gained: ${evidence.gained.join(', ')}`);
  if (evidence.witness) {
    const at = Object.entries(evidence.witness.at).map(([letter, value]) => `${letter} = ${value}`);
    const place = at.length > 0 ? `at ${at.join(', ')} ` : '';
    words.push(`${place}the line above is ${evidence.witness.above}, this one is ${evidence.witness.below}`);
  }
  if (evidence.excluded) words.push(`needs ${evidence.excluded.join(', ')}`);
  if (evidence.meant) words.push(`meant: ${evidence.meant}`);
  if (evidence.solutions) words.push(`solutions: ${evidence.solutions}`);
  if (evidence.error) {
    const { line, place, expected } = evidence.error;
    words.push(`line ${line} cannot be read at ${place.start}; expected ${expected.join(' or ') || 'something else'}`);
  } else if (evidence.reason) words.push(`reason: ${evidence.reason}`);
  return words.join('; ');
}
