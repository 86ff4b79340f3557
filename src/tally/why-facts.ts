import { completeSafely } from '../convergence/attempt.ts';
import type { Closure } from '../convergence/driver.ts';
import type { FixedPointProblem } from '../convergence/problem.ts';
import { spectralRadius } from '../convergence/spectral-radius.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { MethodName } from '../model/flowsheet.ts';
import { type CloseOptions, closePlant } from './close-plant.ts';
import { heatLeft } from './heat-left.ts';
import type { Group, Plant } from './plant.ts';
import { createRecycleProblem } from './recycle-problem.ts';
import { closedAsItIs } from './why-as-is.ts';
import { type ComponentFlows, componentFlows } from './why-flows.ts';
import { createPatience, evaluationsOf, isOfUse, type Trial, tryOut } from './why-trial.ts';
import { type Phases, phasesIn, vesselsOf } from './why-vessels.ts';

/** Direct passes looked at from the last good pass on. */
const ONWARD = 24;
/** Direct passes from the feeds that a loop is looked at after; the first few find start values. */
export const DIRECT_PASSES = 40;
const START_PASSES = 4;

/** One direct pass after the last good one. */
export interface OnwardPass {
  /** what comes back in the torn streams, per component [mol/s] */
  readonly back: Float64Array;
  /** phases and temperature of every vessel that parts gas from liquid, by block name */
  readonly vessels: ReadonlyMap<
    string,
    { readonly phases: Phases; readonly temperatureK: number; readonly dew: DewCase }
  >;
}

/** What a dew point is asked of. */
export interface DewCase {
  readonly pressurePa: number;
  readonly flowsMolPerS: Float64Array;
}

/** What is true of a loop that did not close: found on the plant, not read from the trace. */
export interface Facts {
  readonly plant: Plant;
  readonly group: Group;
  readonly closure: Closure;
  readonly options: CloseOptions;
  /** passes made in all */
  readonly passes: number;
  /** tag of the first torn stream */
  readonly tag: string;
  readonly names: readonly string[];
  /** what the closing came to at its last good pass: every component, and the largest torn stream [mol/s] */
  readonly last: { readonly flows: readonly ComponentFlows[]; readonly recycle: number };
  /** every component after direct passes from the feeds, which no guess of a method has led astray */
  readonly flows: readonly ComponentFlows[];
  /** how many direct passes those were */
  readonly directPasses: number;
  /** all that enters the loop [mol/s] */
  readonly fed: number;
  /** spectral radius of a pass there; null where it is not known */
  readonly radius: number | null;
  /** what comes after those passes by direct substitution */
  readonly onward: readonly OnwardPass[];
  /** true where a block fails on that way */
  readonly onwardFails: boolean;
  /** the same settings closed by the automatic method, or by another where that fails; null where none gives one of use */
  readonly answer: Trial | null;
  /** the same where the recycle is beyond all use: rounding decides there; null where nothing closes like that */
  readonly beyond: Trial | null;
  /** methods by which trials as it is came to their end and gave no answer of use */
  readonly failing: readonly MethodName[];
  /** close with settings moved, by the automatic method; null where it does not, or only with a recycle beyond all use */
  tryOut(changes: readonly (readonly [path: string, value: number])[]): Trial | null;
}

/**
 * Gather what is true of a loop that did not close. Spends passes: direct ones from the feeds and onward, one per
 * variable, and a closing as it is by one method or more. The plant is left after the direct passes from the feeds.
 */
export function gatherFacts(
  plant: Plant,
  group: Group,
  closure: Closure,
  names: readonly string[],
  passes: number,
  options: CloseOptions,
): Facts {
  const spent = evaluationsOf(plant);
  const problem = createRecycleProblem(plant, group);
  // As it was closed: what was left out of those passes may not be possible where they stopped.
  const asClosed = createRecycleProblem(plant, group, heatLeft(plant, group));
  const g = new Float64Array(problem.size);
  const countAt = (x: Float64Array) => {
    asClosed.evaluate(x, g);
    completeSafely(asClosed, x.slice(), g);
    const recycle = Math.max(...group.tears.map((s) => plant.mixture.total(plant.seen[s])));
    return { flows: componentFlows(plant, group), recycle };
  };
  const last = countAt(closure.x);
  const direct = directFromFeeds(plant, group, closure, options);
  const onward = passOnward(plant, group, problem, direct.x);
  const { closed, failing } = closedAsItIs(plant, group, closure, spent, options);
  const radius = spectralRadius(asClosed, direct.x, sizes(problem, direct.x, direct.g));
  const { flows } = countAt(direct.x);
  const patience = createPatience();
  return {
    plant,
    group,
    closure,
    options,
    passes,
    tag: plant.flowsheet.streams[group.tears[0]].tag,
    names,
    last,
    flows,
    directPasses: direct.passes,
    fed: flows.reduce((sum, { enters }) => sum + enters, 0),
    radius,
    onward,
    onwardFails: onward.length < ONWARD,
    answer: closed !== null && isOfUse(closed) ? closed : null,
    beyond: closed !== null && !isOfUse(closed) ? closed : null,
    failing,
    tryOut(changes) {
      const found = tryOut(plant, group, options.tolerance, changes, 'auto', patience);
      return found !== null && isOfUse(found) ? found : null;
    },
  };
}

/** The closing itself where it was made by direct passes enough; else such passes, or it where they fail. */
function directFromFeeds(plant: Plant, group: Group, closure: Closure, options: CloseOptions): Closure {
  if (closure.method === 'direct' && closure.passes >= DIRECT_PASSES - START_PASSES) return closure;
  const { failure } = closePlant(plant, {
    ...options,
    method: 'direct',
    maxPasses: DIRECT_PASSES,
    warm: false,
  });
  const found = failure?.group === group && !failure.trouble ? failure.closure : null;
  return found ?? closure;
}

function sizes(problem: FixedPointProblem, x: Float64Array, g: Float64Array): Float64Array {
  const out = new Float64Array(problem.size);
  problem.scale!(x, g, out);
  return out;
}

/** Go on by direct substitution and watch the vessels; ends where a block fails. */
function passOnward(
  plant: Plant,
  group: Group,
  problem: FixedPointProblem,
  start: Float64Array,
): OnwardPass[] {
  const x = Float64Array.from(start);
  const g = new Float64Array(problem.size);
  const passes: OnwardPass[] = [];
  try {
    for (let k = 0; k < ONWARD; k++) {
      problem.evaluate(x, g);
      passes.push({
        back: plant.mixture.components.reduce((sums, _, i) => {
          for (const s of group.tears) sums[i] += plant.streams[s].flowsMolPerS[i];
          return sums;
        }, new Float64Array(plant.mixture.size)),
        vessels: new Map(
          vesselsOf(plant, group).map((vessel) => [
            vessel.name,
            {
              phases: phasesIn(vessel),
              temperatureK: vessel.gas.temperatureK,
              dew: { pressurePa: vessel.gas.pressurePa, flowsMolPerS: vessel.inlet.flowsMolPerS.slice() },
            },
          ]),
        ),
      });
      x.set(g);
    }
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble)) throw trouble;
  }
  return passes;
}
