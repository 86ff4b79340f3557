import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { shippedText } from '../tally/shipped.ts';
import { commandLine } from './looptally.ts';

const { run, folder } = commandLine();

interface LeversJson {
  readonly settings: Readonly<
    Record<string, { unit: string; value: number; figures: Record<string, number>; note: string | null }>
  >;
  readonly figures: Readonly<Record<string, number>>;
  readonly holds: Readonly<Record<string, readonly { setting: string; elasticity: number }[]>>;
}

beforeAll(() => {
  run(['new', 'ammonia', '--out', 'ammonia.yaml']);
  writeFileSync(join(folder(), 'conversion.yaml'), shippedText('conversion-loop.yaml'));
});

test('--json: per setting its unit and the slope of every figure by dotted name', () => {
  const { code, out, err } = run(['levers', 'conversion.yaml', '--json']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  const { settings, figures } = JSON.parse(out) as LeversJson;
  expect(settings['purge.fractions.bleed']!.unit).toBe('%');
  expect(settings['cooler.temperature']!.unit).toBe('K');
  expect(settings['makeup.pressure']!.unit).toBe('bar');
  for (const { figures: slopes } of Object.values(settings)) {
    expect(Object.keys(slopes)).toEqual(Object.keys(figures));
  }
  expect(settings['purge.fractions.bleed']!.figures['overall_yield']).toBeLessThan(0);
  expect(settings['purge.fractions.bleed']!.figures['purge.lost_fraction.N2']).toBeGreaterThan(0);
});

test('--over takes settings, and blocks with all their settings', () => {
  const { out } = run([
    'levers',
    'ammonia.yaml',
    '--over',
    'condenser.temperature',
    '--over',
    'purge',
    '--json',
  ]);
  expect(Object.keys((JSON.parse(out) as LeversJson).settings)).toEqual([
    'condenser.temperature',
    'purge.fractions.bleed',
  ]);
});

test('the sheet says in words what a step to the better side does, and what holds the loop most', () => {
  const { code, out, err } = run(['levers', 'ammonia.yaml']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toMatch(/\n {2}condenser\.temperature, 1 K colder: \+[\d.]+ points of yield, \+[\d.]+ t\/d/);
  expect(out).toContain('What holds the loop most');
  expect(out.split('\n').every((line) => [...line].length <= 100)).toBe(true);
});

test('which setting holds a figure most is told for each key figure, and with --json for all', () => {
  const sheet = run(['levers', 'ammonia.yaml']).out.split('\n');
  const part = sheet.slice(sheet.indexOf('What holds the loop most') + 1).join('\n');
  expect(part).toMatch(
    /^ {2}yield: \S+ \([+-]\S+\), [\s\S]*?\n {2}production: [\s\S]*?\n {2}specific power: [\s\S]*?\n {2}H2 lost in the purge: /,
  );
  const { holds, figures, settings } = JSON.parse(
    run(['levers', 'conversion.yaml', '--json']).out,
  ) as LeversJson;
  expect(Object.keys(holds)[0]).toBe('overall_yield');
  // As the yield is X/D, the purge loses 1 - X/D of the reactants: elasticities by the levers themselves.
  const lost = 'purge.lost_fraction.H2';
  for (const { setting, elasticity } of holds[lost]!) {
    const { value, figures: slopes } = settings[setting]!;
    expect(elasticity).toBeCloseTo((slopes[lost]! * value) / figures[lost]!, 12);
  }
  const D = 1 - 0.75 * 0.96;
  const byConversion = holds[lost]!.find(({ setting }) => setting.endsWith('.conversion'))!;
  // d ln(1 - X/D)/d ln X = -(X p/D2)/(1 - X/D)
  expect(byConversion.elasticity).toBeCloseTo(-((0.25 * 0.04) / D ** 2) / (1 - 0.25 / D), 6);
  for (const list of Object.values(holds)) {
    const sizes = list.map(({ elasticity }) => Math.abs(elasticity));
    expect(sizes).toEqual(sizes.toSorted((a, b) => b - a));
  }
});

test('--set and --case move the point at which the levers are taken', () => {
  const leverOf = (file: string, words: readonly string[]) => {
    const { out } = run(['levers', file, '--over', 'purge', '--json', ...words]);
    return (JSON.parse(out) as LeversJson).settings['purge.fractions.bleed']!;
  };
  const moved = leverOf('conversion.yaml', ['--set', 'purge.fractions.bleed=8 %']);
  // Yield X/D with D = 1 - (1 - X)(1 - p): a point of purge costs X(1 - X)/D2.
  expect(moved.value).toBeCloseTo(8, 12);
  expect(moved.figures['overall_yield']).toBeCloseTo((-0.01 * 0.25 * 0.75) / (1 - 0.75 * 0.92) ** 2, 8);
  const cold = leverOf('ammonia.yaml', ['--case', 'cold condenser']).figures['overall_yield']!;
  const plain = leverOf('ammonia.yaml', []).figures['overall_yield']!;
  expect(Math.abs(cold / plain - 1)).toBeGreaterThan(0.01);
});

test('a setting that is none is refused with the nearest one', () => {
  expect(run(['levers', 'ammonia.yaml', '--over', 'condenser.temprature'])).toEqual({
    code: 2,
    out: '',
    err: `command line:1:38 error unknown-setting
  condenser.temprature is no setting of this file that is a number and has a value.
   1 | looptally levers ammonia.yaml --over condenser.temprature
     |                                      ^^^^^^^^^^^^^^^^^^^^
  why:  the nearest setting is condenser.temperature
  mend: write --over condenser.temperature

1 error
`,
  });
});

test('a loop that does not close has no levers, exit code 3 and the reason', () => {
  const { code, out } = run(['levers', 'ammonia.yaml', '--max-passes', '2', '--json']);
  expect(code).toBe(3);
  const json = JSON.parse(out) as LeversJson & { diagnostics: { code: string }[] };
  expect(json.settings).toEqual({});
  expect(json.diagnostics.map((diagnostic) => diagnostic.code)).toEqual(['too-few-passes']);
});
