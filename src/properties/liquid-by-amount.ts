import type { LiquidPhase } from './liquid-phase.ts';

/** Step of the differences, as a share of the liquid; a component with less than that is stepped up only. */
const STEP = 1e-4;

/**
 * `LiquidPhase.byAmount` by differences over the condensables: of solvent shares and activities they alone
 * decide. Where there is one condensable composition acts on nothing, and nothing is asked.
 */
export function createLiquidByAmount(
  size: number,
  condensables: readonly number[],
  model: Pick<LiquidPhase, 'lnFugacityPerFraction' | 'enthalpyOverIdealGas'>,
): LiquidPhase['byAmount'] {
  const x = new Float64Array(size);
  const values = new Float64Array(size);

  return (liquid, lnFugacity, enthalpy) => {
    lnFugacity.fill(0);
    enthalpy.fill(0);
    if (condensables.length < 2) return;
    let total = 0;
    for (let i = 0; i < size; i++) total += liquid[i];
    for (let i = 0; i < size; i++) x[i] = liquid[i] / total;
    for (let c = 0; c < condensables.length; c++) {
      const j = condensables[c];
      const kept = x[j];
      if (kept > STEP) {
        add(j, kept + STEP, 0.5 / STEP, kept, lnFugacity, enthalpy);
        add(j, kept - STEP, -0.5 / STEP, kept, lnFugacity, enthalpy);
      } else {
        add(j, kept, -1.5 / STEP, kept, lnFugacity, enthalpy);
        add(j, kept + STEP, 2 / STEP, kept, lnFugacity, enthalpy);
        add(j, kept + 2 * STEP, -0.5 / STEP, kept, lnFugacity, enthalpy);
      }
      x[j] = kept;
    }
  };

  /** Adds what the point x[j] = at weighs in the derivatives of column j. */
  function add(
    j: number,
    at: number,
    weight: number,
    kept: number,
    lnFugacity: Float64Array,
    enthalpy: Float64Array,
  ): void {
    x[j] = at;
    model.lnFugacityPerFraction(x, values);
    for (let i = 0; i < size; i++) {
      if (values[i] !== Number.POSITIVE_INFINITY) lnFugacity[i * size + j] += weight * values[i];
    }
    model.enthalpyOverIdealGas(x, values);
    x[j] = kept;
    for (let i = 0; i < size; i++) enthalpy[j] += weight * x[i] * values[i];
  }
}
