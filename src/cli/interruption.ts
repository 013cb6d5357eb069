import { exitCodes } from './exit-codes.js';

/** Listens for the wish to stop while a run is under way. */
export interface Interruption {
  readonly signal: AbortSignal;
  /** Gives the signals back to the system. */
  readonly release: () => void;
}

/**
 * The first Ctrl-C (or a request to terminate) asks the run to deliver what is finished; a second Ctrl-C ends at once.
 *
 * @param onFirst told once, to let the person know that the wish was heard
 */
export function listenForInterruption(onFirst: () => void): Interruption {
  const controller = new AbortController();
  const ask = () => {
    if (controller.signal.aborted) return false;
    controller.abort();
    onFirst();
    return true;
  };
  const onInterrupt = () => {
    if (!ask()) process.exit(exitCodes.interrupted);
  };
  const onTerminate = () => {
    ask();
  };
  process.on('SIGINT', onInterrupt);
  process.on('SIGTERM', onTerminate);
  return {
    signal: controller.signal,
    release: () => {
      process.off('SIGINT', onInterrupt);
      process.off('SIGTERM', onTerminate);
    },
  };
}
