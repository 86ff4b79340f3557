/**
 * Vapour fraction V that solves Σ zᵢ (Kᵢ − 1)/(1 + V (Kᵢ − 1)) = 0, by Newton's method kept inside a bracket.
 * With 1/K in place of K it is the liquid fraction, accurate where that is small.
 *
 * @param z  overall mole fractions, sum 1 [-]
 * @param K  y/x at equilibrium; +Infinity for what stays out of the liquid, 0 for what stays out of the gas [-]
 * @param start  a guess of V
 * @returns V between 0 and 1; exactly 0 (1) where the sum says that all is liquid (gas)
 * @source Rachford & Rice, J. Pet. Technol. 4(10) (1952), sect. 1, 19; sect. 2, 3
 */
export function vapourFraction(z: Float64Array, K: Float64Array, start: number): number {
  let atGas = 1;
  let atLiquid = -1;
  for (let i = 0; i < z.length; i++) {
    if (z[i] === 0) continue;
    atGas -= z[i] / K[i];
    atLiquid += z[i] * K[i];
  }
  if (atGas >= 0) return 1;
  if (atLiquid <= 0) return 0;
  let low = 0;
  let high = 1;
  let V = start > 0 && start < 1 ? start : 0.5;
  for (let step = 0; step < 200; step++) {
    let f = 0;
    let slope = 0;
    for (let i = 0; i < z.length; i++) {
      const zi = z[i];
      if (zi === 0) continue;
      // (K − 1)/(1 + V (K − 1)) written so that an infinite K gives 1/V
      const a = K[i] === Number.POSITIVE_INFINITY ? 1 / V : (K[i] - 1) / (1 + V * (K[i] - 1));
      f += zi * a;
      slope -= zi * a * a;
    }
    if (f > 0) low = V;
    else high = V;
    let next = V - f / slope;
    // Newton from the right of a steep 1/V leaves the bracket: a tenth of V comes down faster than halves.
    if (!(next > low && next < high)) next = next <= low && V > 10 * low ? 0.1 * V : 0.5 * (low + high);
    // Relative to V: beside a trace of a gas that does not dissolve, V itself may be 1e-15.
    if (Math.abs(next - V) <= 1e-15 * V || high - low <= 1e-15 * high) return next;
    V = next;
  }
  return V;
}
