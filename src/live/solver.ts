import { type Diagnostic, InputError, PassTrouble } from '../diagnostics/diagnostic.ts';
import { readFlowsheet } from '../flowsheet/read.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import type { Result } from '../model/result.ts';
import type { LiveData } from '../sheets/page/live-data.ts';
import { closeWithAims } from '../tally/aims.ts';
import { balancePlant } from '../tally/balance.ts';
import { closePlant } from '../tally/close-plant.ts';
import { faultDiagnostics } from '../tally/diagnosis.ts';
import { createPlant, type Plant } from '../tally/plant.ts';
import { reportsOf } from '../tally/reports.ts';
import { tally } from '../tally/tally.ts';
import { type Moves, setTexts } from './moves.ts';

/** What came of closing the loop with settings moved. */
export type Outcome =
  | { readonly kind: 'closed'; readonly flowsheet: Flowsheet; readonly result: Result }
  /** it did not close, and why */
  | { readonly kind: 'open'; readonly flowsheet: Flowsheet; readonly diagnosis: Diagnostic }
  /** the settings will not do */
  | { readonly kind: 'refused'; readonly diagnostics: readonly Diagnostic[] };

/**
 * Closes the flowsheet of a page again and again: quickly while a setting is on the move, and then by the same
 * steps as `looptally balance FILE --set ...`.
 */
export interface LiveSolver {
  /** read the file with the moves made, and close it from the feeds */
  exact(moves: Moves): Promise<Outcome>;
  /**
   * Move the plant of the last exact closing and close it from where it stands.
   *
   * @param at  settings by path [SI]
   * @returns null where that does not close: then only `exact` can tell more
   */
  quick(at: ReadonlyMap<string, number>): Result | null;
}

export function createLiveSolver(data: LiveData): LiveSolver {
  let plant: Plant | null = null;
  return {
    async exact(moves) {
      plant = null;
      const { flowsheet, diagnostics } = await readFlowsheet(data.text, {
        file: data.file,
        case: data.case,
        set: [...data.set, ...setTexts(moves)],
      });
      if (flowsheet === null)
        return { kind: 'refused', diagnostics: diagnostics.filter(({ severity }) => severity === 'error') };
      const made = createPlant(flowsheet);
      try {
        const { result, diagnosis } = balancePlant(made);
        if (diagnosis !== null) return { kind: 'open', flowsheet, diagnosis };
        plant = made;
        return { kind: 'closed', flowsheet, result };
      } catch (trouble) {
        if (!(trouble instanceof InputError)) throw trouble;
        return { kind: 'open', flowsheet, diagnosis: trouble.diagnostics[0]! };
      }
    },
    quick(at) {
      if (plant === null) return null;
      for (const [path, value] of at) plant.set(path, value);
      const result = closedFromHere(plant);
      if (result !== null) return result;
      // What a failed closing leaves in its streams may be no numbers.
      plant = null;
      return null;
    },
  };
}

/** More would be felt in the hand: then the loop is closed from the feeds once the setting rests. */
const QUICK_PASSES = 30;

/** Without a diagnosis where it fails: that takes trials, which are for a setting at rest. */
function closedFromHere(plant: Plant): Result | null {
  const { method, tolerance } = plant.flowsheet.solve;
  const options = { method, tolerance, maxPasses: QUICK_PASSES, warm: true };
  try {
    const { closure, aims } =
      plant.flowsheet.aims.length === 0
        ? { closure: closePlant(plant, options), aims: {} }
        : closeWithAims(plant, options);
    if (!closure.converged) return null;
    const reports = reportsOf(plant);
    return faultDiagnostics(plant, (b) => reports[b]!).length > 0
      ? null
      : tally(plant, closure, { aims, reports });
  } catch (trouble) {
    if (trouble instanceof PassTrouble) return null;
    throw trouble;
  }
}
