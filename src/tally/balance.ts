import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { InputError } from '../diagnostics/diagnostic.ts';
import type { Flowsheet, MethodName } from '../model/flowsheet.ts';
import type { Result } from '../model/result.ts';
import { closeWithAims } from './aims.ts';
import { type CloseOptions, closePlant } from './close-plant.ts';
import { diagnose, faultDiagnostics } from './diagnosis.ts';
import { trappedComponents } from './exits.ts';
import { createPlant, type Plant } from './plant.ts';
import { reportsOf } from './reports.ts';
import { tally } from './tally.ts';

export interface BalanceOptions {
  /** overrules the file */
  readonly method?: MethodName;
  readonly tolerance?: number;
  readonly maxPasses?: number;
  /** false leaves the plot-ready curves out of the details of the blocks (the printed sheets show none) */
  readonly curves?: boolean;
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
  return balancePlant(createPlant(flowsheet), options);
}

/** The same on a plant that is kept for more; it is left closed. */
export function balancePlant(plant: Plant, options: BalanceOptions = {}): Balance {
  const { flowsheet } = plant;
  plant.refreshFeeds();
  const trapped = trappedComponents(plant);
  if (trapped.length > 0) throw new InputError(trapped);
  const close: CloseOptions = {
    method: options.method ?? flowsheet.solve.method,
    tolerance: options.tolerance ?? flowsheet.solve.tolerance,
    maxPasses: options.maxPasses ?? flowsheet.solve.maxPasses,
  };
  const { closure, last, aims } =
    flowsheet.aims.length === 0 ? closed(plant, close) : closeWithAims(plant, close);
  const reports = reportsOf(plant);
  const read = { aims, reports, curves: options.curves ?? true };
  if (!closure.converged)
    return { result: tally(plant, closure, read), diagnosis: diagnose(plant, last, close) };
  // Streams that agree with one another are no answer where a block could not do as it was told.
  const [fault = null] = faultDiagnostics(plant, (b) => reports[b]!);
  const kept = fault === null ? closure : { ...closure, history: closure.history, converged: false };
  return { result: tally(plant, kept, read), diagnosis: fault };
}

function closed(plant: Plant, options: CloseOptions) {
  const closure = closePlant(plant, options);
  return { closure, last: closure, aims: {} };
}
