import { describe, expect, it } from 'vitest';
import { linesFromPaste, plainToTex } from '../../../shared/maths/plain-input.ts';

const { raw } = String;

describe('pasted text', () => {
  it('becomes one line for each row of an align environment', () => {
    const text = raw`\begin{align*} 2x+3 &= 7 \\ 2x &= 4 \\[2pt] x &= 2 \end{align*}`;
    expect(linesFromPaste(text)).toEqual(['2x+3 = 7', '2x = 4', 'x = 2']);
  });

  it('keeps matrices and cases together', () => {
    const text = raw`\begin{pmatrix}1&2\\3&4\end{pmatrix} \\ \begin{cases}x=1\\y=2\end{cases}`;
    expect(linesFromPaste(text)).toEqual([
      raw`\begin{pmatrix}1&2\\3&4\end{pmatrix}`,
      raw`\begin{cases}x=1\\y=2\end{cases}`,
    ]);
  });

  it('takes formulas between dollars, numbered rows and blank lines', () => {
    expect(linesFromPaste('$$x^2=4$$\n\n1. $x=\\pm 2$\r\n\\[y=1\\]')).toEqual(['x^2=4', 'x=\\pm 2', 'y=1']);
  });

  it('keeps a minus sign at the start of a line', () => {
    expect(linesFromPaste('- x + 3\n-2x')).toEqual(['- x + 3', '-2x']);
  });

  it('gives typed powers all their digits', () => {
    expect(plainToTex('x^10+2^(n+1)-y**-2')).toBe('x^{10}+2^{n+1}-y^{-2}');
    expect(plainToTex('(x+1)^(a)(b)')).toBe('(x+1)^a(b)');
    expect(linesFromPaste('3x^12 = sqrt(y)')).toEqual(['3x^{12} = sqrt(y)']);
  });
});
