import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import type { CheckSettings, Verdict } from '../../../shared/schemas/verdict.ts';

function check(lines: readonly string[], settings: CheckSettings = {}, assume: readonly string[] = []): Verdict {
  return checkDerivation({ lines, assume, settings });
}

function step(verdict: Verdict, number: number): Verdict['steps'][number] {
  const found = verdict.steps[number - 1];
  if (!found) throw new Error(`no step ${number}`);
  return found;
}

describe('statements', () => {
  it('lose a solution by name', () => {
    const verdict = check(['x^2=7x', 'x=7']);
    expect(verdict).toMatchObject({ outcome: 'faulty', firstFault: 1 });
    expect(step(verdict, 1).evidence).toMatchObject({
      lost: ['0'],
      witness: { at: { x: '0' }, above: 'true', below: 'false' },
    });
  });

  it('carry their running set of solutions', () => {
    const verdict = check(['x^2-2x-1=0', '(x-1)^2=2', 'x=1\\pm\\sqrt{2}']);
    expect(verdict.steps.map(({ evidence }) => evidence.solutions)).toEqual([
      '\\left\\{1-\\sqrt{2},1+\\sqrt{2}\\right\\}',
      '\\left\\{1-\\sqrt{2},1+\\sqrt{2}\\right\\}',
    ]);
    expect(verdict.outcome).toBe('sound');
  });

  it('gain by a named operation one way only', () => {
    const squared = check(['\\sqrt{x+6}=x', 'x+6=x^2', 'x=3']);
    expect(step(squared, 1)).toMatchObject({
      ruling: 'holds',
      notes: ['one-way'],
      evidence: { operation: 'power', gained: ['-2'] },
    });
    const logs = check(['\\ln(x+1)+\\ln(x-1)=\\ln 3', '\\ln(x^2-1)=\\ln 3']);
    expect(step(logs, 1).evidence).toMatchObject({ operation: 'logarithm', gained: ['-2'] });
    const cleared = check(['\\frac{x}{x-2}=\\frac{2}{x-2}', 'x=2', '\\text{no solution}']);
    expect(step(cleared, 1).evidence.operation).toBe('multiply');
    expect(cleared.outcome).toBe('sound');
  });

  it('fail by a gain that no operation explains', () => {
    const verdict = check(['\\sqrt{x+1}=x-1', '(x-3)(x+5)=0']);
    expect(verdict.firstFault).toBe(1);
    expect(step(verdict, 1).evidence.gained).toEqual(['-5']);
  });

  it('fail by every gain where the task asks for reversible steps', () => {
    expect(check(['x=3', 'x^2=9']).outcome).toBe('sound');
    expect(check(['x=3', 'x^2=9'], { reversible: true }).firstFault).toBe(1);
  });

  it('blame the first line that lists a value which is never rejected', () => {
    const lines = ['\\sqrt{2x+3}=x', '2x+3=x^2', '(x-3)(x+1)=0', 'x=3\\text{ or }x=-1'];
    const kept = check(lines);
    expect(kept.firstFault).toBe(3);
    expect(step(kept, 3)).toMatchObject({ notes: ['not-rejected'], evidence: { gained: ['-1'] } });
    const rejected = check([...lines, 'x=3']);
    expect(rejected.outcome).toBe('sound');
    expect(step(rejected, 3).notes).toEqual(['candidates']);
  });

  it('are undecided where both are never true and not the same', () => {
    const verdict = check(['x^2+1=0', 'x^2+2=0']);
    expect(step(verdict, 1)).toMatchObject({ ruling: 'undecided', notes: ['empty'] });
    expect(check(['x^2+1=0', 'x^2=-1', '\\text{no solution}']).outcome).toBe('sound');
  });
});

describe('chains', () => {
  it('fail at a running equals sign, which a task may only note', () => {
    expect(check(['3+4', '=7+2=9']).firstFault).toBe(1);
    const noted = check(['3+4', '=7+2=9'], { presentation: 'note' });
    expect(noted.outcome).toBe('sound');
    expect(step(noted, 1).notes).toContain('presentation');
  });

  it('name the link that fails', () => {
    expect(step(check(['(x+1)^2', '=x^2+2x+1=x^2+3x']), 1).evidence.link).toBe(2);
  });

  it('go on from a statement, and from a remark', () => {
    expect(check(['y=2(3)+1', '=7']).outcome).toBe('sound');
    expect(check(['y=2(3)+1', '=6']).firstFault).toBe(1);
    expect(check(['x^2=9+16', '9+16', '=25']).outcome).toBe('undecided');
  });
});

