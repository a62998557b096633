import {
  edgeStates,
  stepWords,
  verdictHeadline,
  type Sentence,
  type StepState,
} from '../../../shared/lib/step-words.ts';
import { wordReadError } from '../../../shared/maths/reads-as.ts';
import type { ReadErrorCode } from '../../../shared/maths/expression.ts';
import type { DerivationInput, Evidence, StepRuling, Verdict } from '../../../shared/schemas/verdict.ts';

const longest = 400;
const margin = ' '.repeat(5);

/** A verdict for people: each line with what is said of its step, as the pages of the product say it. */
export function explainVerdict({ lines }: Pick<DerivationInput, 'lines'>, verdict: Verdict): string {
  const states = edgeStates(verdict);
  const rows = lines.flatMap((line, k) => {
    const said = k === 0 ? ['The given.'] : explainStep(verdict.steps[k - 1], states[k - 1]);
    return [`${String(k).padStart(3)}  ${shortened(line)}`, ...said.map((words) => margin + words)];
  });
  return [verdictHeadline(verdict), ...rows].join('\n');
}

/** What cannot be read may be of any length. */
function shortened(line: string): string {
  return line.length > longest ? `${line.slice(0, longest)}… (${line.length} characters)` : line;
}

function explainStep(step: StepRuling | undefined, state: StepState | undefined): string[] {
  if (!step || !state) return [];
  const { summary, evidence, notes, reached } = stepWords(step, state);
  const sentences = [summary, ...evidence, ...notes].map(plainly);
  return [...sentences, ...errorWords(step.evidence), ...endingWords(step.evidence), ...(reached ? [reached] : [])];
}

function plainly(sentence: Sentence): string {
  return sentence.map((part) => (typeof part === 'string' ? part : part.tex)).join('');
}

function errorWords({ error }: Evidence): string[] {
  if (!error) return [];
  const { code, place, found, expected } = error;
  return [wordReadError({ code: code as ReadErrorCode, span: place, found, expected })];
}

/** The author's later lines as they would have been. */
function endingWords({ mendedEnding }: Evidence): string[] {
  const [, ...later] = mendedEnding ?? [];
  return later.length > 0 ? [`From there on: ${later.join(' ; ')}`] : [];
}
