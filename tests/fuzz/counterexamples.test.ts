import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { judgeText } from '../../fuzz/judge-file.ts';
import { createTables, judgeSlice } from '../../fuzz/judge-tables.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import { type Balance, balance } from '../../src/tally/balance.ts';
import { createPlant } from '../../src/tally/plant.ts';
import { createPatience, tryOut } from '../../src/tally/why-trial.ts';

/** What mutants of shipped flowsheets have found, made smaller: each was once broken. */
async function mutant(name: string, ...changes: readonly (readonly [from: string, to: string])[]) {
  let text = readFileSync(new URL(`../../flowsheets/${name}.yaml`, import.meta.url), 'utf8');
  for (const [from, to] of changes) {
    expect(text).toContain(from);
    text = text.replace(from, to);
  }
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'mutant.yaml' });
  if (flowsheet === null) throw new Error(diagnostics.map(({ what }) => what).join('\n'));
  return flowsheet;
}

function notANumber({ result }: Balance): boolean {
  return JSON.stringify(result, (_, value) =>
    typeof value === 'number' && !Number.isFinite(value) ? 'not a number' : value,
  ).includes('not a number');
}

describe('a pass that fails', () => {
  test('has no residual: null, and no NaN that JSON would turn into one', async () => {
    const found = balance(await mutant('conversion-loop', ['H2: 74.25 kmol/h', 'H2: 0.668 t/d']));
    expect(found.diagnosis?.code).toBe('reactant-used-up');
    expect(found.result.convergence.residual).toBeNull();
    expect(notANumber(found)).toBe(false);
  });

  test('on the way has none in the trace', async () => {
    const found = balance(
      await mutant(
        'methanation',
        ['S1: syngas -> mixer', 'S1: syngas -> divider'],
        ['S6: knock_out.gas -> divider', 'S6: knock_out.gas -> mixer'],
      ),
      { maxPasses: 25 },
    );
    expect(found.result.convergence.history.some(({ residual }) => residual === null)).toBe(true);
    expect(notANumber(found)).toBe(false);
  });
});

test('of a component that does not leave at all nothing is said to go round without end', async () => {
  const swapped = await mutant(
    'purge-study',
    ['S1: makeup -> mixer', 'S1: condenser.gas -> mixer'],
    ['S4: condenser.gas -> purge', 'S4: makeup -> purge'],
  );
  const { diagnosis } = balance(swapped, { maxPasses: 25 });
  expect(diagnosis?.code).toBe('exit-too-small');
  expect(diagnosis?.why).toContain('none leaves');
  expect(`${diagnosis?.what} ${diagnosis?.why} ${diagnosis?.mend}`).not.toContain('Infinity');
});

test('the curves of a converter that did not close are not drawn, where they would end the program', async () => {
  const hot = await mutant('methanol-adiabatic-beds', [
    '{kind: heater, temperature: 215 degC',
    '{kind: heater, temperature: 21500 degC',
  ]);
  const found = balance(hot, { maxPasses: 25 });
  expect(found.diagnosis?.code).toBe('reactor-at-bound');
  expect(notANumber(found)).toBe(false);
});

test('trials for an advice share their passes, so that a slow loop is not tried for minutes', async () => {
  const plant = createPlant(await mutant('reference-loop'));
  const patience = createPatience();
  const group = plant.groups.find(({ tears }) => tears.length > 0)!;
  const before = patience.passes;
  const trial = tryOut(plant, group, 1e-9, [], 'auto', patience);
  expect(before - patience.passes).toBe(trial!.passes);
  expect(tryOut(plant, group, 1e-9, [], 'auto', { ...patience, passes: 2 })).toBeNull();
  expect(tryOut(plant, group, 1e-9, [], 'auto', { ...patience, passes: 0 })).toBeNull();
});

