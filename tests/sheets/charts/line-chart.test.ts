import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type LineChartSpec, lineChart } from '../../../src/sheets/charts/line-chart.ts';
import { parseXml } from '../xml.ts';
import { attributesOf, clashes, textsOf } from './chart-checks.ts';

const temperatures = [-25, -20, -15, -10, -5, 0];

function spec(parts: Partial<LineChartSpec> = {}): LineChartSpec {
  return {
    id: 'recycle',
    title: 'Recycle ratio',
    x: { title: 'condenser.temperature', unit: 'degC' },
    y: { title: 'figures.recycle_ratio', unit: '' },
    series: [{ name: '', x: temperatures, y: [4.1, 4.2, 4.35, 4.5, 4.72, 5] }],
    ...parts,
  };
}

const several = [1, 2, 3].map((n) => ({
  name: `bleed ${n} %`,
  x: temperatures,
  y: temperatures.map((t) => 4 + n / 10 + t / 100),
}));

test('a chart of lines says what it shows to those who cannot see it', () => {
  const svg = lineChart(spec({ marked: [{ x: -10, y: 4.5, label: 'as in the file' }] }));
  const { elements } = parseXml(svg);
  expect(elements.slice(0, 3)).toEqual(['svg', 'title', 'desc']);
  expect(svg).toContain('role="img" aria-labelledby="recycle-title recycle-desc"');
  expect(svg).toContain('<title id="recycle-title">Recycle ratio</title>');
  expect(svg).toContain(
    '<desc id="recycle-desc">figures.recycle_ratio against condenser.temperature [degC]. Least 4.1000 at -25.000 degC, greatest 5.0000 at 0 degC. as in the file: 4.5000 at -10.000 degC.</desc>',
  );
});

test('axes carry round numbers and their units', () => {
  const texts = textsOf(lineChart(spec())).map(({ text }) => text);
  expect(texts).toEqual(
    expect.arrayContaining([
      'condenser.temperature [degC]',
      'figures.recycle_ratio',
      '-25',
      '-10',
      '0',
      '4.2',
      '5.0',
    ]),
  );
});

test('series differ by dash and by point as well as by colour, and stand beside their names', () => {
  const svg = lineChart(spec({ series: several }));
  const groups = svg.match(/<g class="series".*?<\/g><\/g>/g)!;
  const looks = groups.map((group) => ({
    dash: /class="curve".*?(?:stroke-dasharray="([^"]*)")?\/>/.exec(group)![1] ?? 'full',
    point: /class="points"[^>]*><path d="([^"]*)"/.exec(group)![1],
    colour: / stroke="([^"]*)"/.exec(group)![1],
  }));
  for (const key of ['dash', 'point', 'colour'] as const) {
    expect(new Set(looks.map((each) => each[key])).size, key).toBe(3);
  }
  const texts = textsOf(svg);
  const places = several.map(({ name }) => texts.find(({ text }) => text === name)!.box.y);
  // The third is the highest of the lines.
  expect(places[2]).toBeLessThan(places[1]!);
  expect(places[1]).toBeLessThan(places[0]!);
});

test('names too long for the ends of the lines stand in a key below', () => {
  const long = several.map((each) => ({
    ...each,
    name: `${each.name} of the loop behind the second converter`,
  }));
  const texts = textsOf(lineChart(spec({ series: long })));
  const title = texts.find(({ text }) => text === 'condenser.temperature [degC]')!;
  for (const { name } of long) {
    expect(texts.find(({ text }) => text === name)!.box.y, name).toBeGreaterThan(
      title.box.y + title.box.height,
    );
  }
});

test('a line has a gap where there is no value, and a value between two gaps is still a point', () => {
  const y = [4, 4.1, Number.NaN, 4.3, Number.NaN, 4.4];
  const svg = lineChart(spec({ series: [{ name: '', x: temperatures, y }] }));
  const path = /class="curve" d="([^"]*)"/.exec(svg)![1]!;
  expect(path.match(/M/g)).toHaveLength(3);
  expect(svg.match(/class="points".*?<\/g>/)![0].match(/<path/g)).toHaveLength(4);
  expect(svg).not.toContain('NaN');
  expect(attributesOf(svg, 'data-x')).toEqual(['-25 -20 -10 0']);
  expect(attributesOf(svg, 'data-y')).toEqual(['4 4.1 4.3 4.4']);
  expect(svg).toContain('no value at 2 of 6 points');
});

test('markup in a name, a title or a label is text', () => {
  const evil = '<script>alert(1)</script>"\' onload="x';
  const svg = lineChart(
    spec({
      title: evil,
      x: { title: evil, unit: evil },
      series: [{ ...several[0]!, name: evil }],
      marked: [{ x: -10, y: 4.1, label: evil }],
      limits: [{ axis: 'y', value: 4.05, label: evil }],
      stretches: [{ from: -25, to: 0, label: evil }],
    }),
  );
  const { elements } = parseXml(svg);
  expect(elements).not.toContain('script');
});

test('a name of ten thousand characters, marks of direction and broken letters stay in the picture', () => {
  const name = `\u202eevil\ud800${'W'.repeat(10_000)}`;
  const svg = lineChart(spec({ x: { title: name, unit: '' }, series: [{ ...several[0]!, name }] }));
  parseXml(svg);
  expect(svg).not.toContain('\u202e');
  expect(clashes(svg)).toEqual([]);
});

