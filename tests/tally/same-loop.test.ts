import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Result } from '../../src/model/result.ts';
import { balance } from '../../src/tally/balance.ts';
import { randomLoop } from './random-loop.ts';
import { read } from './read.ts';

/** Closed as far as double precision goes, so that what is left are roundings. */
async function closed(text: string): Promise<Result> {
  const { result, diagnosis } = balance(await read(text), { tolerance: 1e-12, curves: false });
  expect(diagnosis).toBeNull();
  return result;
}

/**
 * The same streams by name: flows to 1e-8 of the feed, temperatures to 1e-7 K, pressures to 1e-9.
 *
 * @param called  what a stream of the first is called in the other
 */
function expectSame(one: Result, other: Result, called = (tag: string) => tag, scale = 1): void {
  const feed = one.streams['S1']!.flow_kmol_h;
  expect(Object.keys(other.streams)).toHaveLength(Object.keys(one.streams).length);
  for (const [tag, stream] of Object.entries(one.streams)) {
    const twin = other.streams[called(tag)]!;
    expect(Math.abs(twin.temperature_K - stream.temperature_K), tag).toBeLessThan(1e-6);
    expect(Math.abs(twin.pressure_bar / stream.pressure_bar - 1), tag).toBeLessThan(1e-9);
    for (const [id, flow] of Object.entries(stream.components_kmol_h)) {
      expect(Math.abs(twin.components_kmol_h[id]! / scale - flow), `${tag} ${id}`).toBeLessThan(1e-8 * feed);
    }
    const heat = Math.abs(stream.enthalpy_kW) + feed;
    expect(Math.abs(twin.enthalpy_kW / scale - stream.enthalpy_kW), tag).toBeLessThan(1e-8 * heat);
  }
}

const runs = { numRuns: 40 };

test('the order of the components changes nothing in the answer of a random loop', async () => {
  await fc.assert(
    fc.asyncProperty(randomLoop, fc.integer({ min: 1, max: 6 }), async ({ text }, by) => {
      const turned = text.replace(/^components: \[(.*)\]$/m, (_, list: string) => {
        const ids = list.split(', ').toReversed();
        return `components: [${[...ids.slice(by % ids.length), ...ids.slice(0, by % ids.length)].join(', ')}]`;
      });
      expectSame(await closed(text), await closed(turned));
    }),
    runs,
  );
});

const names = [
  'makeup',
  'mixer',
  'middle',
  'last',
  'fork2',
  'fork',
  'heater',
  'reactor',
  'cooler',
  'separator',
  'purge',
  'main',
];

test('the names of blocks, feeds, streams and reactions change nothing', async () => {
  await fc.assert(
    fc.asyncProperty(randomLoop, async ({ text }) => {
      const calledLike = (tag: string) => tag.replace(/^S/, 'from_9_to_');
      let renamed = text.replaceAll(/\bS\d+b?\b/g, calledLike);
      // a kind of block and a key of the ledger are no names
      names.forEach((name, n) => {
        renamed = renamed.replaceAll(
          new RegExp(`(?<!kind: )\\b${name}\\b(?!: \\[)`, 'g'),
          `z${n}_${name.length}`,
        );
      });
      expect(renamed).not.toBe(text);
      expectSame(await closed(text), await closed(renamed), calledLike);
    }),
    runs,
  );
});

/** The entries of a section of the text in another order. */
function turned(text: string, section: string, by: number): string {
  return text.replace(new RegExp(`^${section}:\\n((?: {2}.*\\n)+)`, 'm'), (_, body: string) => {
    const lines = body.trimEnd().split('\n').toReversed();
    const at = by % lines.length;
    return `${section}:\n${[...lines.slice(at), ...lines.slice(0, at)].join('\n')}\n`;
  });
}

test('the order in which blocks and streams are written changes nothing', async () => {
  await fc.assert(
    fc.asyncProperty(randomLoop, fc.nat(12), fc.nat(12), async ({ text }, b, s) => {
      const other = turned(turned(text, 'blocks', b), 'streams', s);
      expect(other.split('\n').toSorted()).toEqual(text.split('\n').toSorted());
      expectSame(await closed(text), await closed(other));
    }),
    runs,
  );
});

test('so many times the feed is so many times every flow, at the same temperatures and pressures', async () => {
  await fc.assert(
    fc.asyncProperty(
      randomLoop,
      fc.constantFrom(1e-6, 1e-3, 0.37, 7.3, 1e4, 1e7),
      async ({ text }, scale) => {
        const scaled = text.replace('flow: 1000 kmol/h', `flow: ${1000 * scale} kmol/h`);
        const [one, other] = [await closed(text), await closed(scaled)];
        expectSame(one, other, undefined, scale);
        expect(other.figures.recycle_ratio! / one.figures.recycle_ratio! - 1).toBeCloseTo(0, 7);
      },
    ),
    runs,
  );
});
