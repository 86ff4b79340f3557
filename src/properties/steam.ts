import { region1, region2Ideal, region2Residual, region4 } from './data/if97.ts';

/**
 * Water and steam by the Industrial Formulation 1997: the saturation line (region 4, 273.15 to 647.096 K), the
 * enthalpy of the liquid (region 1) and of the vapour (region 2). Enthalpies are J/kg, zero for the saturated
 * liquid at the triple point: another zero than that of the process streams, so only differences are used.
 *
 * @source IAPWS R7-97(2012), Revised Release on the IAPWS Industrial Formulation 1997
 */

/** R of the formulation [J/(kg K)]; it is not R/M of today's constants. */
const R_WATER = 461.526;
/** Highest saturation pressure at which both phases lie in regions 1 and 2, at 350 degC [Pa]. */
export const HIGHEST_STEAM_PA = 16.5e6;
/** Lowest saturation pressure, at the triple point [Pa]. */
export const LOWEST_STEAM_PA = 611.657;
/** Upper edge of region 2 [K]. */
export const HOTTEST_STEAM_K = 1073.15;

/** Saturation pressure [Pa] at a temperature [K], 273.15–647.096 K. */
export function saturationPressurePa(T: number): number {
  const [n1, n2, n3, n4, n5, n6, n7, n8, n9, n10] = region4;
  const v = T + n9 / (T - n10);
  const A = v * v + n1 * v + n2;
  const B = n3 * v * v + n4 * v + n5;
  const C = n6 * v * v + n7 * v + n8;
  return 1e6 * ((2 * C) / (-B + Math.sqrt(B * B - 4 * A * C))) ** 4;
}

/** Saturation temperature [K] at a pressure [Pa], 611 Pa to 22.064 MPa. */
export function saturationTemperatureK(P: number): number {
  const [n1, n2, n3, n4, n5, n6, n7, n8, n9, n10] = region4;
  const b = (P / 1e6) ** 0.25;
  const E = b * b + n3 * b + n6;
  const F = n1 * b * b + n4 * b + n7;
  const G = n2 * b * b + n5 * b + n8;
  const D = (2 * G) / (-F - Math.sqrt(F * F - 4 * E * G));
  return (n10 + D - Math.sqrt((n10 + D) ** 2 - 4 * (n9 + n10 * D))) / 2;
}

/** Enthalpy of liquid water [J/kg], 273.15–623.15 K up to 100 MPa: h = R T* ∂γ/∂τ, γ(π, τ) of region 1. */
export function liquidWaterEnthalpy(T: number, P: number): number {
  const a = 7.1 - P / 16.53e6;
  const b = 1386 / T - 1.222;
  let slope = 0;
  for (const [I, J, n] of region1) slope += n * a ** I * J * b ** (J - 1);
  return R_WATER * 1386 * slope;
}

/** Enthalpy of steam [J/kg], from saturation to 1073.15 K: h = R T* (∂γ°/∂τ + ∂γʳ/∂τ) of region 2. */
export function steamEnthalpy(T: number, P: number): number {
  const p = P / 1e6;
  const t = 540 / T;
  let slope = 0;
  for (const [J, n] of region2Ideal) slope += n * J * t ** (J - 1);
  for (const [I, J, n] of region2Residual) slope += n * p ** I * J * (t - 0.5) ** (J - 1);
  return R_WATER * 540 * slope;
}
