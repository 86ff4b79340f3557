import fc from 'fast-check';
import { expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { randomLoop } from './random-loop.ts';
import { read } from './read.ts';

test('mass, atoms and energy of 1,000 random loops close to 1e-9', async () => {
  await fc.assert(
    fc.asyncProperty(randomLoop, async ({ text }) => {
      const { result, diagnosis } = balance(await read(text));
      expect(diagnosis).toBeNull();
      expect(Math.abs(result.closure.mass)).toBeLessThan(1e-9);
      expect(Math.abs(result.closure.energy)).toBeLessThan(1e-9);
      for (const open of Object.values(result.closure.atoms)) expect(Math.abs(open)).toBeLessThan(1e-9);
      for (const entry of Object.values(result.ledger)) expect(Math.abs(entry.closure)).toBeLessThan(1e-9);
    }),
    { numRuns: 1000, seed: 20261201 },
  );
});
