import { copyStream, emptyStream } from '../model/stream.ts';
import { closePlant } from './close-plant.ts';
import type { Group, Plant } from './plant.ts';
import { phasesIn, vesselsOf } from './why-vessels.ts';

/** Passes that a trial may take: what closes at all closes well within this. */
const TRIAL_PASSES = 250;

/** A change is worth advising where the recycle is no more than so many times the feed. */
export const SENSIBLE_RECYCLE = 20;

/** Beyond so many times the feed it is rounding that decides whether a recycle closes: no answer to rely on. */
const LARGEST_RECYCLE = 1e5;

/** What a loop does where it closes. */
export interface Trial {
  readonly passes: number;
  /** the largest torn stream [mol/s] and its mole fractions */
  readonly recycle: number;
  readonly fractions: Float64Array;
  /** blocks that part gas from liquid and hold no liquid */
  readonly dry: ReadonlySet<string>;
}

/**
 * Close a plant with some settings moved, by the automatic method; settings and streams are put back, what units
 * remember of their last pass is not.
 *
 * @param changes  values in SI by path
 * @returns null where it does not close, or only with a recycle beyond all use
 */
export function tryOut(
  plant: Plant,
  group: Group,
  tolerance: number,
  changes: readonly (readonly [path: string, value: number])[],
): Trial | null {
  const before = changes.map(([path]) => plant.get(path));
  const states = [...new Set([...plant.streams, ...plant.seen])];
  const kept = states.map((state) => {
    const copy = emptyStream(plant.mixture.size);
    copyStream(state, copy);
    return copy;
  });
  for (const [path, value] of changes) plant.set(path, value);
  try {
    const closure = closePlant(plant, { method: 'auto', tolerance, maxPasses: TRIAL_PASSES });
    if (!closure.converged) return null;
    const largest = largestTear(plant, group);
    const recycle = plant.mixture.total(plant.streams[largest]);
    const fed = plant.enters.reduce((sum, s) => sum + plant.mixture.total(plant.streams[s]), 0);
    if (recycle > LARGEST_RECYCLE * fed) return null;
    return {
      passes: closure.passes,
      recycle,
      fractions: plant.streams[largest].flowsMolPerS.map((flow) => (recycle > 0 ? flow / recycle : 0)),
      dry: new Set(
        vesselsOf(plant, group)
          .filter((vessel) => phasesIn(vessel) === 'gas')
          .map(({ name }) => name),
      ),
    };
  } finally {
    changes.forEach(([path], k) => {
      plant.set(path, before[k]!);
    });
    states.forEach((state, k) => {
      copyStream(kept[k], state);
    });
  }
}

/** Index of the largest torn stream of a group. */
export function largestTear(plant: Plant, group: Group): number {
  const total = (s: number) => plant.mixture.total(plant.streams[s]);
  return group.tears.reduce((most, s) => (total(s) > total(most) ? s : most), group.tears[0]);
}
