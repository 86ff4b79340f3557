import { expect, test } from 'vitest';
import { examples, resultOf } from '../published/recycle-examples.ts';

test.each(examples)('$name comes out as printed', (example) => {
  const result = resultOf(example);
  for (const [what, printed, ours, allowed] of example.answers)
    expect(Math.abs(ours(result) / printed - 1), what).toBeLessThan(allowed);
});

test('the loop with a closed form agrees to the last digits', () => {
  // H2 at the reactor is 60/(1 - 0.95 * 0.8); what is purged and converted follows
  const { streams, figures } = resultOf(
    examples.find(({ name }) => name === 'course notebook, fixed split')!,
  );
  const expectNear = (value: number, wanted: number) =>
    expect(Math.abs(value / wanted - 1)).toBeLessThan(1e-9);
  for (const [id, wanted] of Object.entries({ H2: 10, CO: 11, N2: 4 }))
    expectNear(streams['S6'].components_kmol_h[id], wanted);
  expectNear(figures.overall_conversion['CO'], 25 / 36);
  expectNear(figures.overall_conversion['H2'], 50 / 60);
});
