/** A percentile of a sample and how far chance may have moved it. */
export interface Percentile {
  /** e.g. 95 */
  readonly percent: number;
  readonly value: number;
  /** holds the true percentile with 95 % confidence; an end is null where the sample is too small to tell */
  readonly low: number | null;
  readonly high: number | null;
}

export interface Summary {
  readonly count: number;
  readonly mean: number;
  /** of the sample, n − 1 in the denominator */
  readonly sd: number;
  /** standard error of the mean */
  readonly meanError: number;
  /** all values are the same but for what closing a loop leaves open */
  readonly steady: boolean;
  readonly percentiles: readonly Percentile[];
}

/** What a sample says of a figure. @param values  finite, at least one */
export function summarise(values: Float64Array, percents: readonly number[]): Summary {
  const count = values.length;
  const mean = meanOf(values);
  let squares = 0;
  for (const value of values) squares += (value - mean) ** 2;
  const sd = count > 1 ? Math.sqrt(squares / (count - 1)) : 0;
  const sorted = values.toSorted();
  return {
    count,
    mean,
    sd,
    meanError: sd / Math.sqrt(count),
    steady: sorted.at(-1)! - sorted[0]! <= STEADY * Math.max(Math.abs(sorted[0]!), Math.abs(sorted.at(-1)!)),
    percentiles: percents.map((percent) => ({
      percent,
      value: quantileOf(sorted, percent / 100),
      ...rangeOf(sorted, percent / 100),
    })),
  };
}

/** What closing a loop and reaching an aim leave open, relative [-]: recycles close to 1e-9, aims to 1e-8. */
const STEADY = 1e-7;

export function meanOf(values: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i];
  return sum / values.length;
}

/** Linear between the values in order. @source R. J. Hyndman & Y. Fan, Am. Statist. 50 (1996) 361, definition 7 */
function quantileOf(sorted: Float64Array, share: number): number {
  const at = share * (sorted.length - 1);
  const below = Math.floor(at);
  const next = Math.min(below + 1, sorted.length - 1);
  return sorted[below] + (at - below) * (sorted[next] - sorted[below]);
}

/**
 * 95 % confidence by the ranks of the values around a percentile, whatever the distribution: how many of n values drawn at
 * random lie below it is binomial. Evenly spread points (Sobol, Latin hypercube) do better; the range is on the safe side.
 *
 * @source W. J. Conover, Practical Nonparametric Statistics, 3rd ed., Wiley 1999, section 3.2
 */
function rangeOf(sorted: Float64Array, share: number): { low: number | null; high: number | null } {
  const n = sorted.length;
  let low: number | null = null;
  let high: number | null = null;
  let lnTerm = n * Math.log1p(-share);
  let below = 0;
  for (let k = 0; k < n && high === null; k++) {
    // below: the chance that fewer than k + 1 values lie under the percentile
    below += Math.exp(lnTerm);
    if (below <= 0.025) low = sorted[k];
    if (below >= 0.975) high = sorted[k];
    lnTerm += Math.log(((n - k) / (k + 1)) * (share / (1 - share)));
  }
  return { low, high };
}

/**
 * Correlation of the ranks (Spearman); ties have the mean of their ranks. NaN where one of the two does not vary.
 * @source C. Spearman, Am. J. Psychol. 15 (1904) 72
 */
export function rankCorrelation(x: Float64Array, y: Float64Array): number {
  return correlationOfRanks(ranksOf(x), ranksOf(y));
}

/** The same of ranks; of any numbers it is that of Pearson. */
export function correlationOfRanks(x: Float64Array, y: Float64Array): number {
  const meanX = meanOf(x);
  const meanY = meanOf(y);
  let xx = 0;
  let xy = 0;
  let yy = 0;
  for (let i = 0; i < x.length; i++) {
    xx += (x[i] - meanX) ** 2;
    xy += (x[i] - meanX) * (y[i] - meanY);
    yy += (y[i] - meanY) ** 2;
  }
  return xx === 0 || yy === 0 ? Number.NaN : xy / Math.sqrt(xx * yy);
}

/** The rank of each value, from 0; ties have the mean of their ranks. */
export function ranksOf(values: Float64Array): Float64Array {
  const order = Uint32Array.from(values, (_, i) => i).sort((a, b) => values[a] - values[b]);
  const ranks = new Float64Array(values.length);
  for (let from = 0; from < order.length; ) {
    let to = from + 1;
    while (to < order.length && values[order[to]] === values[order[from]]) to += 1;
    for (let k = from; k < to; k++) ranks[order[k]] = (from + to - 1) / 2;
    from = to;
  }
  return ranks;
}
