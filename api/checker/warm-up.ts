import { checkDerivation } from './rule-derivation.ts';

/** What derivations usually look like, sound and faulty, most often of all sums and products. */
const usual: readonly (readonly string[])[] = [
  ['2(x+3)^2', '2(x^2+6x+9)', '2x^2+12x+18'],
  ['(a-4)(a+7)', 'a^2+7a-4a-28', 'a^2+3a-28'],
  ['3(x-2)-x', '3x-2-x', '2x-2'],
  ['(2y-5)^2-(y+1)(y-1)', '4y^2-20y+25-y^2-1', '3y^2-20y+24'],
  ['\\frac{3}{4}+\\frac{5}{6}', '\\frac{9}{12}+\\frac{10}{12}', '\\frac{19}{12}'],
  ['\\frac{x^2-9}{x+3}', '\\frac{(x-3)(x+3)}{x+3}', 'x-3'],
  ['\\frac{2}{x+1}-\\frac{1}{x}', '\\frac{2x-(x+1)}{x(x+1)}', '\\frac{x-1}{x^2+x}'],
  ['-\\left(3p-2q\\right)+4p', '-3p-2q+4p', 'p-2q'],
  ['4ab^2\\cdot 3a^2b', '12a^3b^3'],
  ['x^{-2}\\cdot x^5', 'x^3'],
  ['x^2-5x+6=0', '(x-2)(x-3)=0', 'x=2\\text{ or }x=3'],
  ['3x-7=5-x', '4x=12', 'x=3'],
  ['2(x-1)>3x+4', '2x-2>3x+4', '-x>6', 'x>-6'],
  ['\\sqrt{x+6}=x', 'x+6=x^2', 'x=3'],
  ['\\sqrt{50}-\\sqrt{8}', '5\\sqrt{2}-2\\sqrt{2}', '3\\sqrt{2}'],
  ['\\ln x^2+\\ln 3', '2\\ln x+\\ln 3', '\\ln(3x^2)'],
  ['\\sin^2 x+\\cos^2 x+1', '2'],
  ['2^{x+1}', '2\\cdot 2^x'],
  ['\\sin 2x=1', 'x=\\frac{\\pi}{4}+k\\pi'],
  ['x+y=5,\\ x-y=1', '2x=6', 'x=3,\\ y=2'],
  ['A=\\pi r^2', 'r^2=\\frac{A}{\\pi}'],
  ['\\frac{d}{dx}(x^3-2x)', '3x^2-2'],
  ['\\int 2x\\,dx', 'x^2+C'],
];
const rounds = 6;

/** Spent before the first real derivation of a worker, which would else be slow for want of compiled code. */
export function warmUp(): void {
  for (let round = 0; round < rounds; round += 1) {
    for (const lines of usual) {
      // What explains a fault counts as one step after the last; once is enough for it.
      const timedOut = round === 0 ? [] : [lines.length];
      checkDerivation({ lines, assume: [], settings: {} }, { timedOut });
    }
  }
}
