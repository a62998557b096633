import { FirstSchema1764547200000 } from './migrations/1764547200000-first-schema.ts';

/** In the order in which they run. */
export const migrations = [FirstSchema1764547200000];
