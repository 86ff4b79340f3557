import { exitCodes } from './exit-codes.ts';
import { say } from './terminal.ts';

/** Somebody asked the program to stop: Ctrl-C, or a system that is shut down. */
export class Stopped extends Error {
  readonly signal: 'SIGINT' | 'SIGTERM';

  constructor(signal: 'SIGINT' | 'SIGTERM') {
    super(`stopped by ${signal}`);
    this.name = 'Stopped';
    this.signal = signal;
  }
}

/**
 * While the body runs, SIGINT and SIGTERM ask it to come to an orderly end, by an AbortSignal whose reason is a Stopped. A
 * second one ends the program at once, as it would without this.
 */
export async function stoppable<T>(body: (signal: AbortSignal) => Promise<T>): Promise<T> {
  const controller = new AbortController();
  const stop = (signal: 'SIGINT' | 'SIGTERM') => {
    forget();
    controller.abort(new Stopped(signal));
  };
  const forget = () => {
    process.off('SIGINT', stop);
    process.off('SIGTERM', stop);
  };
  process.on('SIGINT', stop);
  process.on('SIGTERM', stop);
  try {
    return await body(controller.signal);
  } finally {
    forget();
  }
}

/** Say in a line what became of the work, and set the exit code that shells know for a signal: 128 and its number. */
export function tellStopped({ signal }: Stopped, kept: string): void {
  say(`looptally: ${signal === 'SIGINT' ? 'interrupted' : 'asked to stop'}: ${kept}`);
  process.exitCode = signal === 'SIGINT' ? exitCodes.interrupted : exitCodes.terminated;
}
