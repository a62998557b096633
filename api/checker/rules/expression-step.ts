import type { Expr, Line } from '../../../shared/maths/expression.ts';
import type { Evidence } from '../../../shared/schemas/verdict.ts';
import { compareWithCalculus, noEvidence } from '../calculus/judge.ts';
import type { Comparison } from '../compare/comparison.ts';
import type { CheckContext } from '../context.ts';
import { judgeAugmented } from './augmented.ts';
import { compareChoices } from './plus-minus.ts';
import { fails, holds, undecided, type StepResult } from './step-result.ts';

export interface ExpressionAnswer extends StepResult {
  /** Conditions that later steps stand under, because this line or the one above has a value only there. */
  readonly shrunk: readonly Line[];
}

/** Rules 1 and 8 on two expressions. */
export function judgeExpressions(above: Expr, below: Expr, context: CheckContext): ExpressionAnswer {
  const equations = judgeAugmented(above, below, context);
  if (equations) return { ...equations, shrunk: [] };
  const { found: plain, notes, evidence } = compareWithCalculus(above, below, context);
  const isOpen = plain.kind === 'undecided' && plain.reason === 'not-covered';
  const found = (isOpen ? compareChoices(above, below, context, compareOne) : null) ?? plain;
  const answer = toAnswer(found);
  if (notes.length === 0 && evidence === noEvidence) return answer;
  return { ...answer, notes: [...answer.notes, ...notes], evidence: { ...answer.evidence, ...evidence } };
}

function compareOne(above: Expr, below: Expr, context: CheckContext): Comparison {
  return compareWithCalculus(above, below, context).found;
}

function toAnswer(found: Comparison): ExpressionAnswer {
  switch (found.kind) {
    case 'equal': {
      if (found.excluded.length === 0 && found.cancelled.length === 0) return { ...holds(found.reached), shrunk: [] };
      const conditions = [...found.excluded, ...found.cancelled].map((c) => c.tex);
      const evidence: Evidence = conditions.length > 0 ? { excluded: [...new Set(conditions)] } : {};
      const result = holds(found.reached, conditions.length > 0 ? ['domain'] : [], evidence);
      return { ...result, shrunk: [...found.excluded, ...found.cancelled].map((c) => c.line) };
    }
    case 'different': {
      const { atTex, above: worthAbove, below: worthBelow } = found.witness;
      return {
        ...fails('proved', { witness: { at: { ...atTex }, above: worthAbove, below: worthBelow } }),
        shrunk: [],
      };
    }
    case 'nothing-in-common':
      return { ...fails('proved', {}, ['domain']), shrunk: [] };
    case 'meaningless':
      return { ...fails('proved', {}, ['meaningless']), shrunk: [] };
    case 'undecided':
      return { ...undecided(found.reason), shrunk: [] };
  }
}

/** Rule 5: each link of a chain of = is an identity, the first from the line above. */
export function judgeLinks(above: Expr, members: readonly Expr[], context: CheckContext): ExpressionAnswer {
  let from = above;
  let current = context;
  let total: ExpressionAnswer | null = null;
  for (const [index, member] of members.entries()) {
    const link = judgeExpressions(from, member, current);
    if (link.ruling !== 'holds') {
      return members.length > 1 ? { ...link, evidence: { ...link.evidence, link: index + 1 } } : link;
    }
    total = total === null ? link : joinLinks(total, link);
    if (link.shrunk.length > 0) current = { ...current, assumptions: [...current.assumptions, ...link.shrunk] };
    from = member;
  }
  return total ?? { ...undecided('not-covered'), shrunk: [] };
}

function joinLinks(a: ExpressionAnswer, b: ExpressionAnswer): ExpressionAnswer {
  const excluded = [...(a.evidence.excluded ?? []), ...(b.evidence.excluded ?? [])];
  return {
    ruling: 'holds',
    reached: a.reached === 'proved' ? b.reached : a.reached,
    notes: [...new Set([...a.notes, ...b.notes])],
    evidence: excluded.length > 0 ? { excluded: [...new Set(excluded)] } : {},
    shrunk: [...a.shrunk, ...b.shrunk],
  };
}
