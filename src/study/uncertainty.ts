import { correlationFactor } from '../flowsheet/correlation-matrix.ts';
import type { NumericSetting } from '../flowsheet/numeric-settings.ts';
import { spreadableSettings } from '../flowsheet/spreads.ts';
import type { Flowsheet, Formula } from '../model/flowsheet.ts';
import type { Spread } from '../model/spread.ts';
import { createDistribution, type Distribution } from './distribution.ts';
import { createDrawnSettings } from './drawn-settings.ts';
import { countFailures, type FailureCount } from './failures.ts';
import { groupShare, groupsOf } from './rank-shares.ts';
import { runCases, type SampleTable } from './sample-cases.ts';
import { type SamplingMethod, unitPoints, valuesAt } from './sampling.ts';
import { type SobolIndices, saltelliPlan, sobolIndices } from './sobol-indices.ts';
import { ranksOf, type Summary, summarise } from './statistics.ts';

export interface UncertaintyOptions {
  readonly samples: number;
  readonly seed: number;
  readonly method: SamplingMethod;
  /** how the shares of the spreads are found: by ranks from the sample itself, or by further cases after Saltelli */
  readonly shares: 'rank' | 'sobol';
  readonly percentiles: readonly number[];
  readonly record: readonly Formula[];
  /** told after every case */
  readonly progress?: (done: number, total: number, failed: number) => void;
}

/** A spread as it was drawn from. */
export interface DrawnSpread {
  readonly spread: Spread;
  readonly setting: NumericSetting;
  readonly distribution: Distribution;
}

/** What a spread has to do with a figure. */
export interface Share {
  readonly path: string;
  /** of the ranks (Spearman); null where one of the two does not vary */
  readonly rankCorrelation: number | null;
  /** share of the variance of the figure's ranks, of all in `together` where it varies with others */
  readonly rankShare: number | null;
  /** the spreads that it varies together with, itself among them; alone where it varies by itself */
  readonly together: readonly string[];
  readonly sobol: SobolIndices | null;
}

export interface FigureSpread {
  /** as recorded */
  readonly expression: string;
  /** with everything as in the file; null where that has no value */
  readonly asInFile: number | null;
  /** null where no case has a value */
  readonly summary: Summary | null;
  /** name of the aim that holds it at one value in every case; null where none does */
  readonly heldBy: string | null;
  readonly shares: readonly Share[];
}

export interface Uncertainty {
  readonly flowsheet: Flowsheet;
  readonly options: UncertaintyOptions;
  readonly spreads: readonly DrawnSpread[];
  readonly figures: readonly FigureSpread[];
  /** the sample that the percentiles are of; with Sobol indices the cases behind the first `samples` are theirs alone */
  readonly table: SampleTable;
  /** cases beyond the sample, made for the Sobol indices */
  readonly extraCases: number;
  /** cases of the sample that did not close, and of the extra ones */
  readonly failed: number;
  readonly extraFailed: number;
  readonly failures: readonly FailureCount[];
}

/**
 * Draw samples of what is spread, close each, and say what that makes of the figures recorded.
 *
 * Cases that do not close have no part in the statistics and are counted by their reasons.
 *
 * @throws RangeError beyond the dimensions of the Sobol sequence
 */
