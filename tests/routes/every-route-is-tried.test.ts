import { describe, expect, it } from 'vitest';
import { createDataSource } from '../../api/db/data-source.ts';
import { composeServices, type Platform } from '../../api/services.ts';
import { findMissingCases, readRouteLog, toRouteName } from '../support/route-log.ts';

// Only the declarations are read, so nothing of the platform is ever opened or called.
const platform = {
  config: { baseUrl: 'http://slipstone.test' },
  db: createDataSource('postgres://nobody@127.0.0.1:1/none'),
  mailbox: { list: () => [] },
  checks: {},
} as unknown as Platform;
const { routes } = composeServices(platform);
const calls = readRouteLog();

describe('the API tests of this run', () => {
  it('have been run before this', () => {
    expect(calls.length).toBeGreaterThan(0);
  });

  it.each(routes.map((route) => [toRouteName(route), route] as const))('tried every case of %s', (_name, route) => {
    expect(findMissingCases(route, calls)).toEqual([]);
  });

  it('declare no address twice', () => {
    const names = routes.map(toRouteName);
    expect(names.filter((name, i) => names.indexOf(name) !== i)).toEqual([]);
  });
});
