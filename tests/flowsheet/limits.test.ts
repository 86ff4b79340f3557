import { expect, test } from 'vitest';
import { randomFlowsheet } from '../../bench/random-flowsheet.ts';
import { formatDiagnostics } from '../../src/diagnostics/format.ts';
import { limits, sizeText } from '../../src/flowsheet/limits.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';

const counted = (n: number, each: (i: number) => string): string =>
  Array.from({ length: n }, (_, i) => each(i)).join('');
const head = `looptally: 1
components: [H2]
feeds: {makeup: {flow: 1 kmol/h, temperature: 20 degC, pressure: 1 bar, composition: {H2: 1}}}
`;
const valve = `blocks: {valve: {kind: valve, pressure: 0.5 bar}}
streams: {S1: makeup -> valve, S2: valve -> out}
`;

async function messageOf(text: string, maxBytes?: number): Promise<string> {
  const { flowsheet, diagnostics } = await readFlowsheet(text, {
    file: 'f.yaml',
    ...(maxBytes === undefined ? {} : { maxBytes }),
  });
  expect(flowsheet).toBeNull();
  return formatDiagnostics(diagnostics, { texts: { 'f.yaml': text } });
}

test('a file larger than 1 MiB is refused, and one just as large is read', async () => {
  const text = head + valve;
  const filled = (bytes: number) => `${text}#${'x'.repeat(bytes - text.length - 2)}\n`;
  expect((await readFlowsheet(filled(1024 * 1024), { file: 'f.yaml' })).flowsheet).not.toBeNull();
  expect(await messageOf(filled(1024 * 1024 + 1))).toBe(`f.yaml:1:1 error file-too-large
  The file is larger than 1 MiB.
   1 | looptally: 1
     | ^
  why:  it has 1048577 bytes; a plant of 2,000 blocks takes some 0.2 MiB
  mend: name the flowsheet itself, or allow a larger file

1 error`);
});

test('the size is counted in bytes and may be raised', async () => {
  const text = `${head}${valve}title: ${'é'.repeat(600_000)}\n`;
  expect(text.length).toBeLessThan(limits.bytes);
  expect(await messageOf(text)).toContain('it has 1200232 bytes;');
  expect((await readFlowsheet(text, { file: 'f.yaml', maxBytes: 2 ** 21 })).flowsheet).not.toBeNull();
  expect(await messageOf(head + valve, 100)).toContain('The file is larger than 100 bytes.');
});

test.each([
  [12, '12 bytes'],
  [1536, '1.5 KiB'],
  [1024 * 1024, '1 MiB'],
  [3_500_000, '3.338 MiB'],
])('%d bytes are shown as %s', (bytes, shown) => {
  expect(sizeText(bytes)).toBe(shown);
});