test('a stream whose name no formula can hold is a fault of its name, where prices name it as well', async () => {
  const text = readFileSync(new URL('../../flowsheets/methanol-optimum.yaml', import.meta.url), 'utf8');
  const doubled = text.replace(/^( {2})(S\w+)(: makeup -> .*)$/m, "$1$2$3\n$1$2'$3");
  expect(doubled).not.toBe(text);
  const { flowsheet, diagnostics } = await readFlowsheet(doubled, { file: 'mutant.yaml' });
  expect(flowsheet).toBeNull();
  expect(diagnostics.map(({ code }) => code)).toContain('bad-name');
});

test.each([300, 100, 30, 20, 10, 3])(
  'a recycle beside which rounding is no less than the feed closes in the ledger too, or is said not to: purge of %d ppb',
  async (ppb) => {
    const text = readFileSync(new URL('../../flowsheets/reference-loop.yaml', import.meta.url), 'utf8');
    const set = [`purge.fractions.bleed=${ppb * 1e-7} %`];
    const { flowsheet } = await readFlowsheet(text, { file: 'mutant.yaml', set });
    const { result, diagnosis } = balance(flowsheet!, { tolerance: 1e-9, maxPasses: 25 });
    const open = Math.max(...Object.values(result.ledger).map(({ closure }) => Math.abs(closure)));
    expect(result.convergence.converged).toBe(open <= 1e-9);
    expect(diagnosis?.code ?? 'closed').toBe(open <= 1e-9 ? 'closed' : 'exit-too-small');
  },
);

test('figures for each tonne of next to nothing, or of a feed of next to nothing, are left out and not infinite', async () => {
  const swamped = await mutant('methanation-two-stage', ['H2: 73.6', "H2: '1.7976931348623157e308'"]);
  const found = balance(swamped, { maxPasses: 25 });
  expect(found.result.figures.specific_power_kWh_t).toBeNull();
  expect(found.result.figures.overall_conversion['CO']).toBeUndefined();
  expect(notANumber(found)).toBe(false);
});

test.each(['1.7976931348623157e308', '1e5', '-300'])(
  'a temperature of %s without a unit is asked for its unit, and no other number is made of it',
  async (number) => {
    const text = readFileSync(new URL('../../flowsheets/reference-loop.yaml', import.meta.url), 'utf8');
    const { diagnostics } = await readFlowsheet(text, {
      file: 'mutant.yaml',
      set: [`condenser.temperature=${number}`],
    });
    const [fault] = diagnostics.filter(({ code }) => code === 'missing-unit');
    expect(fault?.mend).toBe('write the temperature with its unit, e.g. 450 degC');
  },
);

test('a title may be any words: a sheet that says them is no fault', async () => {
  const text = readFileSync(new URL('../../flowsheets/reference-loop.yaml', import.meta.url), 'utf8');
  expect(await judgeText(text.replace(/^title: .*$/m, 'title: NaN kmol/h'))).toBe('closed');
});

test('a Parquet slice with any byte of its rows, its mark or its heads changed is refused', async () => {
  const scratch = mkdtempSync(join(tmpdir(), 'looptally-slices-'));
  try {
    const { slices } = await createTables(scratch);
    const whole = slices.get('.parquet')!;
    expect(await judgeSlice(whole, '.parquet', whole, scratch)).toBe('opened');
    const mark = Buffer.from(whole).indexOf('"part"');
    const head = Buffer.from(whole).lastIndexOf('figures.recycle_ratio');
    const all = Array.from({ length: Math.ceil(whole.length / 23) }, (_, k) => 23 * k);
    for (const at of [mark, mark + 1, mark + 20, mark + 60, head, head + 5, ...all]) {
      const damaged = Buffer.from(whole);
      damaged[at] = damaged[at]! ^ 1;
      expect({ at, outcome: await judgeSlice(damaged, '.parquet', whole, scratch) }).toEqual({
        at,
        outcome: 'refused',
      });
    }
  } finally {
    rmSync(scratch, { recursive: true, force: true });
  }
});
