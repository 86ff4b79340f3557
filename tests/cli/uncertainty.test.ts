import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { shippedText } from '../tally/shipped.ts';
import { commandLine } from './looptally.ts';

const { run, folder } = commandLine();
const whole = shippedText('ammonia-uncertain.yaml');
const withSpreads = (spreads: string) => whole.replace(/^spreads:[\s\S]*/m, spreads);

beforeAll(() => {
  const files = {
    'loop.yaml': whole,
    'plain.yaml': withSpreads(''),
    'one.yaml': withSpreads('spreads: {condenser.temperature: {kind: normal, sd: 2 K}}\n'),
    'held.yaml': withSpreads(
      'spreads: {condenser.temperature: {kind: normal, sd: 2 K}}\naims:\n  inert cap: {move: purge.fractions.bleed, between: [0.2 %, 20 %], until: figures.inerts.converter = 12 %}\n',
    ),
    'fails.yaml': withSpreads(
      'spreads: {converter.pressure_drop: {kind: uniform, low: 1 bar, high: 301 bar}}\n',
    ),
    'open.yaml': `${withSpreads('spreads: {condenser.temperature: {kind: normal, sd: 2 K}}')}\nsolve: {max_passes: 2}\n`,
  };
  for (const [name, text] of Object.entries(files)) writeFileSync(join(folder(), name), text);
});

test('the sheet: percentiles, their ranges, and what each figure follows; no line beyond 100 characters', () => {
  const { code, out, err } = run(['uncertainty', 'loop.yaml', '--samples', '64']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toContain('64 samples of 8 spreads (Sobol sequence, seed 1), all closed');
  expect(out).toMatch(/\n {2}figure +in the file +mean +sd +5 % +10 % +50 % +90 % +95 %\n/);
  expect(out).toMatch(/\n {2}production_t_d +makeup\.flow \+0\.9\d \(\d\d %\)/);
  expect(out).toContain('move together: rank correlation 0.5.');
  // Of what moves together no part belongs to one alone: one share for both, and no sum above the whole.
  expect(out).toMatch(
    /makeup\.composition\.\w+ [+-]0\.\d\d with\s+makeup\.composition\.\w+ [+-]0\.\d\d\s+\(together \d+ %\)/,
  );
  const [, causes] = /What each figure follows([\s\S]*)\n {2}Spreads that move together/.exec(out)!;
  const lines = causes!.split(/\n {2}(?=[a-z])/).slice(1);
  const sums = lines.map((line) =>
    [...line.matchAll(/(\d+) %\)/g)].reduce((sum, [, n]) => sum + Number(n), 0),
  );
  expect(sums).toHaveLength(8);
  expect(Math.max(...sums)).toBeLessThanOrEqual(104);
  expect(out).toContain('Of 64 samples, a share below 7 % may be chance.');
  expect(out.split('\n').filter((line) => [...line].length > 100)).toEqual([]);
});

test('one seed gives the same bytes, another seed or method other numbers', () => {
  const result = (...words: string[]) =>
    run([
      'uncertainty',
      'loop.yaml',
      '--samples',
      '32',
      '--json',
      '--record',
      'figures.production_t_d',
      ...words,
    ]).out;
  expect(result('--seed', '5')).toBe(result('--seed', '5'));
  const mean = (text: string) => JSON.parse(text).figures['figures.production_t_d'].mean;
  expect(mean(result('--seed', '5'))).not.toBe(mean(result('--seed', '6')));
  expect(mean(result('--seed', '5'))).not.toBe(mean(result('--seed', '5', '--method', 'latin')));
});

test('--json holds what was drawn from, the percentiles asked for, and the shares', () => {
  const words = ['--samples', '32', '--shares', 'sobol', '--percentiles', '50,1', '--json'];
  const { code, out } = run([
    'uncertainty',
    'one.yaml',
    ...words,
    '--record',
    'figures.production_t_d, streams.S6.T',
  ]);
  expect(code).toBe(0);
  const json = JSON.parse(out);
  expect(json).toMatchObject({
    samples: 32,
    seed: 1,
    method: 'sobol',
    closed: 32,
    failed: 0,
    extra_cases: 64,
  });
  expect(json.spreads['condenser.temperature']).toEqual({
    unit: 'K',
    kind: 'normal',
    mean: 265.15,
    sd: 2,
    cut_below: 0,
    cut_above: 0,
  });
  expect(Object.keys(json.figures)).toEqual(['figures.production_t_d', 'streams.S6.T']);
  const temperature = json.figures['streams.S6.T'];
  expect(Object.keys(temperature.percentiles)).toEqual(['1', '50']);
  expect(temperature.in_file).toBeCloseTo(265.15, 9);
  expect(temperature.percentiles['50'].value).toBeCloseTo(265.15, 0);
  expect(temperature.shares['condenser.temperature'].rank_correlation).toBeCloseTo(1, 9);
  expect(temperature.shares['condenser.temperature'].total).toBeCloseTo(1, 0);
});

