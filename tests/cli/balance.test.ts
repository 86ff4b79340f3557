import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import type { Result } from '../../src/model/result.ts';
import { readWorkbook } from '../sheets/read-workbook.ts';
import { commandLine } from './looptally.ts';

const { run, folder } = commandLine();
const names = ['ammonia', 'methanol', 'methanation', 'conversion'];

beforeAll(() => {
  for (const name of names) run(['new', name, '--out', `${name}.yaml`]);
});

function resultOf(words: readonly string[]): Result {
  return JSON.parse(run([...words, '--json']).out);
}

describe('a starter file', () => {
  test.each(names)('%s closes as it stands, with all balances below 1e-9', (name) => {
    const { code, out, err } = run(['balance', `${name}.yaml`, '--json']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    const { closure, convergence } = JSON.parse(out) as Result;
    expect(convergence.converged).toBe(true);
    for (const value of [closure.mass, closure.energy, ...Object.values(closure.atoms)]) {
      expect(Math.abs(value)).toBeLessThan(1e-9);
    }
  });

  test.each([
    ['ammonia', 'cold condenser'],
    ['methanol', 'small purge'],
    ['methanation', 'less recycle'],
    ['conversion', 'tired catalyst'],
  ])('%s closes in its case %s too, and the case changes the answer', (name, chosen) => {
    const { code, out } = run(['balance', `${name}.yaml`, '--case', chosen, '--json']);
    expect(code).toBe(0);
    const result = JSON.parse(out) as Result;
    expect(result.case).toBe(chosen);
    expect(result.figures.recycle_ratio).not.toBeCloseTo(
      resultOf(['balance', `${name}.yaml`]).figures.recycle_ratio!,
      3,
    );
  });

  test.each(names)('%s is the same on standard output and in a file', (name) => {
    expect(run(['new', name]).out).toBe(readFileSync(join(folder(), `${name}.yaml`), 'utf8'));
  });
});

describe('balance', () => {
  test('prints the story first, nothing on standard error, and no colour into a pipe', () => {
    const { code, out, err } = run(['balance', 'ammonia.yaml']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out.split('\n')[0]).toBe('Ammonia loop');
    expect(out.indexOf('Goes round')).toBeGreaterThan(0);
    expect(out.indexOf('Goes round')).toBeLessThan(out.indexOf('Streams'));
    expect(out).not.toContain('\u001b');
  });

  test('is the same to the byte when it is run again', () => {
    expect(run(['balance', 'methanol.yaml', '--json']).out).toBe(
      run(['balance', 'methanol.yaml', '--json']).out,
    );
  });

  test('reads standard input with -', () => {
    const text = readFileSync(join(folder(), 'conversion.yaml'), 'utf8');
    expect(run(['balance', '-'], { input: text }).out).toBe(run(['balance', 'conversion.yaml']).out);
  });

  test('--set moves a setting: a colder condenser makes more ammonia', () => {
    const warm = resultOf(['balance', 'ammonia.yaml', '--set', 'condenser.temperature=5 degC']);
    const cold = resultOf(['balance', 'ammonia.yaml', '--set', 'condenser.temperature=-25 degC']);
    expect(cold.figures.production_t_d!).toBeGreaterThan(warm.figures.production_t_d!);
  });

  test('--set may be repeated, also behind --case', () => {
    const { out, code } = run([
      'balance',
      'ammonia.yaml',
      '--case',
      'cold condenser',
      '--set',
      'purge.fractions.bleed=5 %',
      '--set',
      'converter.temperature=430 degC',
      '--json',
    ]);
    expect(code).toBe(0);
    const { streams } = JSON.parse(out) as Result;
    expect(streams['S5']!.temperature_K).toBeCloseTo(248.15, 6);
    expect(streams['S3']!.temperature_K).toBeCloseTo(703.15, 6);
    expect(streams['S6']!.flow_kmol_h / streams['S4']!.flow_kmol_h).toBeCloseTo(0.05, 9);
  });

  test('--trace adds the passes, as many as were counted', () => {
    const { out } = run(['balance', 'conversion.yaml', '--trace']);
    expect(out).toMatch(/\nPasses\n {2}Pass(?:es)? 1 .*from the feeds.*\n {2}pass {2}residual {2}method/);
    const [, counted] = /closed in (\d+) passes/.exec(out)!;
    expect(out).toMatch(new RegExp(`\\n {2,}${counted} .*\\n\\nAssumptions`));
  });

  test('--method and --tolerance overrule the file', () => {
    const { convergence } = resultOf([
      'balance',
      'conversion.yaml',
      '--method',
      'direct',
      '--tolerance',
      '1e-5',
    ]);
    expect(convergence.method).toBe('direct');
    expect(convergence.passes).toBeLessThan(
      resultOf(['balance', 'conversion.yaml', '--method', 'direct']).convergence.passes,
    );
  });

  test('a loop that does not close ends with exit code 3, what there is, and the reason', () => {
    const { code, out, err } = run(['balance', 'ammonia.yaml', '--max-passes', '5', '--method', 'direct']);
    expect(code).toBe(3);
    expect(out).toMatch(/\nNOT CLOSED after 5 passes .*\n {2}what: .*\n(?: {8}.*\n)* {2}why: {2}/);
    expect(err).toMatch(/error [a-z-]+\n/);
    expect(err).toMatch(/\n {2}why: .*\n {2}mend: /s);
    const json = run(['balance', 'ammonia.yaml', '--max-passes', '2', '--method', 'direct', '--json']);
    expect(json.code).toBe(3);
    expect(json.err).toBe('');
    expect(JSON.parse(json.out)).toMatchObject({ looptally: 1, convergence: { converged: false } });
    expect(JSON.parse(json.out).diagnostics).toHaveLength(1);
  });

  test('an aim out of reach ends with exit code 4, as two that fight do, one in reach with 0', () => {
    const text = readFileSync(join(folder(), 'ammonia.yaml'), 'utf8');
    const aim = (wanted: string) =>
      `${text}\naims:\n  inert cap: {move: purge.fractions.bleed, between: [1 %, 6 %], until: streams.S2.y.Ar + streams.S2.y.CH4 = ${wanted}}\n`;
    writeFileSync(join(folder(), 'near.yaml'), aim('8 %'));
    writeFileSync(join(folder(), 'far.yaml'), aim('60 %'));
    const near = run(['balance', 'near.yaml', '--json']);
    expect(near.code).toBe(0);
    const { streams } = JSON.parse(near.out) as Result;
    expect(streams['S2']!.mole_fraction['Ar']! + streams['S2']!.mole_fraction['CH4']!).toBeCloseTo(0.08, 6);
    const far = run(['balance', 'far.yaml']);
    expect(far.code).toBe(4);
    expect(far.out).toContain('NOT REACHED');
    const second =
      '  other: {move: condenser.temperature, between: [-20 degC, 10 degC], until: streams.S2.y.Ar + streams.S2.y.CH4 = 9 %}\n';
    writeFileSync(join(folder(), 'fight.yaml'), aim('8 %') + second);
    const fight = run(['balance', 'fight.yaml']);
    expect(fight.code).toBe(4);
    expect(fight.out.replace(/\s+/g, ' ')).toContain(
      'it cannot be met along with the aim other (which has 0.08',
    );
  });

  test('faults of a file go to standard error with their lines, exit code 2, also as JSON', () => {
    const text = readFileSync(join(folder(), 'ammonia.yaml'), 'utf8');
    writeFileSync(join(folder(), 'faulty.yaml'), text.replace('kind: condenser', 'kind: condensor'));
    const { code, out, err } = run(['balance', 'faulty.yaml']);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toMatch(/^faulty\.yaml:\d+:\d+ error /);
    expect(err).toContain('kind: condensor');
    const json = run(['balance', 'faulty.yaml', '--json']);
    expect({ code: json.code, err: json.err }).toEqual({ code: 2, err: '' });
    expect(JSON.parse(json.out).diagnostics[0]).toMatchObject({ severity: 'error', file: 'faulty.yaml' });
  });
});

describe('check', () => {
  test('shows order, loop, tear and degrees of freedom without solving', () => {
    const { code, out, err } = run(['check', 'ammonia.yaml']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    for (const head of ['Order of calculation', 'Loops', 'Degrees of freedom', 'Assumptions'])
      expect(out).toContain(head);
    expect(out).toContain('\n  0 left\n');
  });

  test('as JSON gives blocks, loops, tears, order, assumptions and diagnostics', () => {
    const plan = JSON.parse(run(['check', 'ammonia.yaml', '--json']).out);
    expect(plan.loops).toHaveLength(1);
    expect(plan.loops[0].tears).toEqual(plan.tears);
    expect([...plan.order].sort()).toEqual(['circulator', 'condenser', 'converter', 'mixer', 'purge']);
    expect(plan.diagnostics).toEqual([]);
  });
});

describe('sheet', () => {
  test('writes several formats at once and leaves no temporary file behind', () => {
    const { code, out, err } = run(['sheet', 'ammonia.yaml', '--out', 'loop.md', '--out', 'loop.csv']);
    expect({ code, out, err }).toEqual({ code: 0, out: '', err: 'wrote loop.md, loop.csv\n' });
    expect(readFileSync(join(folder(), 'loop.md'), 'utf8')).toMatch(/^# Ammonia loop\n/);
    expect(readFileSync(join(folder(), 'loop.csv'), 'utf8')).toMatch(/^stream,from,to,temperature \[degC\],/);
    expect(readdirSync(folder()).filter((name) => name.endsWith('.tmp'))).toEqual([]);
  });

  test('--out takes several names at once, --table chooses what a CSV holds', () => {
    expect(
      run(['sheet', 'conversion.yaml', '--table', 'ledger', '--quiet', '--out', 'a.csv', 'b.md']),
    ).toEqual({
      code: 0,
      out: '',
      err: '',
    });
    expect(readFileSync(join(folder(), 'a.csv'), 'utf8')).toMatch(/^component,in \[kmol\/h\],/);
  });

  test('writes a workbook that says by which version it was made', () => {
    expect(run(['sheet', 'ammonia.yaml', '--quiet', '--out', 'loop.XLSX'])).toEqual({
      code: 0,
      out: '',
      err: '',
    });
    const { cells, names } = readWorkbook(readFileSync(join(folder(), 'loop.XLSX')));
    const version = run(['--version']).out.trim();
    expect(cells.get('Streams!A3')!.text).toContain(`Looptally ${version}. A study tool`);
    const { figures } = JSON.parse(run(['balance', 'ammonia.yaml', '--json']).out);
    expect(cells.get(names.get('recycle_ratio')!)!.value).toBeCloseTo(figures.recycle_ratio, 12);
  });

  test('writes nothing when the file has faults', () => {
    expect(run(['sheet', 'faulty.yaml', '--out', 'never.md']).code).toBe(2);
    expect(readdirSync(folder())).not.toContain('never.md');
  });
});

describe('the examples of the help texts', () => {
  test.each(['balance', 'check', 'sheet', 'equilibrium', 'data', 'new', 'schema'])('of %s work', (name) => {
    const help = run([name, '--help']).out;
    const examples = help
      .slice(help.search(/\nExamples?:\n/))
      .split('\n')
      .filter((line) => line.startsWith('  looptally '));
    expect(examples.length).toBeGreaterThan(0);
    for (const example of examples) {
      const command = example.trim().replace(/ > \S+$/, '');
      const words = [...command.matchAll(/'([^']*)'|(\S+)/g)].map((match) => match[1] ?? match[2]!).slice(1);
      if (words[0] === 'new' && words.includes('--out')) words.push('--force');
      expect({ example, code: run(words).code }).toEqual({ example, code: 0 });
    }
  });
});
