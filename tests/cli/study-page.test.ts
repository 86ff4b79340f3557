import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { readPage } from '../sheets/study-page/page-checks.ts';
import { commandLine } from './looptally.ts';

const { run, folder } = commandLine();
const at = (name: string) => join(folder(), name);
const shipped = (name: string) => readFileSync(new URL(`../../flowsheets/${name}`, import.meta.url), 'utf8');
const GRID = [
  '--over',
  'converter.reactions.synthesis.conversion=15 %..30 %:3',
  '--over',
  'purge.fractions.bleed=0.5 %..10 %:10 log',
];
const RECORD = ['--record', 'figures.recycle_ratio'];

beforeAll(() => {
  const objective =
    'objective: {minimise: figures.recycle_ratio, move: {purge.fractions.bleed: 1 %..10 %}, limits: [streams.S2.y.Ar < 10 %]}';
  writeFileSync(at('loop.yaml'), `${shipped('conversion-loop.yaml')}\n${objective}\n`);
  writeFileSync(at('uncertain.yaml'), shipped('ammonia-uncertain.yaml'));
  writeFileSync(at('cases.yaml'), shipped('ammonia-loop.yaml'));
});

/** A command that must go well; the page that it wrote. */
function page(words: readonly string[], name: string): string {
  const { code, err } = run([...words, '--out', name, '--quiet']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  return readFileSync(at(name), 'utf8');
}

describe('the page of a sweep', () => {
  test('has the same bytes for any number of workers, and holds the table with the limits recorded too', () => {
    const one = page(['sweep', 'loop.yaml', ...GRID, ...RECORD, '--workers', '1'], 'a.html');
    const three = page(['sweep', 'loop.yaml', ...GRID, ...RECORD, '--workers', '3'], 'sub.html');
    expect(three).toBe(one.replaceAll('a.csv', 'sub.csv').replace(policyOf(one), policyOf(three)));
    run([
      'sweep',
      'loop.yaml',
      ...GRID,
      '--record',
      'figures.recycle_ratio,streams.S2.y.Ar',
      '--out',
      'a.csv',
    ]);
    const { csv, text } = readPage(one);
    expect(csv).toEqual({ name: 'a.csv', text: readFileSync(at('a.csv'), 'utf8') });
    expect(text).toContain('Recorded as well, for the limits of the objective: streams.S2.y.Ar < 10 %.');
    expect(one).toContain('class="contours"');
    expect(one).toContain('<script>');
    expect(existsSync(at('a.html.part'))).toBe(false);
  });

  test('is made of a side file that a stopped sweep left, and asks for --resume', () => {
    const words = ['sweep', 'loop.yaml', ...GRID, ...RECORD, '--workers', '1'];
    const whole = page(words, 'a.html');
    // What a sweep that was stopped at once leaves behind.
    writeFileSync(at('a.html.part'), '');
    expect(run([...words, '--out', 'a.html']).err).toContain('unfinished-sweep');
    expect(page([...words, '--resume'], 'a.html')).toBe(whole);
  });

  test('of more cases than a browser opens at once is refused before the first of them', () => {
    const { code, err } = run([
      'sweep',
      'loop.yaml',
      '--over',
      'purge.fractions.bleed=1 %..9 %:20001',
      '--out',
      'b.html',
    ]);
    expect(code).toBe(2);
    expect(err).toContain('b.html cannot hold 20001 cases.');
    expect(readdirSync(folder()).filter((name) => name.startsWith('b.html'))).toEqual([]);
  });

  test('is no slice, and none is made of slices', () => {
    const slice = run(['sweep', 'loop.yaml', ...GRID, '--part', '1/2', '--out', 'b.html']);
    expect(slice.code).toBe(2);
    expect(slice.err).toContain('b.html cannot hold a slice.');
    const gathered = run(['gather', 'p1.csv', '--out', 'b.html']);
    expect(gathered.code).toBe(2);
    expect(gathered.err).toContain('b.html cannot be made from slices.');
  });
});

test('compare writes a page beside other files', () => {
  const { code, err } = run(['compare', 'cases.yaml', '--out', 'c.html', '--out', 'c.csv']);
  expect({ code, err }).toEqual({ code: 0, err: 'wrote c.html, c.csv\n' });
  const { csv, headings } = readPage(readFileSync(at('c.html'), 'utf8'));
  expect(csv).toEqual({ name: 'c.csv', text: readFileSync(at('c.csv'), 'utf8') });
  expect(headings).toContain('Settings that differ');
});

test('optimise writes a page beside other files', () => {
  const { code } = run(['optimise', 'loop.yaml', '--starts', '1', '--out', 'o.html', '--out', 'o.csv']);
  expect(code).toBe(0);
  const { csv, headings } = readPage(readFileSync(at('o.html'), 'utf8'));
  expect(csv.text).toBe(readFileSync(at('o.csv'), 'utf8'));
  expect(headings).toContain('Around the best case');
});

test('uncertainty writes a page, and refuses one of more cases than a browser opens at once', () => {
  const words = ['uncertainty', 'uncertain.yaml', '--record', 'figures.recycle_ratio', '--samples'];
  const { csv } = readPage(page([...words, '16'], 'u.html'));
  run([...words, '16', '--out', 'u.csv']);
  expect(csv).toEqual({ name: 'u.csv', text: readFileSync(at('u.csv'), 'utf8') });
  const { code, err } = run([...words, '20001', '--out', 'v.html']);
  expect(code).toBe(2);
  expect(err).toContain('v.html cannot hold 20001 cases.');
});

function policyOf(html: string): string {
  return /Content-Security-Policy" content="([^"]*)"/.exec(html)![1]!;
}
