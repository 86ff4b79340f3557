import { InputError } from '../diagnostics/diagnostic.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import type { Axis } from '../study/axis.ts';
import { type BalanceOptions, balancePlant } from '../tally/balance.ts';
import { createPlant } from '../tally/plant.ts';
import { createPlantScope } from '../tally/scope.ts';

/** The first case of a sweep, closed before the others to see what they are about. */
export interface FirstCase {
  /** what formulas may name, read from it; null where it does not close */
  readonly scope: Readonly<Record<string, unknown>> | null;
  /**
   * What it warns of, each in a sentence: a table of numbers says nothing of refrigeration that is not counted, or of data
   * used outside their range. Empty where it does not close, which its note says.
   */
  readonly warnings: readonly string[];
}

export function closeFirstCase(
  flowsheet: Flowsheet,
  axes: readonly Axis[],
  options: BalanceOptions,
): FirstCase {
  const plant = createPlant(flowsheet);
  for (const { path, values } of axes) plant.set(path, values[0]!);
  try {
    const { result, diagnosis } = balancePlant(plant, { ...options, curves: false });
    if (diagnosis !== null) return { scope: null, warnings: [] };
    const warnings = result.warnings.map(({ where, message }) => `${where}: ${message}`);
    return { scope: createPlantScope(plant).scope, warnings: [...new Set(warnings)] };
  } catch (error) {
    // What can enter a loop and never leave it: no case of such a sweep closes, and this is why.
    if (error instanceof InputError)
      return { scope: null, warnings: error.diagnostics.map(({ what }) => what) };
    throw error;
  }
}
