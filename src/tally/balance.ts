import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { InputError } from '../diagnostics/diagnostic.ts';
import type { Flowsheet, MethodName } from '../model/flowsheet.ts';
import type { Result } from '../model/result.ts';
import { closeWithAims } from './aims.ts';
import { type CloseOptions, closePlant } from './close-plant.ts';
import { diagnose } from './diagnosis.ts';
import { trappedComponents } from './exits.ts';
import { createPlant } from './plant.ts';
import { tally } from './tally.ts';

export interface BalanceOptions {
  /** overrules the file */
  readonly method?: MethodName;
  readonly tolerance?: number;
  readonly maxPasses?: number;
}

export interface Balance {
  readonly result: Result;
  /** why it did not close; null when it did */
  readonly diagnosis: Diagnostic | null;
}

/**
 * Close the recycles of a flowsheet, reach its aims, and tally the closed streams.
 *
 * @throws InputError when a component can enter a loop and has no way out of it
 */
export function balance(flowsheet: Flowsheet, options: BalanceOptions = {}): Balance {
  const plant = createPlant(flowsheet);
  plant.refreshFeeds();
  const trapped = trappedComponents(plant);
  if (trapped.length > 0) throw new InputError(trapped);
  const close: CloseOptions = {
    method: options.method ?? flowsheet.solve.method,
    tolerance: options.tolerance ?? flowsheet.solve.tolerance,
    maxPasses: options.maxPasses ?? flowsheet.solve.maxPasses,
  };
  const { closure, aims } =
    flowsheet.aims.length === 0
      ? { closure: closePlant(plant, close), aims: {} }
      : closeWithAims(plant, close);
  return {
    result: tally(plant, closure, aims),
    diagnosis: closure.converged ? null : diagnose(plant, closure),
  };
}
