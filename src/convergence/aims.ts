import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { reachOneAim } from './one-aim.ts';
import { reachSeveralAims } from './several-aims.ts';
import { largestShare } from './vectors.ts';

/**
 * Figures minus their targets at given settings, each divided by the size of its target; closes the loop behind.
 * May throw PassTrouble or return numbers that are not finite where the loop does not close: such settings are
 * avoided.
 */
export type AimResiduals = (settings: Float64Array) => Float64Array;

export interface AimsOutcome {
  /** every residual is within its tolerance */
  readonly reached: boolean;
  /** the best settings found: where not all aims are reached, as many as bounds and contradictions allow */
  readonly values: Float64Array;
  /** residuals there; NaN when no settings could be evaluated */
  readonly residuals: Float64Array;
  /** the setting whose bound stands in the way, −1 when none does */
  readonly limit: number;
  readonly limitSide: 'low' | 'high' | null;
  readonly evaluations: number;
  /** aims that ask contradictory things of settings that move them alike, or one that no setting moves; null for none */
  readonly singular: readonly number[] | null;
  /** the last trouble met on the way, for the account when the aims are not reached */
  readonly trouble: PassTrouble | null;
}

/** Where and why a search ended. */
export interface AimsEnd {
  readonly at?: { readonly values: Float64Array; readonly residuals: Float64Array };
  readonly limit?: number;
  readonly side?: 'low' | 'high' | null;
  readonly singular?: readonly number[] | null;
}

export interface AimsOptions {
  /** evaluations allowed; 60 for each aim when left out */
  readonly maxEvaluations?: number;
}

/** The problem of aims with evaluation made safe and counted. */
export interface AimsSearch {
  readonly start: Float64Array;
  readonly low: Float64Array;
  readonly high: Float64Array;
  readonly tolerances: Float64Array;
  /** null where the loop does not close or the evaluations are used up */
  tryAt(settings: Float64Array): Float64Array | null;
  /** evaluations left */
  left(): number;
  /** the outcome at the place given, or at the one tried where the largest residual was least */
  outcome(end?: AimsEnd): AimsOutcome;
}

/**
 * Move settings within bounds until figures meet their targets: one aim by bracketing, several by a damped
 * Newton method.
 *
 * @param evaluate  residuals of the aims at given settings, as many as settings
 * @param start,low,high  first settings and their bounds, low < high
 * @param tolerances  largest |residual| of a reached aim
 */
export function reachAims(
  evaluate: AimResiduals,
  start: Float64Array,
  low: Float64Array,
  high: Float64Array,
  tolerances: Float64Array,
  options: AimsOptions = {},
): AimsOutcome {
  const search = createSearch(
    evaluate,
    start,
    low,
    high,
    tolerances,
    options.maxEvaluations ?? 60 * start.length,
  );
  return start.length === 1 ? reachOneAim(search) : reachSeveralAims(search);
}

/** Largest residual in units of its tolerance: 1 or less is reached. */
export function aimsMerit(residuals: Float64Array, tolerances: Float64Array): number {
  return largestShare(residuals, tolerances);
}

function createSearch(
  evaluate: AimResiduals,
  start: Float64Array,
  low: Float64Array,
  high: Float64Array,
  tolerances: Float64Array,
  maxEvaluations: number,
): AimsSearch {
  let evaluations = 0;
  let trouble: PassTrouble | null = null;
  let bestMerit = Infinity;
  let values: Float64Array = Float64Array.from(start);
  let residuals: Float64Array = new Float64Array(start.length).fill(NaN);
  return {
    start: start.map((value, i) => Math.min(Math.max(value, low[i]), high[i])),
    low,
    high,
    tolerances,
    left: () => maxEvaluations - evaluations,
    tryAt(settings) {
      if (evaluations >= maxEvaluations) return null;
      evaluations++;
      let found: Float64Array;
      try {
        found = Float64Array.from(evaluate(Float64Array.from(settings)));
      } catch (error) {
        if (!(error instanceof PassTrouble)) throw error;
        trouble = error;
        return null;
      }
      if (!found.every(Number.isFinite)) return null;
      const merit = aimsMerit(found, tolerances);
      if (merit < bestMerit) {
        bestMerit = merit;
        values = Float64Array.from(settings);
        residuals = found;
      }
      return found;
    },
    outcome({ at = { values, residuals }, limit = -1, side = null, singular = null } = {}) {
      const reached = aimsMerit(at.residuals, tolerances) <= 1;
      return {
        reached,
        ...at,
        limit: reached ? -1 : limit,
        limitSide: reached ? null : side,
        evaluations,
        singular: reached ? null : singular,
        trouble,
      };
    },
  };
}
