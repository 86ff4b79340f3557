import { Solver } from 'odex';
import { createImplicitMarch, firstStep, type ImplicitMarch, type Slope } from './kinetic-bed-implicit.ts';

/** Follows a bed from its inlet (z = 0) to its outlet (z = 1). */
export interface BedMarch {
  /** Take x from the inlet to the outlet, in place. @throws PassTrouble `bed-integration` */
  through(x: Float64Array): void;
  /** Take x to the outlet with stops: `at` is called at 0, 1/sections, ..., 1. */
  inSections(sections: number, x: Float64Array, at: (z: number, x: Float64Array) => void): void;
}

/** Error of an implicit step, on extents per mole of feed [-]: the loop around the bed is closed to 1e-9. */
const TOLERANCE = 1e-10;
/**
 * Error of an explicit step. The outlet jumps by some of it where a neighbouring inlet is followed in other steps;
 * differences of neighbours need jumps below 1e-11, and the tenth costs a third more evaluations.
 */
const EXPLICIT_TOLERANCE = 1e-12;
/** odex takes no shorter first step than this. */
const SHORTEST_FIRST_STEP = 1e-4;
/** Evaluations after which the bed is taken to be stiff: one that is short of equilibrium needs 80 to 420. */
const EXPLICIT_EVALUATIONS = 500;

/**
 * Gragg-Bulirsch-Stoer extrapolation (odex) while the gas is on its way to equilibrium; once it has arrived and
 * follows the equilibrium, explicit steps crawl and their answer trembles, so that the rest is left to implicit
 * ones. Nothing is remembered from one bed to the next: the same inlet gives the same outlet.
 *
 * @param isPossible  false for what no gas can be, e.g. less than nothing of a component
 * @source E. Hairer, S. P. Nørsett, G. Wanner, Solving Ordinary Differential Equations I, 2nd ed. 1993, sec. II.9
 */
export function createBedMarch(
  size: number,
  slope: Slope,
  isPossible: (x: Float64Array) => boolean,
): BedMarch {
  const implicit = createImplicitMarch(size, slope, TOLERANCE, isPossible);
  const explicit = createExplicitMarch(size, slope, isPossible);
  return {
    through(x) {
      const arrived = explicit(x);
      if (arrived >= 1) return;
      implicit.restart();
      implicit.march(arrived, 1, x);
    },
    inSections: (sections, x, at) => inSections(implicit, sections, x, at),
  };
}

function inSections(
  implicit: ImplicitMarch,
  sections: number,
  x: Float64Array,
  at: (z: number, x: Float64Array) => void,
): void {
  implicit.restart();
  at(0, x);
  for (let section = 1; section <= sections; section++) {
    implicit.march((section - 1) / sections, section / sections, x);
    at(section / sections, x);
  }
}

/** @returns a function that takes x as far as explicit steps do, in place, and says how far that is */
function createExplicitMarch(
  size: number,
  slope: Slope,
  isPossible: (x: Float64Array) => boolean,
): (x: Float64Array) => number {
  const solver = new Solver(size);
  solver.absoluteTolerance = EXPLICIT_TOLERANCE;
  solver.relativeTolerance = EXPLICIT_TOLERANCE;
  const at = new Float64Array(size);
  const rise = new Float64Array(size);
  const tooMany = new Error('more evaluations than a bed needs that is not stiff');

  return (x) => {
    let evaluations = 0;
    let arrived = 0;
    slope(0, x, rise);
    const first = firstStep(rise);
    // The way is stretched where the first step would otherwise be too short for odex.
    const length = Math.max(1, SHORTEST_FIRST_STEP / first);
    solver.initialStepSize = first * length;
    const derivative = (s: number, y: number[]): number[] => {
      if (++evaluations > 2 * EXPLICIT_EVALUATIONS) throw tooMany;
      at.set(y);
      slope(s / length, at, rise);
      return Array.from(rise, (value) => value / length);
    };
    try {
      solver.solve(derivative, 0, Array.from(x), length, (_step, _from, to, y) => {
        at.set(y);
        if (!isPossible(at)) return false;
        x.set(at);
        // odex adds its steps up and ends within rounding of the end.
        arrived = to >= (1 - 1e-12) * length ? 1 : to / length;
        return evaluations <= EXPLICIT_EVALUATIONS;
      });
    } catch (stop) {
      if (stop !== tooMany) throw stop;
    }
    return arrived;
  };
}
