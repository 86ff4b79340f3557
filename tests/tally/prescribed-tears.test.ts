import { describe, expect, test } from 'vitest';
import { randomFlowsheet } from '../../bench/random-flowsheet.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import { balance } from '../../src/tally/balance.ts';
import { planFlowsheet } from '../../src/tally/plan.ts';
import { read } from './read.ts';
import { shippedText } from './shipped.ts';

const tornAt = (flowsheet: Flowsheet, tear: readonly string[]): Flowsheet => ({
  ...flowsheet,
  solve: { ...flowsheet.solve, tear },
});

// The answer does not know where the loop was cut: to 1e-9 of each stream, each closed to 1e-12.
describe.each([
  ['conversion-loop.yaml', ['S2', 'S3', 'S4', 'S6', 'S8']],
  ['ammonia-loop.yaml', ['S3', 'S4', 'S5', 'S6', 'S9', 'S10']],
  ['methanol-loop.yaml', ['S2', 'S3', 'S4', 'S5', 'S8', 'S9']],
])('%s', (name, loop) => {
  test.each(loop)('torn at %s gives the same streams', async (tag) => {
    const flowsheet = await read(shippedText(name));
    const torn = tornAt(flowsheet, [tag]);
    expect(planFlowsheet(torn).tears).toEqual([tag]);
    const expected = balance(flowsheet, { tolerance: 1e-12 });
    const got = balance(torn, { tolerance: 1e-12 });
    expect([expected.diagnosis, got.diagnosis]).toEqual([null, null]);
    expect(got.result.convergence.tears).toEqual([tag]);
    for (const [s, stream] of Object.entries(expected.result.streams)) {
      const other = got.result.streams[s];
      expect(Math.abs(other.temperature_K / stream.temperature_K - 1)).toBeLessThan(1e-9);
      for (const [id, flow] of Object.entries(stream.components_kmol_h))
        expect(Math.abs(other.components_kmol_h[id] - flow)).toBeLessThanOrEqual(1e-9 * stream.flow_kmol_h);
    }
  });
});

describe('two loops of one flowsheet', () => {
  const twoLoops = async () => read(randomFlowsheet({ blocks: 20, recycles: 2, seed: 3, trade: 'ammonia' }));

  test('keep the tears named for them, and those that break all loops are used as they are', async () => {
    const flowsheet = await twoLoops();
    const plan = planFlowsheet(flowsheet);
    expect(plan.loops).toHaveLength(2);
    const [first, second] = plan.loops.map(({ blocks }) => intoConverter(flowsheet, blocks));
    expect(plan.tears).not.toContain(first);
    const named = planFlowsheet(tornAt(flowsheet, [second, first]));
    expect(new Set(named.tears)).toEqual(new Set([first, second]));
  });

  test('of which one is named are completed by the smallest number of others, and a tag named twice counts once', async () => {
    const flowsheet = await twoLoops();
    const first = intoConverter(flowsheet, planFlowsheet(flowsheet).loops[0].blocks);
    for (const tear of [[first], [first, first]]) {
      const plan = planFlowsheet(tornAt(flowsheet, tear));
      expect(plan.tears).toHaveLength(2);
      expect(plan.tears.filter((tag) => tag === first)).toHaveLength(1);
      expect(plan.smallest).toBe(true);
    }
  });
});

test('two tears in one loop are both kept, and the answer is the same', async () => {
  const flowsheet = await read(shippedText('conversion-loop.yaml'));
  const twice = balance(tornAt(flowsheet, ['S3', 'S8']), { tolerance: 1e-12 });
  expect(twice.diagnosis).toBeNull();
  expect(twice.result.convergence.tears).toEqual(['S3', 'S8']);
  expect(twice.result.streams['S2'].components_kmol_h['N2']).toBeCloseTo(24.75 / 0.28, 7); // derived in the file
});

test.each([
  ['S99', 'unknown-stream', 'solve.tear: there is no stream S99.'],
  ['S5', 'bad-tear', 'solve.tear: S5 leaves the plant.'],
  ['S1', 'bad-tear', 'solve.tear: S1 lies in no loop.'],
])('a tear at %s is refused: %s', async (tag, code, what) => {
  const text = `${shippedText('conversion-loop.yaml')}\nsolve: {tear: [S8, ${tag}]}\n`;
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'loop.yaml' });
  expect(flowsheet).toBeNull();
  expect(diagnostics.map((d) => [d.code, d.what])).toEqual([[code, what]]);
  expect(text.split('\n')[diagnostics[0].where.line - 1].slice(diagnostics[0].where.column - 1)).toMatch(
    new RegExp(`^${tag}\\]`),
  );
});

/** The stream that leads into the first converter among some blocks. */
function intoConverter(flowsheet: Flowsheet, blocks: readonly string[]): string {
  const converter = blocks.find((name) => name.endsWith('_converter'));
  return flowsheet.streams.find(({ to }) => to?.name === converter)!.tag;
}
