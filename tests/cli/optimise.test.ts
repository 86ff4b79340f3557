import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { shippedText } from '../tally/shipped.ts';
import { commandLine } from './looptally.ts';

const { run, folder } = commandLine();

interface OptimiseJson {
  readonly outcome: string;
  readonly goals: readonly { unit: string; value: number }[];
  readonly settings: readonly { path: string; unit: string; value: number; at_bound: string | null }[];
  readonly limits: readonly { met: boolean; active: boolean }[];
  readonly front: readonly { goals: number[] }[];
  readonly result?: { figures: { overall_yield: { value: number } } };
  readonly diagnostics?: readonly { code: string; line: number }[];
}

const conversion = shippedText('conversion-loop.yaml');
const move = 'move: {purge.fractions.bleed: 1 %..20 %}';

beforeAll(() => {
  const write = (name: string, objective: string) =>
    writeFileSync(join(folder(), name), `${conversion}\nobjective:\n  ${objective}\n  ${move}\n`);
  writeFileSync(join(folder(), 'plain.yaml'), conversion);
  // A valve cannot be set above its inlet, wherever between these bounds it is moved.
  const valve = 'move: {letdown.pressure: 300 bar..400 bar}';
  const ammonia = shippedText('ammonia-loop.yaml').replace(/\nobjective:[\s\S]*$/, '\n');
  writeFileSync(
    join(folder(), 'stuck.yaml'),
    `${ammonia}\nobjective:\n  minimise: figures.recycle_ratio\n  ${valve}\n`,
  );
  // The yield falls with the purge, inerts too: the limit on inerts holds the answer.
  write('one.yaml', 'maximise: figures.overall_yield.value\n  limits: figures.inerts.converter < 5 %');
  write('two.yaml', 'maximise: figures.overall_yield.value\n  minimise: figures.inerts.converter');
  write('none.yaml', 'maximise: figures.recycle_ratio\n  limits: figures.overall_yield.value > 99.5 %');
});

/** Share of argon at the converter of the closed form, purge p, conversion 25 %. */
function inertsAt(p: number): number {
  const nitrogen = 24.75 / (1 - 0.75 * (1 - p));
  return 1 / p / (4 * nitrogen + 1 / p);
}

test('the optimum with what holds it, and settings to be put in the file that give it again', () => {
  const { code, out, err } = run(['optimise', 'one.yaml']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toMatch(/^maximise figures\.overall_yield\.value: \d+\.\d+ %, all limits kept/m);
  expect(out).toMatch(
    /1 {2}figures\.inerts\.converter < 5 % +5\.00 % {2}active; 1 point more is worth [\d.]+ points/,
  );
  const bleed = /optimum: \{purge\.fractions\.bleed: ([\d.]+) %\}/.exec(out)![1]!;
  expect(inertsAt(Number(bleed) / 100)).toBeCloseTo(0.05, 7);
  const again = run(['balance', 'one.yaml', '--json', '--set', `purge.fractions.bleed=${bleed} %`]);
  expect(JSON.parse(again.out).figures.inerts.converter).toBeCloseTo(0.05, 7);
});

test('--json with --sheet has the full result at the optimum, --out the table in full', () => {
  const words = ['optimise', 'one.yaml', '--json', '--sheet', '--out', 'best.csv', '--out', 'best.md'];
  const { code, out } = run(words);
  const { outcome, goals, settings, limits, result } = JSON.parse(out) as OptimiseJson;
  expect({ code, outcome }).toEqual({ code: 0, outcome: 'found' });
  expect(settings[0]).toMatchObject({ path: 'purge.fractions.bleed', unit: '%', at_bound: null });
  expect(limits).toMatchObject([{ met: true, active: true }]);
  expect(result!.figures.overall_yield.value).toBeCloseTo(goals[0]!.value, 9);
  const [head, best] = readFileSync(join(folder(), 'best.csv'), 'utf8').split('\r\n');
  expect(head).toBe('row,purge.fractions.bleed [%],figures.overall_yield.value,limits broken');
  const [row, bleed, value] = best!.split(',');
  expect(row).toBe('best');
  expect(Number(bleed)).toBeCloseTo(settings[0]!.value, 9);
  expect(Number(value)).toBeCloseTo(goals[0]!.value, 9);
  expect(readFileSync(join(folder(), 'best.md'), 'utf8')).toContain('## Settings');
});

test('two goals: as many cases as asked for, from end to end', () => {
  const { code, out } = run(['optimise', 'two.yaml', '--points', '5', '--json']);
  const { front } = JSON.parse(out) as OptimiseJson;
  expect(code).toBe(0);
  expect(front).toHaveLength(5);
  for (let k = 1; k < 5; k++) {
    expect(front[k]!.goals[0]).toBeGreaterThan(front[k - 1]!.goals[0]!);
    expect(front[k]!.goals[1]).toBeGreaterThan(front[k - 1]!.goals[1]!);
  }
});

test('limits that cannot be met: exit code 4, which and by how much, and nothing is written', () => {
  const { code, out, err } = run(['optimise', 'none.yaml', '--out', 'none.csv']);
  expect(code).toBe(4);
  expect(out).toMatch(/LIMITS NOT MET[\s\S]*CANNOT BE MET: [\d.]+ points short/);
  expect(err).toContain('none.yaml:');
  expect(err).toContain('error limits-not-met');
  expect(err).toMatch(/figures\.overall_yield\.value > 99\.5 % \(97\.09 % at best\)/);
  expect(() => readFileSync(join(folder(), 'none.csv'))).toThrow();
  const json = JSON.parse(run(['optimise', 'none.yaml', '--json']).out) as OptimiseJson;
  expect(json.diagnostics).toMatchObject([{ code: 'limits-not-met' }]);
});

test('where the loop does not close: exit code 3 with the reason', () => {
  const { code, err } = run(['optimise', 'stuck.yaml']);
  expect(code).toBe(3);
  expect(err).toContain('error objective-open');
  expect(err).toContain('letdown');
});

test('a file without an objective is refused with what to add', () => {
  const { code, out, err } = run(['optimise', 'plain.yaml']);
  expect({ code, out }).toEqual({ code: 2, out: '' });
  expect(err).toContain('error no-objective');
  expect(run(['optimise', 'one.yaml', '--out', 'x.pdf']).err).toContain('error unknown-format');
});
