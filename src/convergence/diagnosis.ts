import type { Closure, PassRecord } from './driver.ts';

export type Trend =
  /** the variable grows by about as much in every pass, however far it has come: more enters than leaves */
  | 'accumulating'
  /** guess and answer change sides from pass to pass */
  | 'oscillating'
  | 'converging'
  | 'diverging'
  /** neither better nor worse */
  | 'stalled'
  /** too few good passes to tell */
  | 'unknown';

/** Why a recycle did not close, as far as the trace tells. */
export interface Diagnosis {
  /** index of the worst variable, −1 when no pass was good */
  readonly worst: number;
  /** how much the worst variable gains per pass at the end, G(x) − x [unit of the variable] */
  readonly gain: number;
  readonly trend: Trend;
  /** factor of the residual from pass to pass; null when unknown */
  readonly rate: number | null;
  /** further passes at that rate until the tolerance is met; null unless converging */
  readonly passesToGo: number | null;
}

/** Passes looked at. */
const WINDOW = 12;
/** Passes needed to speak of a trend. */
const FEWEST = 4;
/** A rate within this of 1 is neither better nor worse; slower than a purge of 0.01 % deserves no hope. */
const FLAT = 1e-5;

/** Read the trend of the last passes of a closure. */
export function diagnose(closure: Pick<Closure, 'history'>, tolerance: number): Diagnosis {
  const good = closure.history.filter((record) => Number.isFinite(record.residual));
  const last = good[good.length - 1];
  if (last === undefined) return { worst: -1, gain: NaN, trend: 'unknown', rate: null, passesToGo: null };
  const window = good.slice(-WINDOW);
  const rate = window.length >= FEWEST ? geometricRate(window) : null;
  const trend = trendOf(window, rate);
  const far = Math.max(last.residual, last.error, last.extraError);
  const passesToGo =
    trend === 'converging' && rate !== null && far > tolerance
      ? Math.ceil(Math.log(tolerance / far) / Math.log(rate))
      : null;
  return { worst: last.worst, gain: last.answer - last.guess, trend, rate, passesToGo };
}

function trendOf(window: readonly PassRecord[], rate: number | null): Trend {
  if (rate === null) return 'unknown';
  if (isAccumulating(window)) return 'accumulating';
  if (isOscillating(window) && rate > 1 - FLAT) return 'oscillating';
  if (rate < 1 - FLAT) return 'converging';
  return rate > 1 + FLAT ? 'diverging' : 'stalled';
}

/** exp of the slope of ln(residual) over the pass, by least squares. */
function geometricRate(window: readonly PassRecord[]): number | null {
  let n = 0;
  let sumP = 0;
  let sumL = 0;
  let sumPP = 0;
  let sumPL = 0;
  for (const { pass, residual } of window) {
    if (residual <= 0) return null;
    const l = Math.log(residual);
    n++;
    sumP += pass;
    sumL += l;
    sumPP += pass * pass;
    sumPL += pass * l;
  }
  return Math.exp((n * sumPL - sumP * sumL) / (n * sumPP - sumP * sumP));
}

/** The same variable worst throughout, always gaining about the same, while it has come many gains further. */
function isAccumulating(window: readonly PassRecord[]): boolean {
  const first = window[0];
  const last = window[window.length - 1];
  const gains = window.map((record) => record.answer - record.guess);
  const least = Math.min(...gains);
  const most = Math.max(...gains);
  const same = window.every((record) => record.worst === first.worst);
  return same && least > 0 && most < 1.02 * least && last.guess - first.guess > (FEWEST - 1) * 0.98 * least;
}

/** The same variable worst throughout, its residual changing sign every time. */
function isOscillating(window: readonly PassRecord[]): boolean {
  return window.every((record, k) => {
    const before = window[k - 1];
    if (before === undefined) return true;
    if (record.worst !== before.worst) return false;
    return (record.answer - record.guess) * (before.answer - before.guess) < 0;
  });
}
