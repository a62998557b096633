import { readLine } from '../../../shared/maths/read.ts';
import { sameLine } from '../../../shared/maths/same.ts';
import { childrenOf, exprsOf } from '../../../shared/maths/walk.ts';
import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { contextOf, judgeLine, type Route, type WalkState, type WalkStep } from '../walk-derivation.ts';
import type { Regrouped } from './cases.ts';
import { plausibleAfter } from './plausible.ts';

const mostReadings = 160;
const mostJudged = 5;

/**
 * Rule 11: one pair of brackets put into a line that fails makes it follow, and the next line follows from that
 * reading. Null where no pair does, or where the task counts it as a fault.
 */
export function putBrackets(route: Route, state: WalkState, step: number, failed: WalkStep): Regrouped | null {
  const own = route.read.lines[step];
  const next = route.read.lines[step + 1];
  if (!own?.ok || !next?.ok || route.input.settings.presentation === 'fault') return null;
  if (!mayHaveLostBrackets(own.line)) return null;
  // The author who goes on from what is written lost the brackets in earnest.
  if (judgeLine(route, failed.state, step + 1, next.line).result.ruling === 'holds') return null;
  const seen: Line[] = [own.line];
  const isPlausible = plausibleAfter(state.from, contextOf(route, state));
  let judged = 0;
  for (const { tex, line } of bracketings(own.tex, own.line, route)) {
    if (!isPlausible(line) || seen.some((other) => sameLine(other, line))) continue;
    seen.push(line);
    judged += 1;
    if (judged > mostJudged) return null;
    const meant = judgeLine(route, state, step, line);
    if (meant.result.ruling !== 'holds') continue;
    if (judgeLine(route, meant.state, step + 1, next.line).result.ruling !== 'holds') continue;
    const { result } = meant;
    const noted = {
      ...result,
      notes: [...result.notes, 'presentation' as const],
      evidence: { ...result.evidence, meant: tex },
    };
    return { results: [noted], state: meant.state };
  }
  return null;
}

function mayHaveLostBrackets(line: Line): boolean {
  return line.kind === 'expression' || line.kind === 'relation' || line.kind === 'continuation';
}

/** The line with one more pair of brackets, around each run of text that starts and ends where parts do. */
function* bracketings(tex: string, line: Line, route: Route): Generator<{ tex: string; line: Line }> {
  const starts = new Set<number>();
  const ends = new Set<number>();
  const visit = (expr: Expr): void => {
    starts.add(expr.span.start);
    ends.add(expr.span.end);
    childrenOf(expr).forEach(visit);
  };
  exprsOf(line).forEach(visit);
  let tried = 0;
  for (const start of [...starts].sort((a, b) => a - b)) {
    for (const end of [...ends].sort((a, b) => a - b)) {
      if (end <= start + 1) continue;
      const text = `${tex.slice(0, start)}\\left(${tex.slice(start, end)}\\right)${tex.slice(end)}`;
      tried += 1;
      if (tried > mostReadings) return;
      const reading = readLine(text, route.read.settings);
      if (reading.ok && reading.line.kind === line.kind) yield { tex: text, line: reading.line };
    }
  }
}
