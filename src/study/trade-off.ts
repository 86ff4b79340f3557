import type { Flowsheet, Formula, Handle } from '../model/flowsheet.ts';
import type { Figures } from '../model/result.ts';
import { createCaseRunner } from './case-runner.ts';
import { keyFigureFormulas } from './key-figures.ts';

/** What one setting does to the key figures, all else as it stands. */
export interface TradeOff {
  readonly handle: Handle;
  /** places over the range of the handle [SI], rising */
  readonly values: Float64Array;
  /** one per formula: in the unit of formulas, NaN where the loop does not close */
  readonly figures: readonly { readonly formula: Formula; readonly values: Float64Array }[];
}

/** Places over a range: a curve that can be drawn, for the time of a closing or two each. */
const PLACES = 15;
/** More charts of one setting are not looked at. */
const MOST_FIGURES = 4;
/** What decides a loop comes first; the user's own figures only where there is room. */
const ORDER: readonly RegExp[] = [
  /^figures\.recycle_ratio$/,
  /^figures\.overall_yield\.value$/,
  /^figures\.specific_power_kWh_t$/,
  /^figures\.inerts\./,
  /^figures\.production_t_d$/,
  /^figures\.power_kW\.total$/,
  /^figures\.user\./,
];

/** The figures that trade-offs are drawn of. */
export function tradeOffFormulas(figures: Figures): readonly Formula[] {
  const known = keyFigureFormulas(figures);
  const one = (pattern: RegExp) => known.find(({ text }) => pattern.test(text));
  return ORDER.flatMap((pattern) => one(pattern) ?? []).slice(0, MOST_FIGURES);
}

/**
 * One trade-off, place by place: a page that must stay quick takes a few places at a time.
 *
 * @returns a generator that yields after each place and ends with the whole
 */
export function* tradeOffSteps(
  flowsheet: Flowsheet,
  handle: Handle,
  formulas: readonly Formula[],
): Generator<void, TradeOff> {
  const values = placesOver(handle.between);
  const figures = formulas.map((formula) => ({ formula, values: new Float64Array(PLACES) }));
  const runner = createCaseRunner(flowsheet, { settings: [handle.path], record: formulas });
  const out = new Float64Array(formulas.length);
  for (const [k, value] of values.entries()) {
    runner.run([value], out);
    figures.forEach((figure, f) => {
      figure.values[k] = out[f]!;
    });
    yield;
  }
  return { handle, values, figures };
}

/** All of a trade-off at once. */
export function tradeOff(flowsheet: Flowsheet, handle: Handle, formulas: readonly Formula[]): TradeOff {
  const steps = tradeOffSteps(flowsheet, handle, formulas);
  for (;;) {
    const { done, value } = steps.next();
    if (done) return value;
  }
}

/** Even steps; even ratios where the range spans a decade, as that of a purge does, which bends most at its low end. */
function placesOver([low, high]: readonly [number, number]): Float64Array {
  const share = (k: number) => k / (PLACES - 1);
  const isWide = low > 0 && high >= 10 * low;
  return Float64Array.from({ length: PLACES }, (_, k) =>
    isWide ? low * (high / low) ** share(k) : low + (high - low) * share(k),
  );
}
