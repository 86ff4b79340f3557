import { expect, test } from 'vitest';
import { randomFlowsheet, type Wanted } from '../../bench/random-flowsheet.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import { balance } from '../../src/tally/balance.ts';

const seeds = (count: number): number[] => Array.from({ length: count }, (_, k) => k);
const wanted: Wanted[] = [
  ...seeds(20).map((seed) => ({ blocks: 10, recycles: 1, seed })),
  ...seeds(8).map((seed) => ({ blocks: 30, recycles: 3, seed })),
  ...seeds(4).map((seed) => ({ blocks: 60, recycles: 5, seed })),
  ...seeds(3).map((seed) => ({ blocks: 100, recycles: 3 + 3 * seed, seed })),
  { blocks: 200, recycles: 4, seed: 0 },
  { blocks: 200, recycles: 20, seed: 1 },
];

// Atom, mass and energy balances hold whatever the flowsheet: relative to what enters, 1e-9 as in the shipped ones.
test.each(wanted)('$blocks blocks with $recycles recycles, seed $seed, are read and close', async (one) => {
  const text = randomFlowsheet(one);
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'random.yaml' });
  expect(diagnostics).toEqual([]);
  expect(flowsheet?.blocks).toHaveLength(one.blocks);
  const { result, diagnosis } = balance(flowsheet!);
  expect(diagnosis).toBeNull();
  expect(result.convergence.tears.length).toBeGreaterThan(0);
  const { mass, energy, atoms } = result.closure;
  const open = [mass, energy, ...Object.values(atoms), ...Object.values(result.ledger).map((e) => e.closure)];
  for (const value of open) expect(Math.abs(value)).toBeLessThan(1e-9);
});

test('the same size and seed give the same text, another seed another', () => {
  for (const one of wanted.slice(-4)) {
    expect(randomFlowsheet(one)).toBe(randomFlowsheet(one));
    expect(randomFlowsheet({ ...one, seed: one.seed + 100 })).not.toBe(randomFlowsheet(one));
  }
});

test('a size that cannot hold its recycles is refused', () => {
  expect(() => randomFlowsheet({ blocks: 19, recycles: 2, seed: 0 })).toThrow('too few');
});
