import { QueryFailedError } from 'typeorm';
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

  it('keeps what a failed query was asked with to itself', () => {
    const failed = new QueryFailedError('insert into person values ($1)', ['hunter2'], new Error('duplicate key'));
    Object.assign(failed.driverError, { code: '23505', detail: 'Key (email)=(hunter2) already exists.' });
    Object.assign(failed, failed.driverError);
    const line = logged({ err: failed });
    expect(line).toContain('duplicate key');
    expect(line).toContain('insert into person');
    expect(line).not.toContain('hunter2');
  });

  it('masks the secret of a link and its query, and keeps ids', () => {
    expect(toLoggedPath('/api/resets/Zk3v9w8aQ7c2m1n0b5x4y6?password=hunter2')).toBe('/api/resets/[token]');
    expect(toLoggedPath(`/api/unsubscribe/${'a'.repeat(40)}.${'b'.repeat(43)}`)).toBe('/api/unsubscribe/[token]');
    expect(toLoggedPath('/assets/index-CQwL3RRk-and-more.js')).toBe('/assets/index-CQwL3RRk-and-more.js');
    const id = '0b8f5c1e-4c1d-4f0e-9a57-3f1f6c0d2b11';
    expect(toLoggedPath(`/api/classes/${id}`)).toBe(`/api/classes/${id}`);
  });
});
