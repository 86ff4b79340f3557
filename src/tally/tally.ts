import type { BlockReport } from '../blocks/block.ts';
import type { AimResult, BlockResult, Figures, Result, Warning } from '../model/result.ts';
import { assumptionsOf } from './assumptions.ts';
import type { PlantClosure } from './close-plant.ts';
import { keyFigures } from './figures.ts';
import { closures, count, ledger } from './ledger.ts';
import type { Plant } from './plant.ts';
import { formulaScope } from './scope.ts';
import { streamResults } from './stream-results.ts';

/** A closure worse than this is said aloud. */
const CLOSED = 1e-9;

/** Read a plant out into the result contract. Every number is taken from the streams of the last pass. */
export function tally(
  plant: Plant,
  closure: PlantClosure,
  aims: Readonly<Record<string, AimResult>> = {},
): Result {
  const { flowsheet } = plant;
  const reports = plant.units.map((unit, b) => unit.report(plant.inlets[b], plant.outlets[b]));
  const tallied = count(plant);
  const streams = streamResults(plant);
  const blocks = blockResults(plant, reports);
  const plain = keyFigures(plant, tallied, reports);
  const figures = { ...plain, user: userFigures(plant, streams, blocks, plain) };
  const closed = closures(plant, tallied, reports);
  return {
    looptally: 1,
    title: flowsheet.title,
    case: flowsheet.caseName,
    convergence: {
      converged: closure.converged,
      method: closure.method,
      passes: closure.passes,
      residual: closure.residual,
      tears: plant.groups.flatMap((group) => group.tears.map((s) => flowsheet.streams[s].tag)),
      history: closure.history,
    },
    streams,
    blocks,
    figures,
    ledger: ledger(plant, tallied),
    closure: closed,
    aims,
    warnings: [...blockWarnings(plant, reports), ...closureWarnings(closed)],
    assumptions: assumptionsOf(plant, reports),
  };
}

/** The figures of the plant as it stands, the user's own included. */
export function figuresOf(plant: Plant): Figures {
  const reports = plant.units.map((unit, b) => unit.report(plant.inlets[b], plant.outlets[b]));
  const plain = keyFigures(plant, count(plant), reports);
  const user = userFigures(plant, streamResults(plant), blockResults(plant, reports), plain);
  return { ...plain, user };
}

/** The scope in which the user's formulas are evaluated on the plant as it stands. */
export function scopeOf(plant: Plant): Record<string, unknown> {
  const reports = plant.units.map((unit, b) => unit.report(plant.inlets[b], plant.outlets[b]));
  const figures = keyFigures(plant, count(plant), reports);
  return formulaScope(streamResults(plant), blockResults(plant, reports), figures, molarMasses(plant));
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

function userFigures(
  plant: Plant,
  streams: Result['streams'],
  blocks: Result['blocks'],
  figures: Figures,
): Record<string, number | null> {
  if (plant.flowsheet.figures.length === 0) return {};
  const scope = formulaScope(streams, blocks, figures, molarMasses(plant));
  return Object.fromEntries(
    plant.flowsheet.figures.map(({ name, formula }) => {
      const value = formula.evaluate(scope);
      return [name, Number.isFinite(value) ? value : null];
    }),
  );
}

function molarMasses(plant: Plant): Record<string, number> {
  return Object.fromEntries(plant.mixture.components.map((c) => [c.id, c.molarMassKgPerMol]));
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
      message: `the balance of ${what} is open by ${value.toExponential(1)} of what enters`,
    }));
}
