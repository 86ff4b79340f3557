import type { LiquidPhase } from './liquid-phase.ts';

/** Steps of the differences, relative [-]: a liquid's ln f and enthalpy are all but straight in the pressure. */
const KELVIN_STEP = 3e-5;
const PASCAL_STEP = 1e-3;

/** A liquid of given amounts x and how it moves, after `set`. */
export interface LiquidSlopes {
  /** ln(fᵢ/xᵢ); +Infinity for what stays out, whose slopes are 0 */
  readonly lnFugacity: Float64Array;
  /** ∂ ln(fᵢ/xᵢ)/∂T [1/K], /∂P [1/Pa], and N ∂ ln(fᵢ/xᵢ)/∂xⱼ by rows (see LiquidPhase.byAmount) */
  readonly perKelvin: Float64Array;
  readonly perPascal: Float64Array;
  readonly byAmount: Float64Array;
  /** enthalpy over the ideal gas that one more mole of each component brings [J/mol] */
  readonly enthalpies: Float64Array;
  /** that of the whole and its slopes at the given amounts [W], [W/K], [W/Pa] */
  readonly total: { enthalpy: number; perKelvin: number; perPascal: number };
  set(T: number, P: number, x: Float64Array): void;
}

/** Derivatives of a liquid; in temperature and pressure by differences, as its correlations are of many forms. */
export function createLiquidSlopes(liquidPhase: LiquidPhase): LiquidSlopes {
  const size = liquidPhase.roles.length;
  const lnFugacity = new Float64Array(size);
  const perKelvin = new Float64Array(size);
  const perPascal = new Float64Array(size);
  const byAmount = new Float64Array(size * size);
  const enthalpies = new Float64Array(size);
  const total = { enthalpy: 0, perKelvin: 0, perPascal: 0 };
  const beside = new Float64Array(size);

  return {
    lnFugacity,
    perKelvin,
    perPascal,
    byAmount,
    enthalpies,
    total,
    set(T, P, x) {
      total.perKelvin = difference(T * (1 + KELVIN_STEP), T * (1 - KELVIN_STEP), P, P, x, perKelvin);
      total.perPascal = difference(T, T, P * (1 + PASCAL_STEP), P * (1 - PASCAL_STEP), x, perPascal);
      liquidPhase.at(T, P);
      liquidPhase.lnFugacityPerFraction(x, lnFugacity);
      liquidPhase.byAmount(x, byAmount, enthalpies);
      total.enthalpy = excess(x);
      for (let i = 0; i < size; i++) enthalpies[i] += beside[i];
    },
  };

  /** Slopes between two states: of ln(f/x) into `out`; returns that of the enthalpy. */
  function difference(
    T1: number,
    T0: number,
    P1: number,
    P0: number,
    x: Float64Array,
    out: Float64Array,
  ): number {
    const step = T1 - T0 + (P1 - P0);
    liquidPhase.at(T0, P0);
    liquidPhase.lnFugacityPerFraction(x, out);
    const before = excess(x);
    liquidPhase.at(T1, P1);
    liquidPhase.lnFugacityPerFraction(x, beside);
    for (let i = 0; i < size; i++) {
      out[i] = beside[i] === Number.POSITIVE_INFINITY ? 0 : (beside[i] - out[i]) / step;
    }
    return (excess(x) - before) / step;
  }

  /** Enthalpy over the ideal gas [W]; leaves those of a mole in `beside`. */
  function excess(x: Float64Array): number {
    liquidPhase.enthalpyOverIdealGas(x, beside);
    let sum = 0;
    for (let i = 0; i < size; i++) sum += x[i] * beside[i];
    return sum;
  }
}
