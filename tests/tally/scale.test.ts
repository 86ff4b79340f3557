import { expect, test } from 'vitest';
import { randomFlowsheet } from '../../bench/random-flowsheet.ts';
import { blockKinds } from '../../src/blocks/registry.ts';
import { readBlocks } from '../../src/flowsheet/blocks.ts';
import { createFindings } from '../../src/flowsheet/findings.ts';
import { ledgerDefaults } from '../../src/flowsheet/ledger-defaults.ts';
import { readStreams } from '../../src/flowsheet/topology.ts';
import { readYaml } from '../../src/flowsheet/yaml-document.ts';
import { child, entriesOf } from '../../src/flowsheet/yaml-tree.ts';
import { planFlowsheet } from '../../src/tally/plan.ts';
import { read } from './read.ts';

// Steps are counted, not timed: a search through all blocks for each of them would make four times as many per block.
const SMALL = 150;
const LARGE = 4 * SMALL;
const textOf = (blocks: number) =>
  randomFlowsheet({ blocks, recycles: blocks / 15, seed: 1, trade: 'ammonia' });

/** Everything below an object, with every look at a part of it counted. */
function counted<T extends object>(target: T, count: () => void): T {
  const seen = new WeakMap<object, object>();
  const wrap = (inner: object): object => {
    const known = seen.get(inner);
    if (known !== undefined) return known;
    const proxy = new Proxy(inner, {
      get(object, key) {
        if (typeof key === 'string') count();
        const value: unknown = Reflect.get(object, key);
        return typeof value === 'object' && value !== null ? wrap(value) : value;
      },
    });
    seen.set(inner, proxy);
    return proxy;
  };
  return wrap(target) as T;
}

async function looksToPlan(blocks: number): Promise<number> {
  const flowsheet = await read(textOf(blocks));
  let looks = 0;
  planFlowsheet({ ...flowsheet, streams: counted(flowsheet.streams, () => looks++) });
  return looks / blocks;
}

function looksToRead(blocks: number): number {
  let looks = 0;
  const { root } = readYaml(textOf(blocks), 'random.yaml');
  const reading = { root: counted(root!, () => looks++), findings: createFindings() };
  const nothing = {
    components: null,
    reactions: [],
    failedIds: new Set<string>(),
    failedReactions: new Set<string>(),
  };
  const feeds = entriesOf(child(root!, 'feeds')).map(({ key }) => key);
  const found = readBlocks(reading, blockKinds, nothing)!;
  const ends = counted(found, () => looks++);
  const streams = readStreams(
    reading,
    counted(feeds, () => looks++),
    ends,
  );
  ledgerDefaults(
    [],
    [],
    counted(streams, () => looks++),
    ends,
  );
  expect(reading.findings.list).toEqual([]);
  expect(streams.length).toBeGreaterThan(blocks);
  return looks / blocks;
}

test('planning looks at each stream as often in a large flowsheet as in a small one', async () => {
  expect((await looksToPlan(LARGE)) / (await looksToPlan(SMALL))).toBeLessThan(1.3);
});

test('reading looks at each part of the file as often in a large flowsheet as in a small one', () => {
  expect(looksToRead(LARGE) / looksToRead(SMALL)).toBeLessThan(1.3);
});
