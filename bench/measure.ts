/** Middle value; of an even number the upper one of the two in the middle. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)]!;
}

/** Milliseconds that one call takes. */
export function timeMs(run: () => void): number {
  const start = performance.now();
  run();
  return performance.now() - start;
}

/** Milliseconds of processor time that one call takes: a busy machine makes it wait, but not work longer. */
export function cpuMs(run: () => void): number {
  const start = process.cpuUsage();
  run();
  return cpuSince(start);
}

/** Milliseconds of processor time since `process.cpuUsage()` gave `start`. */
export function cpuSince(start: NodeJS.CpuUsage): number {
  const { user, system } = process.cpuUsage(start);
  return (user + system) / 1e3;
}

/**
 * Times of several runs in rounds, so that a busy machine troubles all alike: every run has its turn in each
 * round. `ratio` is to the first run of the same round.
 *
 * @returns per run, medians over the rounds
 */
export function timeInRounds(runs: readonly (() => void)[], rounds: number): { ms: number; ratio: number }[] {
  for (const run of runs) run();
  const times = Array.from({ length: rounds }, () => runs.map(timeMs));
  return runs.map((_, k) => ({
    ms: median(times.map((round) => round[k]!)),
    ratio: median(times.map((round) => round[k]! / round[0]!)),
  }));
}

/** Bytes that one call allocates, over many calls without a collection between them. */
export function bytesPerCall(run: () => void, calls: number): number {
  const { gc } = globalThis;
  if (!gc) throw new Error('run with --expose-gc');
  gc();
  const before = process.memoryUsage().heapUsed;
  for (let k = 0; k < calls; k++) run();
  return (process.memoryUsage().heapUsed - before) / calls;
}

/**
 * Milliseconds of the quickest call, after calls that make the just-in-time compiler settle: for what is compared with
 * another process, which no rounds can be shared with, and which something else on the machine may slow down.
 */
export function quickestMs(run: () => void, calls: number): number {
  let least = Number.POSITIVE_INFINITY;
  for (let k = 0; k < 2 * calls; k++) {
    const ms = timeMs(run);
    if (k >= calls) least = Math.min(least, ms);
  }
  return least;
}

export function title(text: string): void {
  console.log(`\n${text}`);
}

/** A number in a column, with as many decimals as its size deserves. */
export function column(value: number, width: number): string {
  const decimals = value >= 100 ? 0 : value >= 10 ? 1 : 2;
  return value.toFixed(decimals).padStart(width);
}
