import { say } from './terminal.ts';

/** Says how far a long piece of work has come. */
export interface Progress {
  /** @param done  of the total, with what was done before this run */
  tell(done: number, failed: number): void;
  end(): void;
}

/** On a terminal the bar is redrawn so often at most; elsewhere a line stands for so long [ms]. */
const FRAME_MS = 100;
const LINE_MS = 10_000;

/** A bar on a terminal, a line now and then elsewhere, nothing where quiet was asked for. */
export async function createProgress(total: number, before: number, quiet: boolean): Promise<Progress> {
  if (quiet) return { tell() {}, end() {} };
  const began = performance.now();
  const state = (done: number, failed: number) => {
    const seconds = (performance.now() - began) / 1e3;
    const rate = (done - before) / Math.max(seconds, 1e-3);
    return {
      rate: rate >= 10 ? rate.toFixed(0) : rate.toPrecision(2),
      left: rate > 0 ? duration((total - done) / rate) : '?',
      not: failed === 0 ? '' : `, ${failed} not closed`,
    };
  };
  let told = began;
  if (!process.stderr.isTTY) {
    return {
      tell(done, failed) {
        if (done === total || performance.now() - told < LINE_MS) return;
        told = performance.now();
        const { rate, left, not } = state(done, failed);
        say(`${done} of ${total} cases, ${rate} a second, ${left} left${not}`);
      },
      end() {},
    };
  }
  const { SingleBar } = (await import('cli-progress')).default;
  const bar = new SingleBar({
    format: '{bar} {value} of {total} cases, {rate} a second, {left} left{not}',
    stream: process.stderr,
    barCompleteChar: '#',
    barIncompleteChar: '.',
    barsize: 30,
    hideCursor: false,
    clearOnComplete: true,
    noTTYOutput: false,
  });
  bar.start(total, before, state(before, 0));
  return {
    tell(done, failed) {
      if (done < total && performance.now() - told < FRAME_MS) return;
      told = performance.now();
      bar.update(done, state(done, failed));
    },
    end: () => bar.stop(),
  };
}

function duration(seconds: number): string {
  if (seconds < 100) return `${Math.ceil(seconds)} s`;
  if (seconds < 6000) return `${Math.ceil(seconds / 60)} min`;
  return `${(seconds / 3600).toPrecision(2)} h`;
}
