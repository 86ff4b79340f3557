import { type FormulaWorld, formulaRoots, misnamed } from '../flowsheet/formula-scope.ts';
import type { Flowsheet, Formula } from '../model/flowsheet.ts';
import { compileFormula } from '../units/formula.ts';
import { type UsageFault, usageRefusals } from './refusal.ts';

/**
 * The formulas of `--record EXPR,...`, checked against the flowsheet.
 *
 * @throws Refusal with every fault at its place on the command line
 */
export function recordedFormulas(words: readonly string[], flowsheet: Flowsheet): Formula[] {
  const world: FormulaWorld = {
    tags: flowsheet.streams.map(({ tag }) => tag),
    blocks: flowsheet.blocks.map(({ name }) => name),
    components: flowsheet.components.map(({ id }) => id),
    figures: flowsheet.figures.map(({ name }) => name),
  };
  const faults: UsageFault[] = [];
  const formulas = words.flatMap((word) =>
    pieces(word).flatMap(({ text, offset }): Formula[] => {
      const compiled = compileFormula(text, formulaRoots);
      if (!compiled.ok) {
        const { what, why, mend, length } = compiled;
        const place = { at: word, offset: offset + compiled.offset, length };
        faults.push({ code: 'bad-formula', what: `--record: ${what}`, why, mend, ...place });
        return [];
      }
      const wrong = misnamed(compiled.names, world);
      if (wrong !== null) {
        const place = { at: word, offset: offset + wrong.name.offset, length: wrong.name.length };
        faults.push({ ...wrong.fault, what: `--record: ${wrong.fault.what}`, ...place });
        return [];
      }
      return [{ text, evaluate: compiled.evaluate }];
    }),
  );
  if (faults.length > 0) throw usageRefusals(faults);
  return formulas.filter(({ text }, i) => formulas.findIndex((one) => one.text === text) === i);
}

/** The word cut at its commas, those inside brackets left alone. */
function pieces(word: string): { readonly text: string; readonly offset: number }[] {
  const cut: { text: string; offset: number }[] = [];
  let depth = 0;
  let from = 0;
  for (let i = 0; i <= word.length; i++) {
    if (word[i] === '(') depth += 1;
    else if (word[i] === ')') depth -= 1;
    else if (i === word.length || (word[i] === ',' && depth === 0)) {
      const piece = word.slice(from, i);
      cut.push({ text: piece.trim(), offset: from + Math.max(piece.search(/\S/), 0) });
      from = i + 1;
    }
  }
  return cut;
}
