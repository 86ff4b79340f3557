import { type AimsOutcome, reachAims } from '../convergence/aims.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Aim } from '../model/flowsheet.ts';
import type { AimResult } from '../model/result.ts';
import { type CloseOptions, closePlant, type PlantClosure } from './close-plant.ts';
import type { Plant } from './plant.ts';
import { scopeOf } from './tally.ts';

/** A figure meets its target within this share of the size of the target, or of the figure's first value. */
const TOLERANCE = 1e-8;

/**
 * Move the settings of the aims until their figures meet the targets, closing the loop for every try from the
 * one before, and leave the plant closed at the best settings found.
 */
export function closeWithAims(
  plant: Plant,
  options: CloseOptions,
): { readonly closure: PlantClosure; readonly aims: Record<string, AimResult> } {
  const { aims } = plant.flowsheet;
  let warm = false;
  let closure = closePlant(plant, options);
  // A target of zero has no size of its own: the figure's first value gives it one.
  let sizes: number[] | null = null;
  const closeAt = (settings: Float64Array): PlantClosure => {
    aims.forEach((aim, a) => {
      plant.set(aim.move, settings[a]);
    });
    closure = closePlant(plant, { ...options, warm });
    // A neighbour too far away to start from: begin again at the feeds.
    if (!closure.converged && warm) closure = closePlant(plant, options);
    warm = closure.converged;
    return closure;
  };
  const outcome = reachAims(
    (settings) => {
      const tried = closeAt(settings);
      if (!tried.converged) throw tried.failure?.trouble ?? notClosed();
      const scope = scopeOf(plant);
      const found = aims.map((aim) => aim.until.evaluate(scope));
      sizes ??= aims.map((aim, a) => Math.max(Math.abs(aim.target), Math.abs(found[a])) || 1);
      return Float64Array.from(aims, (aim, a) => (found[a] - aim.target) / sizes![a]);
    },
    Float64Array.from(aims, (aim) => plant.get(aim.move) ?? 0.5 * (aim.between[0] + aim.between[1])),
    Float64Array.from(aims, (aim) => aim.between[0]),
    Float64Array.from(aims, (aim) => aim.between[1]),
    new Float64Array(aims.length).fill(TOLERANCE),
  );
  const closed = closeAt(outcome.values);
  const scope = closed.converged ? scopeOf(plant) : null;
  return {
    closure: closed,
    aims: Object.fromEntries(
      aims.map((aim, a) => [
        aim.name,
        {
          reached: outcome.reached,
          setting: aim.move,
          value: outcome.values[a],
          unit: aim.unit,
          target: aim.target,
          until: aim.until.text === '' ? '' : `${aim.until.text} = ${aim.wanted}`,
          achieved: scope ? aim.until.evaluate(scope) : Number.NaN,
          note: noteOf(outcome, a, aims),
        },
      ]),
    ),
  };
}

/** Why an aim was not reached, in one sentence; null when it was. */
function noteOf(outcome: AimsOutcome, a: number, aims: readonly Aim[]): string | null {
  if (outcome.reached) return null;
  if (outcome.singular) {
    const [one, other] = outcome.singular;
    return one === other
      ? `no setting moves ${aims[one].until.text}`
      : `it cannot be told apart from the aim ${aims[a === one ? other : one].name}: the settings move both alike`;
  }
  if (outcome.limit >= 0) {
    const limiting = aims[outcome.limit];
    return `stopped at the ${outcome.limitSide === 'low' ? 'lower' : 'upper'} bound of ${limiting.move}`;
  }
  if (outcome.trouble) return `the loop does not close on the way: ${outcome.trouble.message}`;
  return `no setting between the bounds was found in ${outcome.evaluations} tries`;
}

function notClosed(): PassTrouble {
  return new PassTrouble(
    'not-closed',
    'The loop does not close at the settings tried for an aim.',
    'see the trace',
    'narrow the bounds of the aim',
  );
}
