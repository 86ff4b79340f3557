import fc from 'fast-check';
import { expect, test } from 'vitest';
import { type ContourChartSpec, contourChart } from '../../../src/sheets/charts/contour-chart.ts';
import { contoursOf } from '../../../src/sheets/charts/contour-lines.ts';
import { bandColour } from '../../../src/sheets/charts/palette.ts';
import { parseXml } from '../xml.ts';
import { attributesOf, clashes, textsOf } from './chart-checks.ts';

const xs = [-20, -15, -10, -5, 0];
const ys = [0.5, 1, 2, 4, 8];
const yields = ys.flatMap((y) => xs.map((x) => 97 - x / 10 - y));

function spec(parts: Partial<ContourChartSpec> = {}): ContourChartSpec {
  return {
    id: 'yield',
    title: 'Yield over condenser temperature and purge',
    x: { title: 'condenser.temperature', unit: 'degC', values: xs },
    y: { title: 'purge.fractions.bleed', unit: '%', log: true, values: ys },
    figure: { title: 'figures.overall_yield', unit: '%' },
    values: yields,
    ...parts,
  };
}

test('a contour chart says what it shows to those who cannot see it', () => {
  const svg = contourChart(
    spec({ feasible: yields.map((each) => each - 95), marked: [{ x: -10, y: 2, label: 'as in the file' }] }),
  );
  const { elements } = parseXml(svg);
  expect(elements.slice(0, 3)).toEqual(['svg', 'title', 'desc']);
  expect(/<desc[^>]*>([^<]*)/.exec(svg)![1]).toBe(
    'figures.overall_yield [%] over condenser.temperature [degC] (across) and purge.fractions.bleed [%] (up). ' +
      'Least 89.000 % at 0 degC and 8.0000 %. Greatest 98.500 % at -20.000 degC and 0.50000 %. ' +
      'All limits hold in 16 of 25 cases. as in the file: -10.000 degC and 2.0000 %.',
  );
});

test('lines carry their levels, the key the bands between them', () => {
  const texts = textsOf(contourChart(spec())).map(({ text }) => text);
  for (const level of ['91', '93', '95', '97']) expect(texts.filter((text) => text === level).length).toBe(2);
});

test('a contour of a plane is the line on which it has the level, in the values of uneven axes', () => {
  const svg = contourChart(spec({ values: ys.flatMap(() => xs.map((x) => x)) }));
  const [from, to] = attributesOf(svg, 'data-x-axis')[0]!.split(' ').map(Number);
  const lines = /class="contours"[^>]*><path d="([^"]*)"/.exec(svg)![1]!;
  const places = [...lines.matchAll(/[ML]([\d.]+) /g)].map((match) => Number(match[1]));
  // Levels of -20 to 0 by twos: upright lines at those temperatures.
  const expected = [-18, -16, -14, -12, -10, -8, -6, -4, -2].map(
    (t) => from! + ((t + 20) / 20) * (to! - from!),
  );
  for (const place of places) {
    expect(Math.min(...expected.map((each) => Math.abs(each - place)))).toBeLessThan(0.02);
  }
  expect(new Set(places.map((place) => Math.round(place))).size).toBe(9);
});

test('contours end at the outer nodes and leave out the edge of the grid', () => {
  const [contour] = contoursOf([0, 1, 2, 0, 1, 2, 0, 1, 2], [3, 3], [0.5]);
  expect(contour!.lines).toHaveLength(1);
  const [line] = contour!.lines;
  expect(line!.map(({ x }) => x)).toEqual(line!.map(() => 0.5));
  expect(line!.map(({ y }) => y).toSorted()).toEqual([0, 1, 2]);
});

