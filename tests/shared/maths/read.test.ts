import { describe, expect, it } from 'vitest';
import { readLine } from '../../../shared/maths/read.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';
import caseLines from './case-lines.json' with { type: 'json' };
import { outlineOfReading } from './outline.ts';
import { READINGS, REFUSALS } from './reading-table.ts';

describe('reading a line', () => {
  it.each(READINGS)('reads %s', (tex, outline) => {
    expect(outlineOfReading(tex)).toBe(outline);
  });

  it.each(REFUSALS)('refuses %s and says where and what was expected', (tex, outline) => {
    expect(outlineOfReading(tex)).toBe(outline);
  });

  it.each(caseLines)('reads the lines of: $source', ({ lines }) => {
    for (const tex of lines) {
      const reading = readLine(tex);
      expect(reading.ok ? 'read' : `${tex}: ${explainRefusal(reading.refusal).code}`).toBe('read');
    }
  });

  it('takes a comma as decimal mark where the class writes it so', () => {
    expect(outlineOfReading('1,5x+2{,}25', { decimal: 'comma' })).toBe('(+(* 3/2:decimal x) +9/4:decimal)');
    expect(outlineOfReading('x\\in\\{1;2\\}', { decimal: 'comma' })).toBe('(membership x (finite [1 2]) false)');
    expect(outlineOfReading('1.5', { decimal: 'comma' })).toBe('bad-number 0-2 ,');
  });

  it('reads f(x) as a call only where f was introduced', () => {
    const settings = { functions: ['f'] };
    expect(outlineOfReading('f(x+1)', settings)).toBe('(apply f 0 [(+x +1)])');
    expect(outlineOfReading('f(x+1)')).toBe('(* f (+x +1)) !unknown-function');
    expect(outlineOfReading('f^{-1}(x)', settings)).toBe('(apply f^{-1} 0 [x])');
    expect(outlineOfReading('f^2(x)', settings)).toBe('(^ (apply f 0 [x]) 2)');
    expect(outlineOfReading('f(x)=3', settings)).toBe('(relation (apply f 0 [x]) = 3)');
  });

  it('takes a free i as the unit in a complex task and asks in a real one; a bound or marked i is a letter', () => {
    expect(outlineOfReading('3+4i', { numbers: 'complex' })).toBe('(+3 +(* 4 #i))');
    expect(outlineOfReading('3+4i')).toBe('(+3 +(* 4 i)) !imaginary-unit ? 3+4\\mathrm{i}');
    expect(outlineOfReading('\\sum_{i=1}^{3}i', { numbers: 'complex' })).toBe('(series sum i 1 3 i)');
    expect(outlineOfReading('\\mathit{i}+x_i', { numbers: 'complex' })).toBe('(+i +x_i)');
  });

  it('asks whether x!=3 is a factorial', () => {
    expect(outlineOfReading('x!=3')).toBe('(relation (factorial x) = 3) ? x\\ne3');
    expect(outlineOfReading('x! = 3')).toBe('(relation (factorial x) = 3)');
  });

  it('takes a letter set equal to a set as the solutions for it', () => {
    expect(outlineOfReading('x=\\{2,3\\}')).toBe('(membership x (finite [2 3]) false)');
    expect(outlineOfReading('x=2\\text{ and }3')).toBe(
      '(all [(relation x = 2) (relation x = 3)]) ? x=2\\text{ or }x=3',
    );
  });

  it('does not split a decimal as an argument', () => {
    expect(outlineOfReading('\\frac.67')).toBe('bad-number 5-8 {');
    expect(outlineOfReading('x^2.5')).toBe('bad-number 2-5 {');
  });

  it('looks through what only adorns', () => {
    expect(outlineOfReading('\\frac{\\cancel{(x-2)}(x+1)}{\\cancel{(x-2)}}')).toBe('(/ (* (+x -2) (+x +1)) (+x -2))');
    expect(outlineOfReading('\\boxed{x=3}')).toBe('(relation x = 3)');
  });

  it('gives the value of each way to write a number', () => {
    expect(outlineOfReading('0.1\\overline{6}')).toBe('1/6:repeating');
    expect(outlineOfReading('0.\\dot1 4285\\dot7')).toBe('1/7:repeating');
    expect(outlineOfReading('12.5\\%')).toBe('1/8:percent !percent');
    expect(outlineOfReading('1\\,000\\,000')).toBe('1000000');
  });
});
