import type { Closure } from '../convergence/driver.ts';
import type { FixedPointProblem } from '../convergence/problem.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { CloseOptions } from './close-plant.ts';
import type { Group, Plant } from './plant.ts';
import { createRecycleProblem } from './recycle-problem.ts';
import { spectralRadius } from './spectral-radius.ts';
import { type ComponentFlows, componentFlows } from './why-flows.ts';
import { type Trial, tryOut } from './why-trial.ts';
import { type Phases, phasesIn, vesselsOf } from './why-vessels.ts';

/** Direct passes looked at from the last good pass on. */
const ONWARD = 24;

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
  /** per component, at the last good pass */
  readonly flows: readonly ComponentFlows[];
  /** all that enters the loop [mol/s] */
  readonly fed: number;
  /** all that goes round in the largest torn stream at the last good pass [mol/s] */
  readonly recycle: number;
  /** spectral radius of a pass there; null where it is not known */
  readonly radius: number | null;
  readonly onward: readonly OnwardPass[];
  /** true where a block fails on that way: what stopped the closing was no fault of the method's guesses */
  readonly onwardFails: boolean;
  /** the same settings closed by the automatic method; null where that does not close either */
  readonly answer: Trial | null;
  /** close with settings moved */
  tryOut(changes: readonly (readonly [path: string, value: number])[]): Trial | null;
}

/**
 * Gather what is true of a loop that did not close. Spends passes: one per variable, some direct ones, and one
 * closing by the automatic method. The plant is left at the last good pass of the closure.
 */
export function gatherFacts(
  plant: Plant,
  group: Group,
  closure: Closure,
  names: readonly string[],
  passes: number,
  options: CloseOptions,
): Facts {
  const problem = createRecycleProblem(plant, group);
  const trial = (changes: readonly (readonly [string, number])[]) =>
    tryOut(plant, group, options.tolerance, changes);
  const onward = passOnward(plant, group, problem, closure.x);
  const answer = trial([]);
  const radius = spectralRadius(problem, closure.x, sizes(problem, closure.x, closure.g));
  const at = Float64Array.from(closure.x);
  problem.evaluate(at, new Float64Array(problem.size));
  const flows = componentFlows(plant, group);
  return {
    plant,
    group,
    closure,
    options,
    passes,
    tag: plant.flowsheet.streams[group.tears[0]].tag,
    names,
    flows,
    fed: flows.reduce((sum, { enters }) => sum + enters, 0),
    recycle: Math.max(...group.tears.map((s) => plant.mixture.total(plant.seen[s]))),
    radius,
    onward,
    onwardFails: onward.length < ONWARD,
    answer,
    tryOut: (changes) => {
      const found = trial(changes);
      problem.evaluate(at, new Float64Array(problem.size));
      return found;
    },
  };
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
