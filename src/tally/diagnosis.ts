import type { BlockReport } from '../blocks/block.ts';
import { diagnose as readTrend } from '../convergence/diagnosis.ts';
import type { Closure } from '../convergence/driver.ts';
import type { Diagnostic, PassTrouble } from '../diagnostics/diagnostic.ts';
import type { PlantClosure } from './close-plant.ts';
import type { Group, Plant } from './plant.ts';

/** Say why a plant did not close: the block that cannot be evaluated, or the worst variable and its trend. */
export function diagnose(plant: Plant, closure: PlantClosure): Diagnostic {
  const failure = closure.failure;
  if (!failure) throw new Error('a plant that did not close names the group that failed');
  if (failure.trouble) return troubleDiagnostic(plant, failure.trouble);
  const tag = plant.flowsheet.streams[failure.group.tears[0]].tag;
  const where = plant.flowsheet.placeOf(`streams.${tag}`);
  const reading = readTrend(failure.closure ?? { history: [] }, plant.flowsheet.solve.tolerance);
  const variable = failure.names[reading.worst] ?? `${tag} as a whole`;
  const size = closure.residual.toExponential(1);
  const advice =
    runawayAdvice(plant, failure.group) ??
    limitAdvice(closure, failure.closure?.reason) ??
    adviceOn(reading, variable, plant);
  return {
    code: 'not-closed',
    severity: 'error',
    where,
    what: `The recycle through ${tag} did not close in ${closure.passes} passes; the worst variable is ${variable}, ${size} off.`,
    why: advice.why,
    mend: advice.mend,
  };
}

/** What keeps the blocks of a plant whose streams have closed from doing what their settings ask for. */
export function faultDiagnostics(plant: Plant, reports: readonly BlockReport[]): Diagnostic[] {
  return reports.flatMap(({ faults }, b) =>
    faults.map(({ code, path = [], what, why, mend }) => ({
      code,
      severity: 'error' as const,
      where: plant.flowsheet.placeOf(['blocks', plant.blocks[b].name, ...path].join('.')),
      what: `${plant.blocks[b].name}: ${what}`,
      why,
      mend,
    })),
  );
}

/** A recycle this many times the feed has run away rather than not yet closed. */
const RUNAWAY = 1000;

/** A recycle grown out of all proportion: what piles up in it has too small a way out. */
function runawayAdvice(plant: Plant, group: Group): Advice | null {
  const sum = (flows: Float64Array) => flows.reduce((all, flow) => all + flow, 0);
  const fed = plant.enters.reduce((all, s) => all + sum(plant.streams[s].flowsMolPerS), 0);
  const largest = group.tears
    .map((s) => plant.seen[s].flowsMolPerS)
    .reduce((most, flows) => (sum(flows) > sum(most) ? flows : most));
  if (!(fed > 0) || !(sum(largest) > RUNAWAY * fed)) return null;
  const piling = plant.mixture.components
    .map((c, i) => ({ id: c.id, share: largest[i] / sum(largest) }))
    .filter(({ share }) => share > 0.02)
    .sort((a, b) => b.share - a.share)
    .map(({ id, share }) => `${id} ${(100 * share).toFixed(0)} %`);
  return {
    why: `the recycle has grown to ${(sum(largest) * 3.6).toPrecision(3)} kmol/h, ${(sum(largest) / fed).toPrecision(3)} times the feed: ${piling.join(', ')} of it pile up, for they leave the loop more slowly than they enter`,
    mend: 'give them a way out: a purge (a splitter in the recycle) or a larger one, a feed with less of them, or a feed closer to the stoichiometric ratio',
  };
}

function limitAdvice(closure: PlantClosure, reason: Closure['reason'] | undefined): Advice | null {
  if (reason !== 'max-passes' || closure.passes > 25) return null;
  return {
    why: `it was stopped after the ${closure.passes} passes that were allowed`,
    mend: 'raise --max-passes (or solve: max_passes in the file)',
  };
}

interface Advice {
  readonly why: string;
  readonly mend: string;
}

function adviceOn(
  reading: ReturnType<typeof readTrend>,
  variable: string,
  plant: Plant,
): { readonly why: string; readonly mend: string } {
  const id = variable.split('.')[1];
  const isFlow = plant.mixture.components.some((c) => c.id === id);
  switch (reading.trend) {
    case 'accumulating':
      return {
        why: isFlow
          ? `it gains ${(reading.gain * 3.6).toPrecision(3)} kmol/h in every pass: more ${id} enters the loop than leaves it`
          : 'it gains about the same in every pass',
        mend: isFlow
          ? `give ${id} a way out: a larger purge, a feed closer to the stoichiometric ratio, or less ${id} in the feed`
          : 'check the heat balance of the loop: something adds more heat than the coolers take out',
      };
    case 'oscillating':
      return {
        why: 'guess and answer change sides from pass to pass, as when a block has one phase on one side and two on the other',
        mend: 'move the temperature or pressure of the condenser or flash away from the dew point, or use --method anderson',
      };
    case 'converging':
      return {
        why: `it gets better by a factor of ${(reading.rate ?? 1).toPrecision(4)} per pass, about ${reading.passesToGo ?? 'many'} more passes to go`,
        mend: 'raise --max-passes (or solve: max_passes in the file), or use --method auto',
      };
    case 'diverging':
      return {
        why: `it gets worse by a factor of ${(reading.rate ?? 1).toPrecision(4)} per pass`,
        mend: 'use --method auto, or check settings that feed more back than they take out (splits, recoveries, ratios)',
      };
    default:
      return {
        why: 'the last passes made it neither better nor worse',
        mend: 'look at --trace; use --method auto, or move the settings away from a phase or temperature limit',
      };
  }
}

function placeOfTrouble({ block, setting }: PassTrouble): string {
  if (block === null) return '';
  return setting === null ? `blocks.${block}` : `blocks.${block}.${setting}`;
}

function troubleDiagnostic(plant: Plant, trouble: PassTrouble): Diagnostic {
  return {
    code: trouble.code,
    severity: 'error',
    where: plant.flowsheet.placeOf(placeOfTrouble(trouble)),
    what: trouble.block ? `${trouble.block}: ${trouble.message}` : trouble.message,
    why: trouble.why,
    mend: trouble.mend,
  };
}