describe('a scale can be made of', () => {
  test.each<[string, number[], string[]]>([
    ['one point', [4], ['4.0']],
    ['values that do not differ', [250, 250, 250], ['250']],
    ['values that differ by what closing leaves open', [0.25, 0.25 + 1e-13, 0.25], ['0.250']],
    ['zeros', [0, 0, 0], ['0']],
    ['tiny values', [1e-12, 2e-12, 5e-12], ['2e-12', '4e-12']],
    ['tiny differences', [1, 1 + 2e-6, 1 + 4e-6], ['1.000002']],
    ['large values', [1.2e9, 3.4e9, 2e9], ['2e9']],
    ['no values', [Number.NaN, Number.NaN], []],
  ])('%s', (_, y, expected) => {
    const svg = lineChart(spec({ series: [{ name: '', x: y.map((_, k) => k), y }] }));
    parseXml(svg);
    expect(svg).not.toMatch(/NaN|Infinity/);
    expect(textsOf(svg).map(({ text }) => text)).toEqual(expect.arrayContaining(expected));
    expect(clashes(svg)).toEqual([]);
  });
});

test('equal ratios take equal room on a log axis', () => {
  const x = [0.5, 1, 2, 4, 8];
  const y = [1, 2, 3, 4, 5];
  const svg = lineChart(spec({ x: { title: 'bleed', unit: '%', log: true }, series: [{ name: '', x, y }] }));
  const places = attributesOf(svg, 'transform').map((each) => Number(/\(([\d.-]+)/.exec(each)![1]));
  const steps = places.slice(1).map((place, k) => place - places[k]!);
  for (const step of steps) expect(step).toBeCloseTo(steps[0]!, 1);
  expect(attributesOf(svg, 'data-x-axis')[0]).toMatch(/ 0\.5 8 log$/);
});

test('a log axis over values that are not all above zero is linear', () => {
  const svg = lineChart(
    spec({ x: { title: 'x', unit: '', log: true }, series: [{ name: '', x: [0, 1, 2], y: [1, 2, 3] }] }),
  );
  expect(attributesOf(svg, 'data-x-axis')[0]).toMatch(/linear$/);
});

test('a limit near the curves is drawn, one far away is not allowed to flatten them', () => {
  const near = lineChart(spec({ limits: [{ axis: 'y', value: 5.2, label: 'at most 5.2' }] }));
  const far = lineChart(spec({ limits: [{ axis: 'y', value: 50, label: 'at most 50' }] }));
  expect(near).toContain('at most 5.2');
  expect(near).toContain('class="limit"');
  expect(far).not.toContain('class="limit"');
});

test('a stretch that is set apart is hatched within the plot only', () => {
  const svg = lineChart(spec({ stretches: [{ from: -12.5, to: 30, label: 'limits do not hold' }] }));
  const [left, width] = /<rect x="([\d.]+)" y="[\d.]+" width="([\d.]+)"[^>]*url\(#recycle-hatch\)/
    .exec(svg)!
    .slice(1)
    .map(Number);
  const [from, to] = attributesOf(svg, 'data-x-axis')[0]!.split(' ').map(Number);
  expect(left).toBeCloseTo((from! + to!) / 2, 1);
  expect(left! + width!).toBeCloseTo(to!, 1);
});

test('numbers are written by the function that is given', () => {
  const comma = (value: number, decimals: number) => value.toFixed(decimals).replace('.', ',');
  const svg = lineChart(spec({ y: { title: 'ratio', unit: '', text: comma } }));
  expect(textsOf(svg).map(({ text }) => text)).toContain('4,2');
  expect(svg).toContain('Least 4,1000 at');
});

test('an id that is none, and x and y of different length, are faults of ours', () => {
  expect(() => lineChart(spec({ id: '"><b>' }))).toThrow('no id');
  expect(() => lineChart(spec({ series: [{ name: '', x: [1, 2], y: [1] }] }))).toThrow('length');
});

test('whatever the values, no text lies over another or leaves the picture', () => {
  const size = fc.integer({ min: -14, max: 14 });
  const value = fc
    .tuple(fc.double({ min: -9.999, max: 9.999, noNaN: true }), size)
    .map(([m, e]) => m * 10 ** e);
  const gapped = fc.oneof({ weight: 8, arbitrary: value }, { weight: 1, arbitrary: fc.constant(Number.NaN) });
  const one = fc.array(fc.tuple(value, gapped), { minLength: 1, maxLength: 12 });
  fc.assert(
    fc.property(fc.array(one, { minLength: 1, maxLength: 9 }), fc.boolean(), (all, log) => {
      const series = all.map((points, k) => ({
        name: `series ${k}`,
        x: points.map(([x]) => x),
        y: points.map(([, y]) => y),
      }));
      const svg = lineChart(
        spec({
          x: { title: 'a setting', unit: 'bar', log },
          y: { title: 'a figure', unit: 't/d', log },
          series,
        }),
      );
      parseXml(svg);
      expect(svg).not.toMatch(/NaN|Infinity/);
      expect(clashes(svg)).toEqual([]);
    }),
    { numRuns: 150 },
  );
});
