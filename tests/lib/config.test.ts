import { describe, expect, it } from 'vitest';
import { ConfigError, readConfig } from '../../api/lib/config.ts';

const database = 'postgres://me:pw@127.0.0.1:5432/slipstone';
const production = {
  NODE_ENV: 'production',
  DATABASE_URL: database,
  BASE_URL: 'https://slipstone.school.test/',
  SLIPSTONE_SECRET: 'x'.repeat(32),
  SMTP_URL: 'smtps://me:pw@mail.school.test',
  MAIL_FROM: 'Slipstone <slipstone@school.test>',
};

describe('settings', () => {
  it('have defaults for trying out on one machine', () => {
    expect(readConfig({ DATABASE_URL: database })).toMatchObject({
      demo: true,
      production: false,
      port: 4600,
      baseUrl: 'http://127.0.0.1:4600',
      smtpUrl: null,
    });
  });

  it('have no demo in production and a base address without a slash', () => {
    expect(readConfig(production)).toMatchObject({
      demo: false,
      production: true,
      baseUrl: 'https://slipstone.school.test',
      clientFromSources: false,
    });
  });

  it('name each setting that production lacks', () => {
    const read = () => readConfig({ NODE_ENV: 'production' });
    for (const name of ['DATABASE_URL', 'BASE_URL', 'SLIPSTONE_SECRET', 'SMTP_URL', 'MAIL_FROM']) {
      expect(read).toThrow(new RegExp(`${name} is missing: `));
    }
    expect(read).toThrow(ConfigError);
  });

  it('name each setting that is wrong, without showing its value', () => {
    const read = () =>
      readConfig({ ...production, SLIPSTONE_SECRET: 'short', PORT: 'eighty', SMTP_URL: 'http://x', MAIL_FROM: 'me' });
    for (const name of ['SLIPSTONE_SECRET', 'PORT', 'SMTP_URL', 'MAIL_FROM'])
      expect(read).toThrow(new RegExp(`  ${name}: `));
    expect(read).not.toThrow(/short/);
  });

  it('treat an empty setting as a missing one', () => {
    expect(() => readConfig({ ...production, DATABASE_URL: '' })).toThrow(/DATABASE_URL is missing/);
  });

  it('refuse an environment that nobody knows', () => {
    expect(() => readConfig({ DATABASE_URL: database, NODE_ENV: 'staging' })).toThrow(/NODE_ENV/);
  });

  it('takes an address in the open only on the machine itself', () => {
    expect(() => readConfig({ ...production, BASE_URL: 'http://slipstone.school.test' })).toThrow(
      /BASE_URL: must begin with https/,
    );
    expect(readConfig({ ...production, BASE_URL: 'http://127.0.0.1:4600' }).baseUrl).toBe('http://127.0.0.1:4600');
  });
});