test('a failed case has a cross, and the squares around it stay empty', () => {
  const values = yields.slice();
  values[12] = Number.NaN;
  const svg = contourChart(spec({ values }));
  const whole = contourChart(spec());
  const squares = (markup: string) => /-known"><path d="([^"]*)"/.exec(markup)![1]!.match(/M/g)!.length;
  expect(squares(whole)).toBe(16);
  expect(squares(svg)).toBe(12);
  // One at the node, one in the key.
  expect(svg.match(/class="failed"/g)).toHaveLength(2);
  expect(whole).not.toContain('class="failed"');
  expect(svg).toContain('1 of 25 cases failed');
  expect(attributesOf(svg, 'data-values')[0]!.split(' ')[12]).toBe('-');
});

test('where a limit does not hold it is hatched, and the key says so', () => {
  const svg = contourChart(spec({ feasible: xs.flatMap(() => xs.map((x) => -8 - x)) }));
  expect(svg).toContain('url(#yield-hatch)');
  expect(textsOf(svg).map(({ text }) => text)).toContain('hatched: a limit does not hold');
  const [from, to] = attributesOf(svg, 'data-x-axis')[0]!.split(' ').map(Number);
  const edge = /class="edge" d="([^"]*)"/.exec(svg)![1]!;
  const places = [...edge.matchAll(/[ML]([\d.]+) /g)].map((match) => Number(match[1]));
  for (const place of places) expect(place).toBeCloseTo(from! + (12 / 20) * (to! - from!), 1);
  expect(contourChart(spec())).not.toContain('hatch');
});

test('settings in any order, and twice, give the same picture', () => {
  const order = [3, 0, 4, 4, 1, 2];
  const svg = contourChart(
    spec({
      x: { title: 'condenser.temperature', unit: 'degC', values: order.map((k) => xs[k]!) },
      values: ys.flatMap((_, j) => order.map((k) => yields[j * 5 + k]!)),
    }),
  );
  expect(svg).toBe(contourChart(spec()));
});

test.each([
  ['does not vary', yields.map(() => 3), '3.0000 throughout'],
  ['varies by what closing leaves open', yields.map((_, k) => 3 + k * 1e-13), '3.0000 throughout'],
  ['has no value', yields.map(() => Number.NaN), 'no value'],
])('a figure that %s has one colour and says so', (_, values, words) => {
  const svg = contourChart(spec({ values }));
  parseXml(svg);
  expect(textsOf(svg).map(({ text }) => text)).toContain(words);
  expect(clashes(svg)).toEqual([]);
});

test('tiny values have levels of their size', () => {
  const svg = contourChart(spec({ values: yields.map((each) => each * 1e-14) }));
  expect(textsOf(svg).map(({ text }) => text)).toContain('9.3e-13');
});

test('markup in names is text', () => {
  const evil = '"><img src=x onerror=alert(1)>';
  const svg = contourChart(
    spec({ title: evil, figure: { title: evil, unit: evil }, marked: [{ x: -10, y: 2, label: evil }] }),
  );
  expect(parseXml(svg).elements).not.toContain('img');
});

test('the bands grow darker evenly, so that they keep their order in grey', () => {
  const lightness = Array.from({ length: 21 }, (_, k) => {
    const [r, g, b] = [1, 3, 5].map((at) => Number.parseInt(bandColour(k / 20).slice(at, at + 2), 16) / 255);
    return 0.2126 * linear(r!) + 0.7152 * linear(g!) + 0.0722 * linear(b!);
  }).map((luminance) => 116 * Math.cbrt(luminance) - 16);
  const steps = lightness.slice(1).map((each, k) => lightness[k]! - each);
  expect(Math.min(...steps)).toBeGreaterThan(2);
  expect(Math.max(...steps)).toBeLessThan(6);
});

test('faults of ours are refused: too few settings, a value too few', () => {
  expect(() => contourChart(spec({ values: [1, 2] }))).toThrow('per node');
  const x = { title: 'x', unit: '', values: [1, 1] };
  expect(() => contourChart(spec({ x, values: new Array(10).fill(1) }))).toThrow('two values');
});

test('whatever the values, no text lies over another or leaves the picture', () => {
  const cell = fc.oneof(
    { weight: 9, arbitrary: fc.double({ min: -1, max: 1, noNaN: true }) },
    { weight: 1, arbitrary: fc.constant(Number.NaN) },
  );
  fc.assert(
    fc.property(
      fc.array(cell, { minLength: 25, maxLength: 25 }),
      fc.integer({ min: -13, max: 8 }),
      fc.integer({ min: 0, max: 4 }),
      fc.integer({ min: 0, max: 4 }),
      (cells, size, i, j) => {
        const values = cells.map((each) => each * 10 ** size);
        const marked = [{ x: xs[i]!, y: ys[j]!, label: 'as in the file' }];
        const svg = contourChart(spec({ values, feasible: cells, marked }));
        parseXml(svg);
        expect(svg).not.toMatch(/NaN|Infinity/);
        expect(clashes(svg)).toEqual([]);
      },
    ),
    { numRuns: 100 },
  );
});

function linear(part: number): number {
  return part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4;
}
