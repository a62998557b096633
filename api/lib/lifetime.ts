import type { Logger } from './logger.ts';

/** What has been opened and must be closed, last opened first. */
export interface Lifetime {
  onStop(close: () => unknown): void;
  isStopping(): boolean;
}

/** Ends the process in order on a signal, and when the program that started us has gone. */
export function createLifetime(logger: Logger): Lifetime {
  const closers: (() => unknown)[] = [];
  let stopping = false;

  async function stop(reason: string): Promise<void> {
    if (stopping) return;
    stopping = true;
    logger.info({ reason }, 'stopping');
    for (const close of closers.toReversed()) {
      try {
        await close();
      } catch (error) {
        logger.error({ err: error }, 'could not close');
      }
    }
    process.exit(0);
  }

  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => void stop(signal));
  // Started by `npm start`, which has been killed: nobody would be left to stop us.
  process.on('disconnect', () => void stop('disconnect'));
  return { onStop: (close) => closers.push(close), isStopping: () => stopping };
}
