import type { BlockReport } from '../blocks/block.ts';
import type { AimResult, BlockResult, Figures, Result, Warning } from '../model/result.ts';
import { assumptionsOf } from './assumptions.ts';
import type { PlantClosure } from './close-plant.ts';
import { keyFigures } from './figures.ts';
import { closures, count, ledger } from './ledger.ts';
import type { Plant } from './plant.ts';
import { rangeWarnings } from './range-warnings.ts';
import { reportsOf } from './reports.ts';
import { createPlantScope } from './scope.ts';
import { streamResults } from './stream-results.ts';

/** A closure worse than this is said aloud. */
const CLOSED = 1e-9;

export interface TallyOptions {
  readonly aims?: Readonly<Record<string, AimResult>>;
  /** what the blocks say, when that has been asked already */
  readonly reports?: readonly BlockReport[];
  /** false leaves the plot-ready curves out of the details of the blocks; true when left out */
  readonly curves?: boolean;
}

/** Read a plant out into the result contract. Every number is taken from the streams of the last pass. */
export function tally(plant: Plant, closure: PlantClosure, options: TallyOptions = {}): Result {
  const { flowsheet } = plant;
  const { aims = {}, reports = reportsOf(plant), curves = true } = options;
  const tallied = count(plant);
  const streams = streamResults(plant);
  const blocks = blockResults(plant, reports);
  const plain = keyFigures(plant, tallied, reports);
  // A curve runs between settled streams; those of a plant that did not close need not agree with one another.
  if (curves && closure.converged) addCurves(plant, blocks, reports);
  const figures = { ...plain, user: userFigures(plant, reports) };
  const closed = closures(plant, tallied, reports);
  return {
    looptally: 1,
    title: flowsheet.title,
    case: flowsheet.caseName,
    convergence: {
      converged: closure.converged,
      method: closure.method,
      passes: closure.passes,
      residual: Number.isFinite(closure.residual) ? closure.residual : null,
      tears: plant.groups.flatMap((group) => group.tears.map((s) => flowsheet.streams[s].tag)),
      history: closure.history,
    },
    streams,
    blocks,
    figures,
    ledger: ledger(plant, tallied),
    closure: closed,
    aims,
    warnings: [
      ...blockWarnings(plant, reports),
      ...rangeWarnings(plant, reports),
      ...yieldWarnings(figures),
      ...closureWarnings(closed),
    ],
    assumptions: assumptionsOf(plant, reports),
  };
}

/** The figures of the plant as it stands, the user's own included. */
export function figuresOf(plant: Plant): Figures {
  const reports = reportsOf(plant);
  const plain = keyFigures(plant, count(plant), reports);
  return { ...plain, user: userFigures(plant, reports) };
}

/** The scope in which the user's formulas are evaluated on the plant as it stands. */
export function scopeOf(plant: Plant): Readonly<Record<string, unknown>> {
  return createPlantScope(plant).scope;
}

function blockResults(plant: Plant, reports: readonly BlockReport[]): Record<string, BlockResult> {
  return Object.fromEntries(
    plant.blocks.map((block, b) => [
      block.name,
      {
        kind: block.kind,
        duty_kW: reports[b].dutyW / 1e3,
        power_kW: reports[b].powerW / 1e3,
        details: reports[b].details,
      },
    ]),
  );
}

function addCurves(plant: Plant, blocks: Record<string, BlockResult>, reports: readonly BlockReport[]): void {
  plant.blocks.forEach(({ name }, b) => {
    blocks[name] = { ...blocks[name], details: { ...blocks[name].details, ...reports[b].curves() } };
  });
}

function userFigures(plant: Plant, reports: readonly BlockReport[]): Record<string, number | null> {
  if (plant.flowsheet.figures.length === 0) return {};
  const { scope } = createPlantScope(plant, reports);
  return Object.fromEntries(
    plant.flowsheet.figures.map(({ name, formula }) => {
      const value = formula.evaluate(scope);
      return [name, Number.isFinite(value) ? value : null];
    }),
  );
}

function blockWarnings(plant: Plant, reports: readonly BlockReport[]): Warning[] {
  return reports.flatMap((report, b) =>
    // A fault is told as an error as well; here the result keeps all of them.
    [
      ...report.faults.map(({ code, what, why }) => ({ code, message: `${what} (${why})` })),
      ...report.warnings,
    ].map(({ code, message }) => ({ code, where: plant.blocks[b].name, message })),
  );
}

/** A yield above one is no error: product has come from something else than the key reactant too. */
function yieldWarnings({ overall_yield: overall }: Figures): Warning[] {
  if (overall === null || overall.value <= 1 + 1e-9) return [];
  return [
    {
      code: 'yield-above-one',
      where: 'ledger',
      message: `the yield of ${overall.product} per ${overall.reactant} is ${(100 * overall.value).toFixed(2)} %: part of it came from another feed or by another reaction than the one the yield refers to; name another key reactant under ledger`,
    },
  ];
}

function closureWarnings(closed: Result['closure']): Warning[] {
  const all: [string, number][] = [
    ['mass', closed.mass],
    ...Object.entries(closed.atoms),
    ['energy', closed.energy],
  ];
  return all
    .filter(([, value]) => !(Math.abs(value) <= CLOSED))
    .map(([what, value]) => ({
      code: 'balance-open',
      where: 'battery limit',
      message: `the balance of ${what} is open by ${percentOf(value)} of what enters`,
    }));
}

function percentOf(share: number): string {
  const size = Math.abs(share);
  return size >= 1e-4 ? `${(100 * size).toPrecision(3)} %` : size.toExponential(1);
}
