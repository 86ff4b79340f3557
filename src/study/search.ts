import type { BoxProblem, BoxValue } from './box-problem.ts';
import { violation } from './box-problem.ts';
import { descend } from './trust-region.ts';

/** A limit counts as met within this share of its bound: what closings leave open, and a little more. */
export const MET = 1e-6;

export interface SearchEnd {
  readonly start: Float64Array;
  readonly u: Float64Array;
  readonly value: BoxValue;
  /** per limit, in scaled f per scaled limit */
  readonly multipliers: Float64Array;
}

/** A descent from every start, in their order; a start that cannot be evaluated is left out. */
export function searchFrom(problem: BoxProblem, starts: readonly Float64Array[], radius = 0.2): SearchEnd[] {
  return starts.flatMap((start) => {
    const end = descend(problem, start, radius);
    return end === null ? [] : [{ start, ...end }];
  });
}

/** The least f of the ends that meet the limits; where none does, the one that misses them least. */
export function bestOf<End extends { readonly value: BoxValue }>(ends: readonly End[]): End | null {
  let best: End | null = null;
  for (const end of ends) if (best === null || isBetter(end.value, best.value)) best = end;
  return best;
}

export function isBetter(a: BoxValue, b: BoxValue): boolean {
  const [missA, missB] = [violation(a), violation(b)];
  if (missA > MET || missB > MET) return missA < missB;
  return a.f < b.f;
}

/** Starts far enough from each other: in the order given, as many as asked for. */
export function spreadStarts(
  candidates: readonly Float64Array[],
  count: number,
  apart: number,
): Float64Array[] {
  const chosen: Float64Array[] = [];
  for (const one of candidates) {
    if (chosen.length === count) break;
    const near = chosen.some((other) => one.every((x, i) => Math.abs(x - other[i]!) < apart));
    if (!near) chosen.push(one);
  }
  return chosen;
}
