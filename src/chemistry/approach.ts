import type { EquilibriumReaction } from './equilibrium.ts';

type ApproachedReaction = Pick<EquilibriumReaction, 'lnK' | 'approachK'>;

/** ln K with approach, remembered for the temperature of the last call. */
export function createConstant(reaction: ApproachedReaction): (T: number) => number {
  let lastT = Number.NaN;
  let lastApproach = Number.NaN;
  let value = Number.NaN;
  return (T) => {
    if (T !== lastT || reaction.approachK !== lastApproach) {
      value = lnKAtApproach(reaction, T);
      lastT = T;
      lastApproach = reaction.approachK;
    }
    return value;
  };
}

/** ln K taken `approachK` to the side where K is smaller; the side by the slope of ln K at T. */
export function lnKAtApproach(reaction: ApproachedReaction, T: number): number {
  if (reaction.approachK === 0) return reaction.lnK(T);
  const falls = reaction.lnK(T + 0.5) < reaction.lnK(T - 0.5);
  return reaction.lnK(falls ? T + reaction.approachK : T - reaction.approachK);
}

/** Half the span of the difference that gives the slope of ln K [K]: neither rounding nor curvature shows in ten digits. */
const lnKSpan = 0.05;

/** ∂ ln K/∂T with the approach held [1/K]. */
export function lnKSlope(reaction: ApproachedReaction, T: number): number {
  return (lnKAtApproach(reaction, T + lnKSpan) - lnKAtApproach(reaction, T - lnKSpan)) / (2 * lnKSpan);
}
