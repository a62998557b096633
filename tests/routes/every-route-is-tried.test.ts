import { describe, expect, it } from 'vitest';
import { composeServices, type Platform } from '../../api/services.ts';
import { findMissingCases, readRouteLog, toRouteName } from '../support/route-log.ts';

// Only the declarations are read, so nothing of the platform is ever called.
const platform = { config: { baseUrl: '' }, mailbox: {} } as unknown as Platform;
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
