import type { FixedPointProblem } from '../../src/convergence/driver.ts';

/**
 * A small ammonia loop for trying methods on: equilibrium converter at 450 degC and 20 MPa, separator that
 * leaves a fixed mole fraction of ammonia in the gas, purge, circulator. The map is that of the stream torn.
 *
 * Equilibrium: log10 Ka = -2.691122 log10 T - 5.519265e-5 T + 1.848863e-7 T² + 2001.6/T + 2.6899,
 * log10(Kp/Ka) = (0.1191849/T + 91.87212/T² + 25122730/T⁴) P, T in K, P in atm.
 * Gillespie L. J., Beattie J. A., Phys. Rev. 36 (1930) 743-753; the pressure term as quoted by N. de Nevers,
 * Physical and Chemical Equilibrium for Chemical Engineers, Wiley, example 12.11.
 */
export interface AmmoniaLoop {
  /** fresh feed N2, H2, inert, NH3 */
  readonly fresh: readonly [number, number, number, number];
  readonly purge: number;
  /** mole fraction of ammonia in the separator gas */
  readonly ammoniaOverLiquid: number;
}

export const loop1: AmmoniaLoop = { fresh: [24.75, 74.25, 1, 0], purge: 0.02, ammoniaOverLiquid: 0.0386 };

const T = 723.15;
const P = 20e6 / 101325;
const log10Ka = -2.691122 * Math.log10(T) - 5.519265e-5 * T + 1.848863e-7 * T * T + 2001.6 / T + 2.6899;
const log10Kp = log10Ka + (0.1191849 / T + 91.87212 / T ** 2 + 25122730 / T ** 4) * P;
const KpPerAtm = 10 ** log10Kp;

/** Extent of N2 + 3 H2 = 2 NH3 at equilibrium, by bisection on the quotient, then Newton-free polishing. */
export function equilibriumExtent(n2: number, h2: number, inert: number, nh3: number): number {
  let low = -nh3 / 2;
  let high = Math.min(n2, h2 / 3);
  const total = n2 + h2 + inert + nh3;
  for (let k = 0; k < 200; k++) {
    const e = (low + high) / 2;
    if (e <= low || e >= high) break;
    const quotient =
      ((nh3 + 2 * e) * (total - 2 * e)) / (Math.sqrt(n2 - e) * (h2 - 3 * e) ** 1.5 * KpPerAtm * P);
    if (quotient > 1) high = e;
    else low = e;
  }
  return (low + high) / 2;
}

/** One pass from converter feed to converter feed, or from recycle to recycle; n = N2, H2, inert, NH3. */
export function passAmmoniaLoop(loop: AmmoniaLoop, feed: Float64Array, recycle: Float64Array): void {
  const [n2, h2, inert, nh3] = [feed[0], feed[1], feed[2], feed[3]];
  const e = equilibriumExtent(n2, h2, inert, nh3);
  const dry = n2 - e + (h2 - 3 * e) + inert;
  const saturated = (loop.ammoniaOverLiquid / (1 - loop.ammoniaOverLiquid)) * dry;
  recycle[0] = (1 - loop.purge) * (n2 - e);
  recycle[1] = (1 - loop.purge) * (h2 - 3 * e);
  recycle[2] = (1 - loop.purge) * inert;
  recycle[3] = (1 - loop.purge) * Math.min(nh3 + 2 * e, saturated);
}

/** The loop torn before the converter: variables are the converter feed. */
export function converterFeedProblem(loop: AmmoniaLoop): FixedPointProblem {
  return {
    size: 4,
    lower: new Float64Array(4),
    evaluate(x, g) {
      passAmmoniaLoop(loop, x, g);
      for (let i = 0; i < 4; i++) g[i] += loop.fresh[i];
    },
  };
}

/**
 * The loop torn at the recycle, with methane beside argon (one of the two dissolves a little in the product),
 * temperature and pressure: N2, H2, Ar, CH4, NH3, T, P as a flowsheet would have them.
 */
export function recycleProblem(loop: AmmoniaLoop): FixedPointProblem & { extraError(): number } {
  const feed = new Float64Array(4);
  const out = new Float64Array(4);
  let balance = 1;
  const argonShare = 0.3;
  return {
    size: 7,
    lower: Float64Array.of(0, 0, 0, 0, 0, 100, 0),
    scale(x, g, scale) {
      let total = 0;
      for (let i = 0; i < 5; i++) total += Math.max(Math.abs(x[i]), Math.abs(g[i]));
      for (let i = 0; i < 5; i++) scale[i] = Math.max(Math.abs(x[i]), Math.abs(g[i]), 1e-6 * total, 1e-12);
      scale[5] = 100;
      scale[6] = g[6];
    },
    evaluate(x, g) {
      const fresh = loop.fresh;
      feed[0] = fresh[0] + x[0];
      feed[1] = fresh[1] + x[1];
      feed[2] = fresh[2] + x[2] + x[3];
      feed[3] = fresh[3] + x[4];
      passAmmoniaLoop(loop, feed, out);
      const ammonia = feed[3] + 2 * equilibriumExtent(feed[0], feed[1], feed[2], feed[3]);
      const liquid = ammonia - out[3] / (1 - loop.purge);
      // dissolved: Henry-like, proportional to the partial pressure of each gas over the liquid
      const gas = (out[0] + out[1] + out[2] + out[3]) / (1 - loop.purge);
      const dissolve = (k: number): number => 1 - (k * liquid) / (gas + k * liquid);
      const inertRest = (1 - loop.purge) * (argonShare * fresh[2] + x[2]);
      const methaneRest = (1 - loop.purge) * ((1 - argonShare) * fresh[2] + x[3]);
      g[0] = out[0] * dissolve(0.002);
      g[1] = out[1] * dissolve(0.002);
      g[2] = inertRest * dissolve(0.005);
      g[3] = methaneRest * dissolve(0.02);
      g[4] = out[3];
      g[5] = 273.15 * 1.03 + 0.01 * (x[5] - 273.15);
      g[6] = 2e7;
      // argon over the battery limit: in, less purge and dissolved
      const leavesArgon = argonShare * fresh[2] + x[2] - g[2];
      balance = Math.abs(leavesArgon - argonShare * fresh[2]) / (argonShare * fresh[2]);
      const leavesMethane = (1 - argonShare) * fresh[2] + x[3] - g[3];
      balance = Math.max(balance, Math.abs(leavesMethane / ((1 - argonShare) * fresh[2]) - 1));
    },
    extraError: () => balance,
  };
}
