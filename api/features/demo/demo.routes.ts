import { route, type Route } from '../../http/route.ts';
import type { DemoService } from './demo.service.ts';

/** Mounted in the demo only. */
export function demoRoutes(demo: DemoService): Route[] {
  return [route({ method: 'get', path: '/demo/accounts', who: 'anyone', handle: () => demo.listAccounts() })];
}
