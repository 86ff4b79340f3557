import { InputError } from '../diagnostics/diagnostic.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import type { Axis } from '../study/axis.ts';
import { balanceAt } from '../study/balance-at.ts';

/**
 * What the first case of a sweep warns of, each in a sentence: a table of numbers says nothing of refrigeration that is not
 * counted, or of data used outside their range. Empty where that case does not close, which its note says.
 */
export function firstWarnings(flowsheet: Flowsheet, axes: readonly Axis[]): string[] {
  const first = axes.map(({ path, values }) => ({ path, value: values[0]! }));
  try {
    const { result, diagnosis } = balanceAt(flowsheet, first, { curves: false });
    if (diagnosis !== null) return [];
    return [...new Set(result.warnings.map(({ where, message }) => `${where}: ${message}`))];
  } catch (error) {
    // What can enter a loop and never leave it: no case of such a sweep closes, and this is why.
    if (error instanceof InputError) return error.diagnostics.map(({ what }) => what);
    throw error;
  }
}
