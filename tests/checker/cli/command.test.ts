import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { beforeAll, describe, expect, it } from 'vitest';
import { verdictSchema } from '../../../shared/schemas/verdict.ts';

const root = fileURLToPath(new URL('../../../', import.meta.url));

function run(input: string, ...args: string[]): { status: number | null; out: string[]; err: string } {
  const command = ['--silent', 'run', 'verdicts', ...(args.length > 0 ? ['--', ...args] : [])];
  const { status, stdout, stderr } = spawnSync('npm', command, { cwd: root, input, encoding: 'utf8' });
  return { status, out: stdout.split('\n').slice(0, -1), err: stderr };
}

/** What is sent, and the start of what has to come back. */
const sent: readonly (readonly [text: string, answer: Record<string, unknown> | null])[] = [
  ['\uFEFF{"id":"bom","lines":["2(x+1)","2x+2"]}', { id: 'bom', outcome: 'sound', firstFault: null }],
  ['{"id":7,"lines":["2(x+1)","2x+1","2x+1"]}', { id: 7, outcome: 'faulty', firstFault: 1 }],
  ['{"lines":["x+x","2x"]}', { id: null, outcome: 'sound' }],
  ['{bad', { id: null, error: { message: expect.any(String) } }],
  ['', null],
  ['[]', { id: null, error: { message: expect.any(String) } }],
  ['{"id":"none"}', { id: 'none', error: { message: expect.stringContaining('lines') } }],
  ['{"id":"empty","lines":[]}', { id: 'empty', error: { message: expect.stringContaining('lines') } }],
  ['{"id":"one","lines":["x+1"]}', { id: 'one', outcome: 'sound', firstFault: null, steps: [] }],
  ['{"id":"type","lines":["x",3]}', { id: 'type', error: { message: expect.stringContaining('lines.1') } }],
  ['{"id":"odd","lines":["x","x"],"settings":{"colour":1}}', { id: 'odd', outcome: 'sound' }],
  [
    '{"id":"value","lines":["x","x"],"settings":{"numbers":"odd"}}',
    { id: 'value', error: { message: expect.stringContaining('settings.numbers') } },
  ],
  ['{"id":"null","lines":["x","x"],"assume":null,"settings":null}', { id: 'null', outcome: 'sound' }],
  ['{"id":"unread","lines":["2x","2x+)","2x"]}', { id: 'unread', outcome: 'undecided', firstFault: null }],
  ['{"id":"assume","lines":["\\\\sqrt{x^2}","x"],"assume":["x>0"]}', { id: 'assume', outcome: 'sound' }],
  ['{"id":"numbers","lines":["\\\\sqrt{-9}","3i"],"settings":{"numbers":"complex"}}', { outcome: 'sound' }],
  ['{"id":"reversible","lines":["x=2","x^2=4"],"settings":{"reversible":true}}', { outcome: 'faulty', firstFault: 1 }],
  ['{"id":"one-way","lines":["x=2","x^2=4"]}', { outcome: 'sound' }],
  ['{"id":"running","lines":["3+4","=7+2=9"]}', { outcome: 'faulty', firstFault: 1 }],
  ['{"id":"noted","lines":["3+4","=7+2=9"],"settings":{"presentation":"note"}}', { outcome: 'sound' }],
  ['{"id":"noted","lines":["3+4","=7+2=9"],"settings":{"presentation":true}}', { outcome: 'sound' }],
  ['{"id":"C","lines":["\\\\int 2x\\\\,dx","x^2"],"settings":{"constant":true}}', { outcome: 'faulty' }],
  ['{"id":"C","lines":["\\\\int 2x\\\\,dx","x^2"]}', { outcome: 'sound' }],
  ['{"id":"comma","lines":["2,5\\\\cdot 2","5"],"settings":{"decimal":"comma"}}', { outcome: 'sound' }],
  ['{"id":"comma","lines":["2,5\\\\cdot 2","5"],"settings":{"decimal":","}}', { outcome: 'sound' }],
  ['{"id":"x","lines":["ax_1=b","ax_1=b+1"],"settings":{"unknown":"x_{1}"}}', { outcome: 'faulty', firstFault: 1 }],
  ['{"id":"x","lines":["ax_1=b","ax_1=b+1"]}', { outcome: 'undecided', firstFault: null }],
  ['{"id":"goal","lines":["(x+1)^2","x^2+2x+1"],"settings":{"goal":"expanded"}}', { outcome: 'sound' }],
  [
    JSON.stringify({ id: 'long', lines: Array.from({ length: 200 }, (_, k) => `x+${k}-${k}`) }),
    { id: 'long', outcome: 'sound' },
  ],
  [JSON.stringify({ id: 'wide', lines: ['x+'.repeat(60_000), 'x'] }), { id: 'wide', outcome: 'undecided' }],
];

describe('the command', { timeout: 60_000 }, () => {
  let answers: ReturnType<typeof run>;
  beforeAll(() => {
    // The first run after a change of the sources says that it builds.
    run('');
    answers = run(sent.map(([text]) => text).join('\r\n'));
  }, 120_000);

  it('answers each line in order, whatever stands in it', () => {
    const { status, out, err } = answers;
    expect([status, err]).toEqual([0, '']);
    const wanted = sent.flatMap(([, answer]) => (answer ? [answer] : []));
    const found = out.map((line) => JSON.parse(line) as Record<string, unknown>);
    expect(found).toHaveLength(wanted.length);
    found.forEach((answer, k) => {
      expect(answer).toMatchObject(wanted[k] ?? {});
      if ('error' in answer) return expect(Object.keys(answer)).toEqual(['id', 'error']);
      expect(Object.keys(answer)).toEqual(['id', 'outcome', 'firstFault', 'steps', 'ms']);
      const { outcome, firstFault, steps } = verdictSchema.parse(answer);
      expect(typeof firstFault === 'number').toBe(outcome === 'faulty');
      steps.forEach((step, at) => {
        expect(Object.keys(step)).toEqual(['step', 'ruling', 'reached', 'notes', 'evidence']);
        expect(step.step).toBe(at + 1);
        expect(step.reached === null).toBe(step.ruling === 'undecided');
      });
    });
  });

  it('names the line, the place and what was expected on both sides of a line that it cannot read', () => {
    const answer = answers.out.find((line) => line.startsWith('{"id":"unread"'));
    const { steps } = verdictSchema.parse(JSON.parse(answer ?? '{}'));
    expect(steps.map(({ ruling }) => ruling)).toEqual(['undecided', 'undecided']);
    for (const { evidence } of steps) {
      expect(evidence.error).toMatchObject({ line: 1, place: { start: 3, end: 4 }, found: ')' });
      expect(evidence.error?.expected).toContain('number');
    }
  });

  it('explains the same for people', () => {
    const { status, out } = run(sent.map(([text]) => text).join('\n'), '--explain');
    expect(status).toBe(0);
    const text = out.join('\n');
    expect(text).toContain('7: The first fault is step 1.');
    expect(text).toContain('Something is missing, at “)” (character 4). Put a number, a letter or an opening bracket');
    expect(text).toContain('none: cannot be read: lines');
  });
});
