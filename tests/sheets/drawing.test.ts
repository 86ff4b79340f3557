import { basename } from 'node:path';
import { describe, expect, test } from 'vitest';
import { randomFlowsheet } from '../../bench/random-flowsheet.ts';
import { openShipped, shippedFiles } from '../../bench/shipped.ts';
import { blockKinds } from '../../src/blocks/registry.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import type { Result } from '../../src/model/result.ts';
import { type Drawing, drawingOf } from '../../src/sheets/drawing/drawing.ts';
import { drawnKinds } from '../../src/sheets/drawing/symbols.ts';
import { balance } from '../../src/tally/balance.ts';
import { crossingPoints, inside, isOrthogonal, overlaps } from './drawing-checks.ts';
import { exampleResult } from './example-result.ts';
import { parseXml } from './xml.ts';

async function drawn(flowsheet: Flowsheet): Promise<{ drawing: Drawing; result: Result }> {
  const { result } = balance(flowsheet);
  const product = flowsheet.ledger.product?.stream;
  const drawing = await drawingOf(result, {
    notes: flowsheet.notes,
    ...(product === undefined ? {} : { product }),
  });
  return { drawing, result };
}

function sheetOf({ svg }: Drawing) {
  const [width, height] = /viewBox="0 0 (\d+) (\d+)"/.exec(svg)!.slice(1).map(Number);
  return { x: 0, y: 0, width: width!, height: height! };
}

describe.each(shippedFiles())('the drawing of %s', async (file) => {
  const { drawing, result } = await drawn(await openShipped(file));

  test('is what was agreed', async () => {
    const name = basename(file, '.yaml');
    await expect(drawing.svg).toMatchFileSnapshot(`__golden__/drawings/${name}.svg`);
  });

  test('shows every block and every stream', () => {
    const words = drawing.texts.map(({ text }) => text);
    for (const name of [...Object.keys(result.blocks), ...Object.keys(result.streams)])
      expect(words).toContain(name);
    expect(drawing.lines.map(({ tag }) => tag)).toEqual(Object.keys(result.streams));
  });

  test('has nothing on top of anything, and no crossing', () => {
    expect(overlaps(drawing, result)).toEqual([]);
    expect(crossingPoints(drawing)).toEqual([]);
    expect(isOrthogonal(drawing)).toBe(true);
    const sheet = sheetOf(drawing);
    for (const { box } of [...drawing.texts, ...drawing.symbols]) expect(inside(box, sheet)).toBe(true);
  });

  test('is XML, black on white', () => {
    const { elements } = parseXml(drawing.svg);
    const known = ['svg', 'title', 'rect', 'g', 'path', 'circle', 'text'];
    expect(elements.filter((each) => !known.includes(each))).toEqual([]);
    const colours = [...drawing.svg.matchAll(/(?:fill|stroke)="([^"]*)"/g)].map((match) => match[1]);
    expect([...new Set(colours)].sort()).toEqual(['#000', '#fff', 'none']);
  });
});

test('every kind of block has a symbol of its own', () => {
  expect([...drawnKinds()].sort()).toEqual([...blockKinds.keys()].sort());
});

test.each(['<a>', '<a></b>', '<a b="1" b="2"/>', '<a>&x;</a>', '<a/><a/>', '<a>\u0001</a>', '<a b=1/>'])(
  'the check of XML refuses %j',
  (source) => {
    expect(() => parseXml(source)).toThrow();
  },
);

test('the checks find what overlaps and what crosses', () => {
  const level = {
    tag: 'S1',
    points: [
      { x: 0, y: 5 },
      { x: 10, y: 5 },
    ],
  };
  const upright = {
    tag: 'S2',
    points: [
      { x: 5, y: 0 },
      { x: 5, y: 10 },
    ],
  };
  const box = { x: 2, y: 2, width: 6, height: 6 };
  const messy: Drawing = {
    svg: '',
    texts: [
      { text: 'a', box },
      { text: 'b', box },
    ],
    symbols: [{ name: 'elsewhere', kind: 'heater', box }],
    lines: [level, upright],
  };
  expect(overlaps(messy, exampleResult)).toHaveLength(1 + 2 + 2 * 3);
  expect(crossingPoints(messy)).toHaveLength(1);
});

test('a recycle is told apart without colour: heavy all round, double heads on the way back', async () => {
  const { svg } = await drawingOf(exampleResult);
  const streams = /<g id="streams">\n([\s\S]*?)\n<\/g>/.exec(svg)![1]!.split('\n');
  const heavy = streams.map((stream) => stream.includes('stroke-width="2.8"'));
  const heads = streams.map((stream) => stream.match(/fill="#000"/g)!.length);
  // S1 feed, S2 to S4 forward, S5 product, S6 purge, S7 and S8 on the way back
  expect(heavy).toEqual([false, true, true, true, false, false, true, true]);
  expect(heads).toEqual([1, 1, 1, 1, 1, 1, 2, 2]);
});

