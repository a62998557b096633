import { describe, expect, it } from 'vitest';
import { remember } from '../../api/lib/remember.ts';

describe('what is remembered', () => {
  it('is asked for once, also by two at once', async () => {
    const asked: string[] = [];
    const recall = remember<string>(2);
    const ask = (key: string) => recall(key, async () => (asked.push(key), `of ${key}`));
    expect(await Promise.all([ask('a'), ask('a')])).toEqual(['of a', 'of a']);
    await ask('b');
    await ask('a');
    await ask('c');
    expect(asked).toEqual(['a', 'b', 'c']);
    await ask('b');
    expect(asked).toEqual(['a', 'b', 'c', 'b']);
  });

  it('is asked for again after a failure', async () => {
    const recall = remember<number>(2);
    await expect(recall('a', () => Promise.reject(new Error('busy')))).rejects.toThrow('busy');
    expect(await recall('a', async () => 1)).toBe(1);
  });
});
