import { createRequire } from 'node:module';
import type nerdamer from 'nerdamer';

type Nerdamer = typeof nerdamer;

const load = createRequire(import.meta.url);
let loaded: Nerdamer | null = null;

/** A new copy of the library with nothing in it: it keeps state from question to question, and after an error more so. */
function loadFresh(): Nerdamer {
  for (const file of Object.keys(load.cache)) {
    if (file.includes('nerdamer')) delete load.cache[file];
  }
  const fresh = load('nerdamer') as Nerdamer;
  load('nerdamer/Algebra.js');
  load('nerdamer/Calculus.js');
  return fresh;
}

/**
 * What nerdamer makes of a command, as TeX; null after an error. It is often wrong, so whatever it answers is a guess
 * that the checker has to confirm. Only for questions that are known to end: it can run for minutes on others.
 */
export function askNerdamer(command: string): string | null {
  loaded ??= loadFresh();
  try {
    loaded.flush();
    loaded.clearVars();
    return loaded(command).toTeX();
  } catch {
    // Whatever it threw, its state is not to be trusted any more.
    loaded = null;
    return null;
  }
}
