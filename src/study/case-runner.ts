import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Flowsheet, Formula, MethodName } from '../model/flowsheet.ts';
import { closeWithAims } from '../tally/aims.ts';
import { type CloseOptions, closePlant, type PlantClosure } from '../tally/close-plant.ts';
import { faultDiagnostics } from '../tally/diagnosis.ts';
import { createPlant, type Plant } from '../tally/plant.ts';
import { createPlantScope } from '../tally/scope.ts';
import { readTears, tearSize, writeTears } from '../tally/tears.ts';
import { createPrediction } from './prediction.ts';

/** Passes that a neighbour's answer may take as a start before the case begins again at the feeds. */
const WARM_PASSES = 20;

export interface CaseRunnerOptions {
  /** paths of the settings that are moved, e.g. condenser.temperature */
  readonly settings: readonly string[];
  /** what is read out of every closed case */
  readonly record: readonly Formula[];
  /** overrules the file */
  readonly method?: MethodName;
  readonly tolerance?: number;
  readonly maxPasses?: number;
}

export interface CaseOutcome {
  /** closed, with every block as its settings ask, and every aim of the file reached */
  readonly converged: boolean;
  /** all that were made for this case */
  readonly passes: number;
  /** why it failed; empty where it did not */
  readonly note: string;
}

/** Closes one flowsheet again and again with its settings moved. */
export interface CaseRunner {
  /** the plant that is moved, as the last case left it */
  readonly plant: Plant;
  /**
   * Close one case.
   *
   * @param values  one per setting [SI]
   * @param out  written: what was recorded, in the units of formulas (kmol/h, K, bar, kW, 0-1); NaN where the case failed
   * @param warm  starts from the last closed cases and from the feeds only where that fails; false forgets them, so that
   *   the answer depends on this case alone
   */
  run(values: ArrayLike<number>, out: Float64Array, options?: { readonly warm?: boolean }): CaseOutcome;
}

/** Make a flowsheet ready for many cases: one plant is kept and moved, and only what is recorded is read out of it. */
export function createCaseRunner(flowsheet: Flowsheet, options: CaseRunnerOptions): CaseRunner {
  const { settings, record } = options;
  const cold: CloseOptions = {
    method: options.method ?? flowsheet.solve.method,
    tolerance: options.tolerance ?? flowsheet.solve.tolerance,
    maxPasses: options.maxPasses ?? flowsheet.solve.maxPasses,
    warm: false,
  };
  const near: CloseOptions = { ...cold, maxPasses: Math.min(cold.maxPasses, WARM_PASSES), warm: true };
  let plant = createPlant(flowsheet);
  const reading = createPlantScope(plant);
  const { aims } = flowsheet;
  const size = tearSize(plant);
  /** the torn streams, then the settings that the aims of the file move */
  const answer = new Float64Array(size + aims.length);
  const prediction = createPrediction(settings.length, leastAnswer(plant, answer.length));
  /** no case has left anything behind in this plant */
  let untouched = true;

  /** A plant in which nothing is left of a case: what a failed one leaves in its streams may be no numbers. */
  function renew(values: ArrayLike<number>): void {
    if (!untouched) {
      plant = plant.renewed();
      reading.refresh(plant);
    }
    move(values);
  }

  function move(values: ArrayLike<number>): void {
    settings.forEach((path, s) => {
      plant.set(path, values[s]!);
    });
  }

  function startFromForeseen(): void {
    writeTears(plant, answer);
    aims.forEach(({ move: path, between: [low, high] }, a) => {
      plant.set(path, Math.min(Math.max(answer[size + a]!, low), high));
    });
  }

  function remember(values: ArrayLike<number>): void {
    readTears(plant, answer);
    aims.forEach(({ move: path }, a) => {
      answer[size + a] = plant.get(path)!;
    });
    prediction.add(values, answer);
  }

  function attempt(close: CloseOptions): Attempt {
    try {
      const { closure, missed } = closeOnce(plant, close);
      reading.refresh();
      if (!closure.converged) return failed(closure.passes, whyNot(closure));
      const [fault] = faultDiagnostics(plant, reading.reportOf);
      if (fault) return failed(closure.passes, sentence(fault.what, fault.why));
      return { closed: true, passes: closure.passes, note: missed };
    } catch (trouble) {
      if (!(trouble instanceof PassTrouble)) throw trouble;
      return failed(1, sentence(trouble.message, trouble.why));
    }
  }

  return {
    get plant() {
      return plant;
    },
    run(values, out, { warm = true } = {}) {
      if (!warm) prediction.clear();
      const foreseen = prediction.at(values, answer) > 0;
      let spent = 0;
      let end: Attempt = NOTHING;
      if (foreseen) {
        move(values);
        startFromForeseen();
        end = attempt(near);
      }
      if (!end.closed) {
        spent = end.passes;
        renew(values);
        untouched = false;
        end = attempt(cold);
      }
      const converged = end.closed && end.note === '';
      if (end.closed) remember(values);
      record.forEach(({ evaluate }, r) => {
        out[r] = converged ? evaluate(reading.scope) : Number.NaN;
      });
      return { converged, passes: spent + end.passes, note: end.note };
    },
  };
}

interface Attempt {
  /** the recycles are closed and no block is at fault, though an aim may have been missed */
  readonly closed: boolean;
  readonly passes: number;
  readonly note: string;
}

const NOTHING: Attempt = { closed: false, passes: 0, note: '' };

function failed(passes: number, note: string): Attempt {
  return { closed: false, passes, note };
}

function closeOnce(plant: Plant, options: CloseOptions): { closure: PlantClosure; missed: string } {
  if (plant.flowsheet.aims.length === 0) return { closure: closePlant(plant, options), missed: '' };
  const { closure, aims } = closeWithAims(plant, options);
  const missed = Object.entries(aims).flatMap(([name, { reached, note }]) =>
    reached ? [] : [`aim ${name} is not reached${note === null ? '' : `: ${note}`}`],
  );
  return { closure, missed: missed.join('; ') };
}

function whyNot({ failure, residual, passes, history }: PlantClosure): string {
  if (failure?.trouble) {
    const { block, message, why } = failure.trouble;
    return sentence(block === null ? message : `${block}: ${message}`, why);
  }
  const worst = history.at(-1)?.worst ?? '';
  return `not closed in ${passes} passes: ${worst === '' ? 'the recycle' : worst} is ${residual.toExponential(1)} off`;
}

function sentence(what: string, why: string): string {
  return `${what.replace(/\.$/, '')} (${why})`;
}

/** What a prediction may not go below: no flow below zero, no temperature or pressure of nothing. */
function leastAnswer(plant: Plant, size: number): Float64Array {
  const width = plant.mixture.size + 2;
  const tears = tearSize(plant);
  return new Float64Array(size).map((_, i) =>
    i >= tears ? Number.NEGATIVE_INFINITY : i % width < plant.mixture.size ? 0 : 1,
  );
}
