import { describe, expect, it } from 'vitest';
import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printLine } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { countNodes, mapExpr, mapLine } from '../../../shared/maths/walk.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';

const { raw } = String;

function lineOf(tex: string): Line {
  const reading = readLine(tex);
  if (!reading.ok) throw new Error(explainRefusal(reading.refusal).code);
  return reading.line;
}

describe('letters', () => {
  it.each([
    [raw`ax^2+bx+c=0`, ['a', 'x', 'b', 'c']],
    [raw`\sum_{k=1}^{n}kx`, ['n', 'x']],
    [raw`\int_0^a t\,dt`, ['a']],
    [raw`\int t\,dt`, ['t']],
    [raw`\lim_{h\to0}\frac{h}{x}`, ['x']],
    [raw`\frac{dy}{dx}=2x_1`, ['y', 'x', 'x_1']],
    [raw`x=1\text{ or }y=e\pi`, ['x', 'y']],
    [raw`f(x)=ax`, ['a']],
  ])('of %s are the free ones', (tex, letters) => {
    expect(lettersOf(lineOf(tex))).toEqual(letters);
  });
});

describe('walking', () => {
  it('rebuilds a line with every letter replaced', () => {
    const rename = (node: Expr): Expr => (node.kind === 'letter' && node.name === 'x' ? { ...node, name: 'y' } : node);
    const renamed = mapLine(lineOf(raw`\frac{x+1}{\sqrt{x}}=\left|x\right|`), (expr) => mapExpr(expr, rename));
    expect(printLine(renamed)).toBe(raw`\frac{y+1}{\sqrt{y}}=\left|y\right|`);
  });

  it('counts nodes', () => {
    const line = lineOf('2x+1');
    expect(line.kind === 'expression' ? countNodes(line.expr) : 0).toBe(5);
  });
});
