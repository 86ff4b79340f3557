import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { closedRecycle, furthest } from '../../bench/scipy.ts';
import { scipyProblem } from '../../bench/scipy-problem.ts';
import { runScipy, scipyMissing } from '../../bench/scipy-run.ts';
import { read } from '../tally/read.ts';
import { shippedText } from '../tally/shipped.ts';

const script = fileURLToPath(new URL('../../bench/scipy_loop.py', import.meta.url));
const missing = scipyMissing();

// An independent implementation in another language: constants are handed over, every equation is written again.
// 1e-11 leaves room for the inner searches of both sides, which end at 1e-14.
test.skipIf(missing !== null).each([
  ['plain', false],
  ['tuned', true],
])('the %s loop in Python closes at our recycle, by scipy', async (_, tuned) => {
  const flowsheet = await read(shippedText('reference-loop.yaml'));
  const problem = scipyProblem(flowsheet, {
    tolerance: 1e-9,
    rounds: 1,
    tuned,
    methods: ['hybr', 'anderson'],
  });
  const run = runScipy(problem, script);
  const ours = closedRecycle(flowsheet);
  expect(furthest(run.answer, ours)).toBeLessThan(1e-11);
  expect(run.results.length).toBe(4);
  for (const { method, converged, answer } of run.results) {
    expect(converged, method).toBe(true);
    expect(furthest(answer!, ours), method).toBeLessThan(1.1e-9);
  }
});

test.skipIf(missing !== null)(
  'an answer that is off is told: without the shift of volumes it is another loop',
  async () => {
    const flowsheet = await read(shippedText('reference-loop.yaml'));
    const problem = scipyProblem(flowsheet, { tolerance: 1e-9, rounds: 1, tuned: false, methods: ['hybr'] });
    const unshifted = { ...problem, components: problem.components.map((c) => ({ ...c, rackettZ: null })) };
    expect(furthest(runScipy(unshifted, script).answer, closedRecycle(flowsheet))).toBeGreaterThan(1e-3);
  },
);