describe('what a drawing makes of odd results', () => {
  test('one without streams or blocks is an empty sheet', async () => {
    const { svg, lines } = await drawingOf({ ...exampleResult, streams: {}, blocks: {} });
    expect(lines).toEqual([]);
    parseXml(svg);
  });

  test('one that did not close says so', async () => {
    const { convergence } = exampleResult;
    const open = await drawingOf({ ...exampleResult, convergence: { ...convergence, converged: false } });
    const words = open.texts.map(({ text }) => text);
    expect(words).toContain('NOT CLOSED');
    expect(words.some((each) => /^NOT CLOSED after 9 passes/.test(each))).toBe(true);
  });

  test('a kind it does not know is drawn as a vessel with its name', async () => {
    const blocks = {
      ...exampleResult.blocks,
      converter: { ...exampleResult.blocks['converter']!, kind: 'new' },
    };
    const result = { ...exampleResult, blocks };
    expect(overlaps(await drawingOf(result), result)).toEqual([]);
  });

  test('a mixer of eight streams and a splitter into eight', async () => {
    const one = exampleResult.streams['S1']!;
    const numbers = Array.from({ length: 8 }, (_, k) => k);
    const plain = { duty_kW: 0, power_kW: 0, details: {} };
    const result: Result = {
      ...exampleResult,
      blocks: { many: { kind: 'mixer', ...plain }, apart: { kind: 'splitter', ...plain } },
      streams: {
        ...Object.fromEntries(numbers.map((k) => [`A${k}`, { ...one, from: `feed${k}`, to: 'many' }])),
        B: { ...one, from: 'many', to: 'apart' },
        ...Object.fromEntries(numbers.map((k) => [`C${k}`, { ...one, from: `apart.p${k}`, to: 'out' }])),
      },
    };
    const drawing = await drawingOf(result);
    expect(overlaps(drawing, result)).toEqual([]);
    expect(crossingPoints(drawing)).toEqual([]);
  });
});

describe("the user's own words on a drawing", () => {
  const evil = '"/></text><script>alert(1)</script><text a="&amp;\'';
  const hostile = [
    evil,
    ']]><!ENTITY x SYSTEM "file:///etc/passwd">&x;',
    'W'.repeat(10_000),
    '\u202eright to left\u202c שלום עולם',
    'a\u0000\u0007\u001b[31m\ud800\uffffb\nc',
    '﷽'.repeat(50),
  ];

  test.each(hostile)('are text and nothing else: %#', async (words) => {
    const rename = (end: string): string =>
      end.replace(/^makeup$/, () => words).replace(/^circulator$/, () => `K${words}`);
    const streams = Object.fromEntries(
      Object.entries(exampleResult.streams).map(([tag, stream]) => [
        tag === 'S2' ? words : tag,
        { ...stream, from: rename(stream.from), to: rename(stream.to) },
      ]),
    );
    const { circulator, ...others } = exampleResult.blocks;
    const blocks = { ...others, [`K${words}`]: circulator! };
    const result: Result = { ...exampleResult, title: words, case: words, streams, blocks };
    const titleBlock = {
      owner: words,
      number: words,
      revision: words,
      date: words,
      creator: words,
      approver: words,
    };
    const drawing = await drawingOf(result, { notes: words, titleBlock });
    const { elements } = parseXml(drawing.svg);
    expect(elements).not.toContain('script');
    expect(drawing.svg).not.toMatch(/\son\w+=|href|style=|[\u202a-\u202e]/i);
    expect(overlaps(drawing, result)).toEqual([]);
    const sheet = sheetOf(drawing);
    for (const { box } of drawing.texts) expect(inside(box, sheet)).toBe(true);
  });

  test('what is clipped ends in an ellipsis and stands whole in the tooltip', async () => {
    const title = `${'Very long '.repeat(40)}end`;
    const { svg, texts } = await drawingOf({ ...exampleResult, title });
    const shown = texts.find(({ text }) => text.startsWith('Very long'))!.text;
    expect(shown.endsWith('…')).toBe(true);
    expect(parseXml(svg).texts.filter((text) => text === title)).toHaveLength(2); // of the sheet and of the cell
  });
});

describe('a large flowsheet', () => {
  test.each([1, 2, 3])('of 100 blocks is drawn without a word on another (seed %i)', async (seed) => {
    const text = randomFlowsheet({ blocks: 100, recycles: 8, seed });
    const { flowsheet } = await readFlowsheet(text, { file: 'random.yaml' });
    const { drawing, result } = await drawn(flowsheet!);
    expect(overlaps(drawing, result)).toEqual([]);
    expect(Object.keys(result.blocks)).toHaveLength(100);
    parseXml(drawing.svg);
  });
});

test('the same result gives the same drawing', async () => {
  expect((await drawingOf(exampleResult)).svg).toBe((await drawingOf(exampleResult)).svg);
});
