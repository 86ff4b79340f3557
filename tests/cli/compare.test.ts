import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { shippedText } from '../tally/shipped.ts';
import { commandLine } from './looptally.ts';

const { run, folder } = commandLine();

interface CompareJson {
  readonly columns: readonly { name: string; case: string | null; closed: boolean }[];
  readonly settings: readonly { path: string; unit: string | null; values: unknown[] }[];
  readonly figures: readonly { figure: string; values: (number | null)[]; differences: (number | null)[] }[];
}

beforeAll(() => {
  writeFileSync(join(folder(), 'ammonia.yaml'), shippedText('ammonia-loop.yaml'));
  writeFileSync(join(folder(), 'conversion.yaml'), shippedText('conversion-loop.yaml'));
  const conversion = shippedText('conversion-loop.yaml').replace(/\ncases:[\s\S]*?(?=\n\w|$)/, '');
  writeFileSync(join(folder(), 'plain.yaml'), conversion);
  // The condenser cannot be colder than absolute cold allows; a valve set above its inlet makes the case fail.
  const cases =
    'cases:\n  impossible: {letdown.pressure: 400 bar}\n  warm: {condenser.temperature: 5 degC}\n';
  writeFileSync(
    join(folder(), 'fails.yaml'),
    shippedText('ammonia-loop.yaml').replace(/\ncases:[\s\S]*$/, `\n${cases}`),
  );
});

test('one file: as it stands and every case of it, the cause before the figures', () => {
  const { code, out, err } = run(['compare', 'ammonia.yaml']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toMatch(/^as in the file: closed in \d+ passes\ncold condenser: .*\nsmall purge: /m);
  expect(out.indexOf('condenser.temperature')).toBeLessThan(out.indexOf('overall_yield'));
  expect(out).toMatch(/condenser\.temperature +-8\.0 degC +-25\.0 degC +same/);
});

test('--case chooses cases, --json has every figure as balance has it', () => {
  const { code, out } = run(['compare', 'ammonia.yaml', '--case', 'small purge', '--json']);
  expect(code).toBe(0);
  const { columns, settings, figures } = JSON.parse(out) as CompareJson;
  expect(columns.map((column) => column.case)).toEqual([null, 'small purge']);
  expect(settings).toEqual([{ path: 'purge.fractions.bleed', unit: '%', values: [2.2, 1] }]);
  const balance = JSON.parse(run(['balance', 'ammonia.yaml', '--case', 'small purge', '--json']).out);
  expect(figures.map(({ figure }) => figure)).toContain('overall_yield.value');
  const made = figures.find(({ figure }) => figure === 'production_t_d')!;
  expect(made.values[1]).toBe(balance.figures.production_t_d);
});

test('a case that does not close has its reason and exit code 3; the others are still compared', () => {
  const { code, out, err } = run(['compare', 'fails.yaml']);
  expect(code).toBe(3);
  expect(out).toMatch(/^impossible: NOT CLOSED: /m);
  expect(out).toMatch(/condenser\.temperature +-8\.0 degC +same +5\.0 degC/);
  expect(err).toContain('fails.yaml:');
});

test('several files; --out writes tables, numbers in full', () => {
  const words = ['compare', 'ammonia.yaml', 'fails.yaml', '--out', 'both.csv', '--out', 'both.md'];
  const { code, out, err } = run(words);
  expect({ code, out, err }).toEqual({ code: 0, out: '', err: 'wrote both.csv, both.md\n' });
  const [head, closed] = readFileSync(join(folder(), 'both.csv'), 'utf8').split('\r\n');
  expect(head).toContain('ammonia.yaml,fails.yaml,fails.yaml: difference');
  expect(closed).toMatch(/^closed,,,yes,yes/);
  expect(readFileSync(join(folder(), 'both.md'), 'utf8')).toContain('## Settings that differ');
});

test('of a block that one file has not its settings are told, not its kind as well', () => {
  writeFileSync(join(folder(), 'other.yaml'), shippedText('ammonia-heat-recovery.yaml'));
  const { out } = run(['compare', 'ammonia.yaml', 'other.yaml', '--json']);
  const paths = (JSON.parse(out) as CompareJson).settings.map(({ path }) => path);
  expect(paths).toContain('preheat.temperature');
  expect(paths).not.toContain('preheat.kind');
});

test.each([
  [['compare', 'plain.yaml'], 'nothing-to-compare'],
  [['compare', 'ammonia.yaml', '--case', 'small purg'], 'unknown-case'],
  [['compare', 'ammonia.yaml', 'plain.yaml', '--case', 'small purg'], 'unknown-case'],
  [['compare', 'ammonia.yaml', '--out', 'x.pdf'], 'unknown-format'],
  [['compare', 'ammonia.yaml', '--out', 'ammonia.yaml'], 'unknown-format'],
  [['compare', 'nothing.yaml'], 'no-such-file'],
])('%j is refused before any work', (words, fault) => {
  const { code, out, err } = run(words);
  expect({ code, out }).toEqual({ code: 2, out: '' });
  expect(err).toContain(`error ${fault}`);
});
