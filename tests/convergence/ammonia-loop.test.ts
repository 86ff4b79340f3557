import { expect, test } from 'vitest';
import { closeFixedPoint } from '../../src/convergence/driver.ts';
import type { MethodName } from '../../src/model/flowsheet.ts';
import {
  type AmmoniaLoop,
  converterFeedProblem,
  equilibriumExtent,
  loop1,
  recycleProblem,
} from './ammonia-loop.ts';
import { scaledDistance } from './expectations.ts';

const fresh = Float64Array.of(24.75, 74.25, 1, 0);
const emptyRecycle = Float64Array.of(0, 0, 0, 0, 0, 300, 2e7);

/**
 * Converter feed from the balances alone: inert = fresh/purge, H2 = 3 N2, and for nitrogen
 * purge · x + (1 − purge) · extent = fresh, by bisection on x.
 */
function balancedFeed(loop: AmmoniaLoop): Float64Array {
  const inert = loop.fresh[2] / loop.purge;
  const feedAt = (x: number): Float64Array => {
    const extent = (loop.fresh[0] - loop.purge * x) / (1 - loop.purge);
    const dry = 4 * (x - extent) + inert;
    const ratio = loop.ammoniaOverLiquid / (1 - loop.ammoniaOverLiquid);
    return Float64Array.of(x, 3 * x, inert, (1 - loop.purge) * ratio * dry);
  };
  let low = loop.fresh[0];
  let high = 1e5;
  for (let k = 0; k < 200; k++) {
    const x = (low + high) / 2;
    const feed = feedAt(x);
    const surplus =
      equilibriumExtent(feed[0], feed[1], feed[2], feed[3]) -
      (loop.fresh[0] - loop.purge * x) / (1 - loop.purge);
    if (surplus > 0) high = x;
    else low = x;
  }
  return feedAt((low + high) / 2);
}

// Reactor feed derived from the same correlations; seven digits given.
test('the balances of the loop give the known converter feed', () => {
  expect(scaledDistance(balancedFeed(loop1), [67.94947, 203.848409, 50, 8.905136])).toBeLessThan(1e-7);
});

test.each([
  ['direct', 0.02],
  ['wegstein', 0.02],
  ['anderson', 0.02],
  ['auto', 0.02],
  ['direct', 0.001],
  ['anderson', 0.001],
  ['auto', 0.001],
  ['anderson', 0.0001],
  ['auto', 0.0001],
] as const)('%s with a purge of %d delivers the tolerance it promises', (method, purge) => {
  const loop = { ...loop1, purge };
  const closed = closeFixedPoint(converterFeedProblem(loop), fresh, { method, maxPasses: 50_000 });
  expect(closed.reason).toBe('closed');
  // 1e-9 promised; the estimate of the distance may be out by a few per cent
  expect(scaledDistance(closed.x, balancedFeed(loop))).toBeLessThan(1.2e-9);
});

test('with a purge of 0.1 % direct substitution has a small residual long before it is closed', () => {
  const loop = { ...loop1, purge: 0.001 };
  const closed = closeFixedPoint(converterFeedProblem(loop), fresh, { method: 'direct', maxPasses: 50_000 });
  const small = closed.history.find((record) => record.residual <= 1e-9);
  expect(small?.error).toBeGreaterThan(5e-7);
  expect(closed.passes - (small?.pass ?? 0)).toBeGreaterThan(5000);
});

// Passes to 1e-9 of the loop with two inerts, temperature and pressure, from an empty recycle; computed by us, they
// guard against a silent loss of speed.
test.each([
  ['auto', 0.05, 9],
  ['auto', 0.02, 10],
  ['auto', 0.005, 13],
  ['auto', 0.001, 15],
  ['auto', 0.0001, 17],
  ['anderson', 0.05, 11],
  ['anderson', 0.02, 12],
  ['anderson', 0.001, 18],
  ['anderson', 0.0001, 18],
  ['wegstein', 0.05, 50],
  ['wegstein', 0.02, 50],
] as const)(
  '%s closes seven variables at a purge of %d within %d passes',
  (method: MethodName, purge, passes) => {
    const closed = closeFixedPoint(recycleProblem({ ...loop1, purge }), emptyRecycle, { method });
    expect(closed.reason).toBe('closed');
    expect(closed.passes).toBeLessThanOrEqual(passes);
  },
);

test('all methods agree on the seven variables to 1e-7', () => {
  const problem = recycleProblem(loop1);
  const answers = (['direct', 'wegstein', 'anderson', 'auto'] as const).map(
    (method) => closeFixedPoint(problem, emptyRecycle, { method, maxPasses: 2000 }).x,
  );
  for (const answer of answers) expect(scaledDistance(answer, answers[0])).toBeLessThan(1e-7);
});

test.each([
  ['rich in hydrogen', [20, 300, 0.1, 0.1, 0.1, 281, 2e7]],
  ['far too large', [2000, 6000, 100, 100, 400, 281, 2e7]],
  ['already full of inert', [50, 150, 200, 200, 10, 281, 2e7]],
])('auto closes from a start that is %s', (_name, start) => {
  const closed = closeFixedPoint(recycleProblem(loop1), Float64Array.from(start), { method: 'auto' });
  expect(closed.reason).toBe('closed');
  expect(closed.passes).toBeLessThanOrEqual(25);
});
