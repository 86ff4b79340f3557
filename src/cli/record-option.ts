import { formulaRoots } from '../flowsheet/formula-scope.ts';
import type { Flowsheet, Formula } from '../model/flowsheet.ts';
import { compileFormula } from '../units/formula.ts';
import { typedRecord } from './sweep-record.ts';

/**
 * The formulas of `--record EXPR,...`, checked against the flowsheet.
 *
 * @throws Refusal with every fault at its place on the command line
 */
export function recordedFormulas(words: readonly string[], flowsheet: Flowsheet): Formula[] {
  return typedRecord(words, flowsheet).flatMap((text): Formula[] => {
    const compiled = compileFormula(text, formulaRoots);
    return compiled.ok ? [{ text, evaluate: compiled.evaluate }] : [];
  });
}