describe('what a step starts from', () => {
  it('is the line before a remark', () => {
    const verdict = check(['x^2=25+24', '25+24=49', 'x^2=49', 'x=\\pm 7']);
    expect(verdict.outcome).toBe('sound');
    expect(step(verdict, 1).notes).toEqual(['remark']);
  });

  it('is what the author names', () => {
    const lines = ['x^2-9=0', 'x^2=9', 'x^2-9+2x-2x=0', 'x=\\pm3'];
    const verdict = checkDerivation({ lines, uses: [null, null, [0], [1]], assume: [], settings: {} });
    expect(verdict.outcome).toBe('sound');
  });

  it('joins lines that each state one case', () => {
    const verdict = check(['(x-1)(x-2)=0', 'x-1=0', 'x-2=0', 'x=1\\text{ or }x=2']);
    expect(verdict.outcome).toBe('sound');
    expect(step(verdict, 1).notes).toContain('cases');
    expect(step(verdict, 2).notes).toContain('cases');
  });

  it('is not known after a line that cannot be read', () => {
    const verdict = check(['x+x', '2x+(', '2x', '3x']);
    expect(verdict.steps.map(({ ruling }) => ruling)).toEqual(['undecided', 'undecided', 'fails']);
    expect(step(verdict, 1).evidence.error).toMatchObject({ line: 1 });
    expect(verdict).toMatchObject({ outcome: 'undecided', firstFault: null });
  });

  it('changes its kind only by a chain, a definition or a remark', () => {
    expect(step(check(['x^2-4', 'x^2-4=0']), 1).evidence.reason).toBe('change-of-kind');
    expect(check(['x^2-4', 'x^2-4=(x-2)(x+2)']).outcome).toBe('sound');
  });

  it('is a later line that carries a fault on', () => {
    const verdict = check(['2(x+3)=10', '2x+3=10', '2x=7', 'x=\\frac72']);
    expect(verdict.steps.map(({ ruling }) => ruling)).toEqual(['fails', 'holds', 'holds']);
  });
});

describe('systems', () => {
  const given = 'x+y=5\\text{ and }2x-y=4';
  it('keep what earlier lines established', () => {
    expect(check([given, '3x=9', 'x=3', 'y=2', 'x=3\\text{ and }y=2']).outcome).toBe('sound');
  });
  it('fail with the solution at which the line is false', () => {
    const verdict = check([given, '3x=1']);
    expect(step(verdict, 1).evidence.witness).toEqual({ at: { x: '3', y: '2' }, above: 'true', below: 'false' });
  });
  it('with powers are solved by substitution', () => {
    const lines = ['xy=6\\text{ and }x+y=5', 'x(5-x)=6', '(x=2\\text{ and }y=3)\\text{ or }(x=3\\text{ and }y=2)'];
    expect(check(lines).outcome).toBe('sound');
    expect(check([lines[0] as string, 'x=2\\text{ and }y=3']).firstFault).toBe(1);
  });
});

describe('formulas', () => {
  it('hold with a note where the new line has no value', () => {
    const verdict = check(['A-P=Prt', 't=\\frac{A-P}{Pr}']);
    expect(verdict.outcome).toBe('sound');
    expect(step(verdict, 1).notes).toContain('domain');
  });
  it('fail where the new line has a value and loses a solution', () => {
    expect(check(['Prt=Prs', 't=s']).firstFault).toBe(1);
  });
  it('heed the assumptions', () => {
    expect(check(['A=\\pi r^2', 'r=\\sqrt{\\frac{A}{\\pi}}']).firstFault).toBe(1);
    expect(check(['A=\\pi r^2', 'r=\\sqrt{\\frac{A}{\\pi}}'], {}, ['r>0']).outcome).toBe('sound');
  });
});

describe('other rules', () => {
  it('a lost pair of brackets is a note when the next line has them in mind', () => {
    const verdict = check(['3(x+2)-4(x-1)', '3x+6-4x-4', '-x+10']);
    expect(verdict.outcome).toBe('sound');
    expect(step(verdict, 1)).toMatchObject({ notes: ['presentation'] });
    expect(step(verdict, 1).evidence.meant).toBeDefined();
    expect(check(['3(x+2)-4(x-1)', '3x+6-4x-4', '-x+2']).firstFault).toBe(1);
    expect(check(['3(x+2)-4(x-1)', '3x+6-4x-4', '-x+10'], { presentation: 'fault' }).firstFault).toBe(1);
  });

  it('an approximate value fits what rounds to it, and truncation does not', () => {
    expect(check(['\\frac23', '\\approx 0.67']).outcome).toBe('sound');
    expect(check(['\\frac23', '\\approx 0.66']).firstFault).toBe(1);
    expect(check(['x^2=2', 'x=\\pm\\sqrt2', 'x\\approx\\pm1.414', 'x\\approx\\pm1.41']).outcome).toBe('sound');
  });

  it('a value that narrows the domain narrows it for later lines', () => {
    const verdict = check(['\\ln(x^2)', '2\\ln x', '2\\ln |x|']);
    expect(verdict.outcome).toBe('sound');
    expect(step(verdict, 1).notes).toEqual(['domain']);
  });

  it('a miscopied given is the first fault, with its note', () => {
    const verdict = check(['3x+5=11', '3x+5=17', '3x=12', 'x=4']);
    expect(verdict.firstFault).toBe(1);
    expect(step(verdict, 1).notes).toContain('given-miscopied');
  });

  it('whole-number letters are compared as whole numbers', () => {
    expect(check(['2n+1>6', 'n\\ge 3'], {}, ['n\\in\\mathbb{Z}']).outcome).toBe('sound');
    expect(check(['2n+1>6', 'n\\ge 3']).firstFault).toBe(1);
  });
});
