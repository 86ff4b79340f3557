import { expect, test } from 'vitest';
import type { Result } from '../../src/model/result.ts';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';
import { shippedText } from './shipped.ts';

const text = shippedText('ammonia-kinetic-bed.yaml');

async function closed(file: string, set: readonly string[] = []): Promise<Result> {
  const { result, diagnosis } = balance(await read(file, { set }));
  expect(diagnosis).toBeNull();
  return result;
}

interface BedDetails {
  readonly approach_K: Readonly<Record<string, number>>;
  readonly conversion: Readonly<Record<string, number>>;
  readonly outlet_K: number;
}
const bedOf = (result: Result) => result.blocks['bed']!.details as unknown as BedDetails;

test('a loop around a kinetic bed closes in mass, atoms and energy', async () => {
  const { closure } = await closed(text);
  expect(Math.abs(closure.mass)).toBeLessThan(1e-9);
  expect(Math.abs(closure.energy)).toBeLessThan(1e-9);
  for (const atom of Object.values(closure.atoms)) expect(Math.abs(atom)).toBeLessThan(1e-9);
});

test('the conversion of the bed is a figure of the loop', async () => {
  const result = await closed(text);
  expect(result.figures.per_pass_conversion['bed']).toEqual(bedOf(result).conversion);
});

test('an equilibrium reactor with the approach found closes the loop at the same place', async () => {
  const result = await closed(text);
  const approach = bedOf(result).approach_K['synthesis']!;
  const quick = text
    .replace(
      /bed:\n[\s\S]*?adiabatic: true/,
      `bed:\n    kind: reactor\n    reactions: {synthesis: {approach: ${approach} K}}\n    adiabatic: true`,
    )
    .replace(/cases:[\s\S]*/, '');
  expect(quick).not.toContain('kinetic_bed');
  const same = await closed(quick);
  // both loops are closed to 1e-9; one pass takes a fifth of the hydrogen, which multiplies what is left
  expect(Math.abs(same.figures.recycle_ratio! / result.figures.recycle_ratio! - 1)).toBeLessThan(1e-6);
  expect(Math.abs(same.streams['S4']!.temperature_K - result.streams['S4']!.temperature_K)).toBeLessThan(
    1e-4,
  );
});

test('with half the catalyst the bed goes out: one pass converts next to nothing', async () => {
  const { result } = balance(await read(text, { case: 'half the catalyst' }));
  expect(result.convergence.converged).toBe(true);
  expect(result.figures.per_pass_conversion['bed']!['H2']).toBeLessThan(0.02);
  expect(result.streams['S4']!.temperature_K - result.streams['S3']!.temperature_K).toBeLessThan(15);
});

test('an aim finds the catalyst for a wanted approach', async () => {
  const aimed = text.replace(
    /cases:[\s\S]*/,
    'aims:\n  nearness: {move: bed.volume, between: [35 m3, 80 m3], until: blocks.bed.approach_K.synthesis = 8 K}\n',
  );
  const result = await closed(aimed);
  expect(result.aims['nearness']!.reached).toBe(true);
  expect(bedOf(result).approach_K['synthesis']).toBeCloseTo(8, 4);
  expect(result.aims['nearness']!.value).toBeLessThan(45);
});
