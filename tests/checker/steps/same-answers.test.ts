import { execFile } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { describe, expect, it } from 'vitest';

const run = promisify(execFile);
const script = fileURLToPath(new URL('answers.ts', import.meta.url));

async function answersOf(...order: string[]): Promise<string[]> {
  const { stdout } = await run(process.execPath, ['--import', 'tsx', script, ...order], { maxBuffer: 2 ** 26 });
  return stdout.trimEnd().split('\n');
}

describe('the answers to 500 inputs, with all evidence', () => {
  it('are the same in another process that was asked other things before, and in another order', async () => {
    const plain = await answersOf();
    const after = await answersOf('after');
    expect(plain).toHaveLength(500);
    expect(after.filter((answer, k) => answer !== plain[k])).toEqual([]);
  }, 300_000);
});
