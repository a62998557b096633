import type { Expr } from '../../../shared/maths/expression.ts';
import { everywhere, rule, type Rewrite } from '../slips/rewrite.ts';

/** Rules that a model derivation uses, each from a first course; letters stand for anything, k, m and n for numbers. */
const simplifying: readonly (readonly [string, string])[] = [
  ['\\ln(a^n)', 'n\\ln(a)'],
  ['\\ln(a)+\\ln(b)', '\\ln(ab)'],
  ['\\ln(a)-\\ln(b)', '\\ln(\\frac{a}{b})'],
  ['\\log(a)+\\log(b)', '\\log(ab)'],
  ['\\log(a)-\\log(b)', '\\log(\\frac{a}{b})'],
  ['e^ae^b', 'e^{a+b}'],
  ['\\frac{e^a}{e^b}', 'e^{a-b}'],
  ['(e^a)^n', 'e^{na}'],
  ['\\sqrt{a}\\sqrt{b}', '\\sqrt{ab}'],
  ['1-\\sin^2(a)', '\\cos^2(a)'],
  ['1-\\cos^2(a)', '\\sin^2(a)'],
  ['\\sin^2(a)+\\cos^2(a)', '1'],
  ['(\\sin(a)+\\cos(a))^2', '\\sin^2(a)+2\\sin(a)\\cos(a)+\\cos^2(a)'],
  ['\\cos^2(a)-\\sin^2(a)', '\\cos(2a)'],
  ['2\\sin(a)\\cos(a)', '\\sin(2a)'],
  ['|ab|', '|a||b|'],
  ['|a|^2', 'a^2'],
  ['\\frac{a^m}{a^n}', 'a^{m-n}'],
];

const rules: readonly Rewrite[] = simplifying.map(([from, to]) => rule(from, to));

/** The expression with the first rule that applies used once; null where none does. */
export function byRule(expr: Expr): Expr | null {
  for (const rewrite of rules) {
    for (const changed of everywhere(expr, rewrite)) return changed;
  }
  return null;
}
