import type { ObjectiveCase, ObjectiveCases } from './objective-cases.ts';

/** A case worth telling, with what holds it there. */
export interface Chosen {
  /** SI, in the order of the moves */
  readonly settings: readonly number[];
  readonly case: ObjectiveCase;
  /** per move, the bound that it lies on */
  readonly atBound: readonly ('low' | 'high' | null)[];
  /** per limit, whether it holds the case where it is */
  readonly active: readonly boolean[];
}

/** A limit within this share of its bound holds the case; a setting this near to a bound lies on it. */
const ACTIVE = 1e-4;
const AT_BOUND = 1e-5;
const SNAP = 1e-7;

/** A place of the box closed from the feeds; null where the loop does not close. */
export function chosen(cases: ObjectiveCases, u: Float64Array): Chosen | null {
  // What rounding keeps off a bound is put on it.
  const snapped = u.map((x) => (x < SNAP ? 0 : x > 1 - SNAP ? 1 : x));
  const found = cases.at(snapped, true);
  if (found === null) return null;
  return {
    settings: cases.settingsAt(snapped),
    case: found,
    atBound: Array.from(snapped, (x) => (x <= AT_BOUND ? 'low' : x >= 1 - AT_BOUND ? 'high' : null)),
    active: Array.from(found.c, (c) => c >= -ACTIVE),
  };
}
