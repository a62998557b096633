import { describe, expect, it } from 'vitest';
import { createLogger, toLoggedPath } from '../../api/lib/logger.ts';

function logged(data: object): string {
  let written = '';
  createLogger('info', { write: (line) => (written += line) }).info(data, 'said');
  return written;
}

describe('the log', () => {
  it('leaves out whatever is named like a secret', () => {
    const line = logged({
      password: 'hunter2',
      body: { newPassword: 'hunter2', token: 'hunter2' },
      req: { headers: { cookie: 'hunter2' } },
    });
    expect(line).toContain('[left out]');
    expect(line).not.toContain('hunter2');
  });

  it('masks the secret of a link and its query, and keeps ids', () => {
    expect(toLoggedPath('/api/resets/Zk3v9w8aQ7c2m1n0b5x4y6?password=hunter2')).toBe('/api/resets/[token]');
    const id = '0b8f5c1e-4c1d-4f0e-9a57-3f1f6c0d2b11';
    expect(toLoggedPath(`/api/classes/${id}`)).toBe(`/api/classes/${id}`);
  });
});