export function uncertainty(flowsheet: Flowsheet, options: UncertaintyOptions): Uncertainty {
  const { samples, seed, method, shares, record } = options;
  const spreads = drawnSpreads(flowsheet);
  const size = spreads.length;
  const distributions = spreads.map(({ distribution }) => distribution);
  const plan =
    shares === 'sobol'
      ? saltelliPlan(unitPoints(method, samples, 2 * size, seed), size)
      : unitPoints(method, samples, size, seed);
  const drawn = valuesAt(plan, distributions, factorOf(flowsheet));
  const settings = createDrawnSettings(
    flowsheet,
    spreads.map(({ spread }) => spread.path),
  );
  const progress = options.progress ?? (() => {});
  const inFile = Float64Array.from(spreads, ({ setting }) => setting.value);
  const table = runCases(flowsheet, settings, record, inFile, drawn, progress);
  const asInFile = runCases(flowsheet, settings, record, inFile, inFile, () => {}).found;
  const failedIn = (from: number, to: number) =>
    table.converged.subarray(from, to).reduce((count, closed) => count + (closed ? 0 : 1), 0);
  return {
    flowsheet,
    options,
    spreads,
    figures: record.map(({ text }, r) => ({
      expression: text,
      asInFile: orNull(asInFile[r]),
      ...figureSpread(r, { flowsheet, spreads, table, options }),
    })),
    table,
    extraCases: table.rows - samples,
    failed: failedIn(0, samples),
    extraFailed: failedIn(samples, table.rows),
    failures: countFailures(table.notes, (row) => table.converged[row] === 0),
  };
}

function drawnSpreads(flowsheet: Flowsheet): DrawnSpread[] {
  const known = spreadableSettings(flowsheet);
  return flowsheet.spreads.map((spread) => {
    const setting = known.find(({ path }) => path === spread.path);
    if (setting === undefined) throw new Error(`no setting ${spread.path}: the reader refuses it`);
    return { spread, setting, distribution: createDistribution(spread.shape, setting.bounds) };
  });
}

function factorOf({ spreads, correlations }: Flowsheet): Float64Array | null {
  if (correlations.length === 0) return null;
  const made = correlationFactor(
    spreads.map(({ path }) => path),
    correlations,
  );
  if (!made.ok) throw new Error('correlations that cannot hold together: the reader refuses them');
  return made.factor;
}

type Sampled = Pick<Uncertainty, 'flowsheet' | 'spreads' | 'table' | 'options'>;

/** Statistics of one figure over the sample. */
function figureSpread(
  r: number,
  { flowsheet, spreads, table, options }: Sampled,
): Pick<FigureSpread, 'summary' | 'heldBy' | 'shares'> {
  const { samples, percentiles, shares } = options;
  const size = spreads.length;
  const width = table.found.length / table.rows;
  const values = Float64Array.from({ length: table.rows }, (_, row) => table.found[row * width + r]);
  const rows = Array.from({ length: samples }, (_, row) => row).filter((row) => Number.isFinite(values[row]));
  const known = Float64Array.from(rows, (row) => values[row]);
  const indices = shares === 'sobol' ? sobolIndices(values, size) : null;
  const summary = known.length === 0 ? null : summarise(known, percentiles);
  const ranks = summary === null || known.length < 3 || summary.steady ? null : ranksOf(known);
  const groups = groupsOf(
    spreads.map(({ spread }) => spread.path),
    flowsheet.correlations,
  );
  const drawnRanks = (d: number) => ranksOf(Float64Array.from(rows, (row) => table.drawn[row * size + d]));
  const found = groups.map((group) => ({
    group,
    ...(ranks === null ? NOTHING : groupShare(group.map(drawnRanks), ranks)),
  }));
  return {
    summary,
    heldBy: summary?.steady === true ? heldBy(flowsheet, table.rows > 1 ? summary.mean : Number.NaN) : null,
    shares: spreads.map(({ spread }, d) => {
      const { group, correlations, share } = found.find((one) => one.group.includes(d))!;
      return {
        path: spread.path,
        rankCorrelation: orNull(correlations[group.indexOf(d)] ?? Number.NaN),
        rankShare: orNull(share),
        together: group.map((one) => spreads[one].spread.path),
        sobol: indices === null ? null : indices[d],
      };
    }),
  };
}

/** Of a figure that does not vary no share can be told. */
const NOTHING = { correlations: [], share: Number.NaN };

/** The aim that wants this value; null where none does. */
function heldBy({ aims }: Flowsheet, value: number): string | null {
  return aims.find(({ target }) => Math.abs(value - target) <= SAME * Math.abs(target))?.name ?? null;
}

/** Aims are reached to 1e-8 of the wanted value [-]. */
const SAME = 1e-7;

function orNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