const list = (part: string, n: number) => counted(n, (i) => `  ${part[0]}${i}: 1\n`);
test.each<[string, number, string]>([
  ['components', 201, `components: [${counted(201, () => 'H2, ')}]\n`],
  ['reactions', 501, `reactions:\n${list('reactions', 501)}`],
  ['feeds', 5001, `feeds:\n${list('feeds', 5001)}`],
  ['blocks', 10_001, `blocks:\n${list('blocks', 10_001)}`],
  ['streams', 30_001, `streams:\n${list('streams', 30_001)}`],
  ['aims', 101, `aims:\n${list('aims', 101)}`],
  ['figures', 2001, `figures:\n${list('figures', 2001)}`],
  ['prices', 5001, `prices:\n${list('prices', 5001)}`],
])('more than enough %s are refused, and nothing else is said', async (part, count, text) => {
  expect(await messageOf(`looptally: 1\n${text}`)).toBe(`f.yaml:2:1 error too-many-entries
  The file has ${count} ${part}.
   2 | ${part}:${part === 'components' ? ` [${counted(24, () => 'H2, ')}H...` : ''}
     | ${'^'.repeat(part.length)}
  why:  at most ${count - 1} ${part} are read: no plant has more, and the time that checking takes stays short
  mend: take some out, or divide the plant at a stream

1 error`);
});

test('more than 2,000 cases are refused', async () => {
  expect(
    await messageOf(`${head}${valve}cases:\n${list('cases', 2001)}`),
  ).toBe(`f.yaml:6:1 error too-many-entries
  The file has 2001 cases.
   6 | cases:
     | ^^^^^
  why:  at most 2000 cases are read: no plant has more, and the time that checking takes stays short
  mend: divide them between several files

1 error`);
});

test('more values than any plant has are refused', async () => {
  const text = `${head}notes: [${counted(limits.values, () => '1,')}]`;
  expect(await messageOf(text)).toBe(`f.yaml:1:1 error file-too-large
  The file holds more than 400000 values.
   1 | looptally: 1
     | ^
  why:  a plant of 2,000 blocks has a tenth of that
  mend: divide it into several flowsheets

1 error`);
});

test('aliases are counted, and so is what they bring in', async () => {
  const uses = (n: number, size: number) =>
    `${head}${valve}cases:\n  first: &a {${counted(size, (i) => `valve.x${i}: 1, `)}}\n${counted(n, (i) => `  c${i}: *a\n`)}`;
  expect(await messageOf(uses(1001, 1))).toContain(`f.yaml:1008:10 error yaml-alias
  The alias *a is one too many.
1008 |   c1000: *a
     |          ^^
  why:  at most 1000 aliases and 400000 values are read`);
  expect(await messageOf(uses(900, 300))).toContain('The alias *a is one too many.');
});

test('a plant of 2,000 blocks is well below the limits', async () => {
  const text = randomFlowsheet({ blocks: 2000, recycles: 20, seed: 1 });
  expect(text.length).toBeLessThan(limits.bytes / 4);
  // the size that README and the messages name
  expect(text.length / 2 ** 20).toBeCloseTo(0.2, 1);
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'f.yaml' });
  expect(diagnostics).toEqual([]);
  expect(flowsheet?.blocks).toHaveLength(2000);
  expect(limits.entries.blocks).toBeGreaterThanOrEqual(4 * 2000);
  expect(limits.entries.streams).toBeGreaterThanOrEqual(4 * flowsheet!.streams.length);
});

test('checking stops at 200 errors, and a message is never longer than a page', async () => {
  const long = 'a'.repeat(50_000);
  const text = `${head}blocks:\n${counted(300, (i) => `  b${i}: {kind: mixer, x: 1}\n`)}streams: {S: ${long} -> b1}\n`;
  const message = await messageOf(text);
  expect(message).toContain('at least 100 more errors are not shown.');
  const one = await messageOf(`${head}${valve.replace('makeup -> valve', `${long} -> ${long}`)}`);
  for (const line of one.split('\n')) expect(line.length).toBeLessThan(1000);
});

/** Texts that would take a naive reader minutes: one line of a megabyte, names that are all a little wrong, and so on. */
const slow: Readonly<Record<string, string>> = {
  'a list of 250,000 on one line': `components: [${'H2,'.repeat(250_000)}]`,
  'lists in a line with blanks behind it': `components: [${'[],'.repeat(150_000)}]${' '.repeat(500_000)}`,
  'empty entries': '-\n'.repeat(390_000),
  'quotes in a line that breaks off': `a: [${"'a',".repeat(200_000)}`,
  documents: '--- a\n'.repeat(150_000),
  escapes: `title: "${'\\u0041'.repeat(150_000)}"`,
  'a number of 500,000 digits': head.replace('1 kmol/h', '9'.repeat(500_000)),
  'names of 50 letters that are all a little wrong': `${head}blocks:\n${counted(6000, (i) => `  ${'abcdefghij'.repeat(5)}b${i}: {kind: mixer}\n`)}streams:\n${counted(3000, (i) => `  S${i}: ${'xbcdefgh'.repeat(5)}rst${i} -> ${'abzdefgh'.repeat(5)}uvw${i}\n`)}`,
};

test.each(Object.keys(slow))('refused within seconds: %s', async (name) => {
  const start = performance.now();
  await messageOf(slow[name]!);
  // The quadratic ways of old took a minute and more; this takes one or two seconds on an idle machine.
  expect(performance.now() - start).toBeLessThan(20_000);
});