test('--out: a line for each sample, in the units of the file', () => {
  const words = ['--samples', '10', '--record', 'streams.S6.T', '--out', 'samples.csv'];
  const { code, err } = run(['uncertainty', 'one.yaml', ...words]);
  expect({ code, err }).toEqual({ code: 0, err: 'wrote samples.csv\n' });
  const [head, ...lines] = readFileSync(join(folder(), 'samples.csv'), 'utf8').trimEnd().split('\r\n');
  expect(head).toBe('sample,condenser.temperature [degC],streams.S6.T,converged,passes,note');
  expect(lines).toHaveLength(10);
  for (const [n, line] of lines.entries()) {
    const cells = line.split(',');
    expect(cells[0]).toBe(String(n + 1));
    expect(Number(cells[2])).toBeCloseTo(Number(cells[1]) + 273.15, 8);
    expect(cells[3]).toBe('true');
  }
});

test('a figure that an aim holds is said to be held, and no noise is shown of it', () => {
  const record = 'figures.inerts.converter, figures.recycle_ratio';
  const { code, out } = run(['uncertainty', 'held.yaml', '--samples', '40', '--record', record]);
  expect(code).toBe(0);
  expect(out).toMatch(/\n {2}inerts\.converter +0\.1200 +0\.1200 +0 +0\.1200 /);
  expect(out).toContain('\n  inerts.converter: held by the aim inert cap\n');
  expect(out).toMatch(/\n {2}inerts\.converter {2}held by the aim inert cap\n/);
  expect(out).toMatch(/\n {2}recycle_ratio +- +± [\d.]+ /);
  expect(out).toContain('-  too few samples to tell how far out this percentile may lie');
  const { figures } = JSON.parse(
    run(['uncertainty', 'held.yaml', '--samples', '8', '--record', record, '--json']).out,
  );
  expect(figures['figures.inerts.converter']).toMatchObject({ held_by: 'inert cap' });
  expect(figures['figures.inerts.converter'].shares['condenser.temperature'].rank_share).toBeNull();
});

test('cases that do not close are told by reason, and the exit code is 3', () => {
  const { code, out } = run(['uncertainty', 'fails.yaml', '--samples', '30', '--record', 'streams.S4.P']);
  expect(code).toBe(3);
  expect(out).toMatch(/30 samples of 1 spread .*, (\d+) closed, (\d+) did not\n/);
  const [, count, reason] = /no part in the numbers above\n {2}(\d+) x {2}(.*)/.exec(out)!;
  expect(out).toContain(`, ${count} did not\n`);
  expect(reason).toContain('pressure');
});

test('a file that does not close as it stands says why, before any sample', () => {
  const { code, out, err } = run(['uncertainty', 'open.yaml']);
  expect({ code, out }).toEqual({ code: 3, out: '' });
  expect(err).toContain('too-few-passes');
});

const refused: readonly (readonly [string, readonly string[], string])[] = [
  ['no-spreads', ['plain.yaml'], 'says nothing of what is uncertain'],
  ['shares-of-correlated', ['loop.yaml', '--shares', 'sobol'], 'no part of the variance belongs to one'],
  [
    'unknown-figure',
    ['loop.yaml', '--record', 'figures.recycle_ratio,streams.S3.x.Ar'],
    'streams.S3.x is not known',
  ],
  ['bad-formula', ['loop.yaml', '--record', 'max(1,'], '--record:'],
  ['bad-value', ['loop.yaml', '--percentiles', '5,100'], 'above 0 and below 100'],
  ['bad-value', ['loop.yaml', '--samples', '0'], 'whole number from 1'],
  ['bad-value', ['loop.yaml', '--seed', '-1'], 'whole number from 0'],
  ['bad-value', ['loop.yaml', '--method', 'dice'], 'one of sobol, latin'],
];

test.each(refused)('%s: refused with exit code 2 (%j)', (code, words, says) => {
  const outcome = run(['uncertainty', ...words, '--out', 'never.csv']);
  expect(outcome).toMatchObject({ code: 2, out: '' });
  expect(outcome.err).toContain(`error ${code}`);
  expect(outcome.err).toContain(says);
  expect(existsSync(join(folder(), 'never.csv'))).toBe(false);
});

test('a formula that leads nowhere is pointed at on the command line', () => {
  const { err } = run(['uncertainty', 'loop.yaml', '--record', 'figures.recycle_ratio,streams.S3.x.Ar']);
  expect(err).toContain(`
   1 | looptally uncertainty loop.yaml --record figures.recycle_ratio,streams.S3.x.Ar
     |                                                                ^^^^^^^^^^^^^^^
`);
});
