import type { Component } from '../model/component.ts';
import type { Role } from './component-roles.ts';
import { R } from './constants.ts';
import type { GasModel } from './gas-model.ts';
import type { LiquidPhase } from './liquid-phase.ts';

/**
 * The liquid of `liquid: eos`: the liquid root of the equation of state that the gas is computed with,
 *   ln(fᵢ/xᵢ) = ln φᵢ + ln P,  hᵢ − hᵢ(ideal gas) = −R T² ∂ ln φᵢ/∂T,  vᵢ = R T (1/P + ∂ ln φᵢ/∂P).
 *
 * @param roles  what is `gas` stays out of it
 * @param cubic  the equation on its liquid root
 */
export function createCubicLiquid(
  components: readonly Component[],
  roles: readonly Role[],
  cubic: GasModel,
): LiquidPhase {
  const size = components.length;
  const inside = roles.map((role) => role === 'condensable' || role === 'dissolved');
  const criticalK = components.map((c) => c.critical?.temperatureK ?? 0);
  const perKelvin = new Float64Array(size);
  const perPascal = new Float64Array(size);
  const now = { T: Number.NaN, P: Number.NaN };

  return {
    roles,
    condensables: roles.flatMap((role, i) => (role === 'condensable' ? [i] : [])),
    pureCondensate: -1,
    compositionActs: true,
    at(T, P) {
      now.T = T;
      now.P = P;
    },
    mayForm(T, z) {
      for (let i = 0; i < size; i++) if (inside[i] && z[i] > 0 && T < criticalK[i]) return true;
      return false;
    },
    isLiquid: () => true,
    lnFugacityPerFraction(x, out) {
      cubic.lnPhi(now.T, now.P, x, out);
      const lnP = Math.log(now.P);
      for (let i = 0; i < size; i++) out[i] = inside[i] ? out[i] + lnP : Number.POSITIVE_INFINITY;
    },
    enthalpyOverIdealGas(x, out) {
      cubic.lnPhiSlopes(now.T, now.P, x, perKelvin, perPascal);
      for (let i = 0; i < size; i++) out[i] = inside[i] ? -R * now.T * now.T * perKelvin[i] : 0;
    },
    byAmount(x, lnFugacity, enthalpy) {
      cubic.lnPhiByAmount(now.T, now.P, x, lnFugacity);
      enthalpy.fill(0);
    },
    volumes(x, out) {
      cubic.lnPhiSlopes(now.T, now.P, x, perKelvin, perPascal);
      for (let i = 0; i < size; i++) out[i] = inside[i] ? R * now.T * (1 / now.P + perPascal[i]) : 0;
    },
  };
}
