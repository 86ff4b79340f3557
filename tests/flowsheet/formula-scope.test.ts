import { expect, test } from 'vitest';
import { formulaRoots, formulaWorld, misnamed } from '../../src/flowsheet/formula-scope.ts';
import { compileFormula } from '../../src/units/formula.ts';

const world = formulaWorld({
  tags: ['S1', 'S2'],
  blocks: ['converter', 'condenser', 'purge'],
  components: ['H2', 'N2'],
});

function mendOf(text: string): string | undefined {
  const compiled = compileFormula(text, formulaRoots);
  if (!compiled.ok) throw new Error(compiled.what);
  return misnamed(compiled.names, world)?.fault.mend;
}

test.each([
  ['figures.recycle_ration', 'write figures.recycle_ratio'],
  ['figures.yield.value', 'write figures.overall_yield.value'],
  ['streams.S1.y.h2', 'write streams.S1.y.H2'],
  ['figures.overall_yield', 'write figures.overall_yield.value'],
])('%s: a name that is near is proposed', (text, mend) => {
  expect(mendOf(text)).toBe(mend);
});

test.each([
  ['streams.product.flow', 'write streams.NAME, NAME one of S1, S2'],
  ['streams.S1.y.CO', 'write streams.S1.y.NAME, NAME one of H2, N2'],
  ['streams.S1.y', 'write streams.S1.y.NAME, NAME one of H2, N2'],
  ['figures.user.slip', 'take it out'],
])('%s: where none is near, none is picked for the user', (text, mend) => {
  expect(mendOf(text)).toBe(mend);
});
