import { formulaRoots } from '../src/flowsheet/formula-scope.ts';
import { type Dimension, dimensions } from '../src/units/dimension.ts';
import { compileFormula } from '../src/units/formula.ts';
import { loadUnitEngine, needsUnitEngine, parseQuantity } from '../src/units/quantity.ts';

const SCOPE = {
  streams: { S2: { y: { Ar: 0.1 }, T: 300, P: 200, flow: 5 } },
  blocks: {},
  figures: { recycle_ratio: 3 },
};

/** A formula is refused with a place inside it, or gives a number. */
export function judgeFormula(text: string): string {
  const formula = compileFormula(text, formulaRoots);
  if (formula.ok) {
    if (typeof formula.evaluate(SCOPE) !== 'number') throw new Error('a formula that gives no number');
    return 'accepted';
  }
  const { offset, length, what, why, mend } = formula;
  if (!(offset >= 0 && length >= 0 && offset <= text.length))
    throw new Error(`a place outside the formula: ${offset}`);
  checkParts([what, why, mend], text);
  return 'refused';
}

/** A quantity is refused, or gives a finite number in every dimension. */
export async function judgeQuantity(text: string): Promise<string> {
  if (needsUnitEngine(text)) await loadUnitEngine();
  let accepted = false;
  for (const dimension of Object.keys(dimensions) as Dimension[]) {
    const read = parseQuantity(text, dimension);
    if (!read.ok) checkParts([read.what, read.why, read.mend], text);
    else if (!Number.isFinite(read.value)) throw new Error(`${dimension} of ${read.value}`);
    else accepted = true;
  }
  return accepted ? 'accepted' : 'refused';
}

function checkParts(parts: readonly string[], text: string): void {
  for (const part of parts) {
    if (!/\S/.test(part)) throw new Error('a part of the message is empty');
    if (/undefined|NaN|\[object/.test(part) && !/undefined|NaN|\[object/.test(text))
      throw new Error(`a message says ${part}`);
  }
}
