import { expect, test } from 'vitest';
import { ammoniaLoop } from '../../bench/random-loops.ts';
import { randomNumbers } from '../../bench/random-numbers.ts';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';

const LOOPS = 300;

test(`${LOOPS} random ammonia loops from hopeless to easy all close without a guess, in few passes`, async () => {
  const draw = randomNumbers(Number(process.env['SEED'] ?? 7));
  const passes: number[] = [];
  for (let k = 0; k < LOOPS; k++) {
    const text = ammoniaLoop(draw);
    const { result, diagnosis } = balance(await read(text), { curves: false });
    expect(diagnosis, text).toBeNull();
    passes.push(result.convergence.passes);
  }
  const mean = passes.reduce((sum, n) => sum + n, 0) / LOOPS;
  // 6.5 of 10,000; another 300 may be a little luckier or less so
  expect(mean).toBeLessThan(7.5);
  expect(Math.max(...passes)).toBeLessThan(40);
}, 120_000);
