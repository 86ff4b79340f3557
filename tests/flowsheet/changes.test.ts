import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { formatDiagnostics } from '../../src/diagnostics/format.ts';
import { setFileText } from '../../src/flowsheet/changes.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';

const text = readFileSync(new URL('ammonia.yaml', import.meta.url), 'utf8');

async function read(set: readonly string[], caseName: string | null = null) {
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'ammonia.yaml', set, case: caseName });
  const texts = { 'ammonia.yaml': text, '--set': setFileText(set) };
  return { flowsheet, diagnostics, message: formatDiagnostics(diagnostics, { texts }) };
}

async function settingsOf(block: string, set: readonly string[], caseName: string | null = null) {
  const { flowsheet, message } = await read(set, caseName);
  if (flowsheet === null) throw new Error(message);
  return flowsheet.blocks.find((b) => b.name === block)!.settings;
}

test('a change moves a setting of a block', async () => {
  expect(await settingsOf('condenser', ['condenser.temperature=-20 degC'])).toMatchObject({
    temperature: 253.14999999999998,
  });
  expect(await settingsOf('purge', ['purge.fractions.bleed = 5 %'])).toEqual({ fractions: { bleed: 0.05 } });
});

test('a change adds a setting that the file leaves to its default, and null takes one out', async () => {
  expect(await settingsOf('circulator', ['circulator.stages=2'])).toMatchObject({ stages: 2 });
  const changed = await settingsOf('condenser', ['condenser.temperature=null', 'condenser.duty=-12 MW']);
  expect(changed).not.toHaveProperty('temperature');
  expect(changed).toMatchObject({ duty: -12e6 });
});

test('a change moves feeds, models and the solver', async () => {
  const { flowsheet } = await read([
    'makeup.flow=100 t/d',
    'makeup.composition.Ar=0',
    'gas=pr',
    'solve.method=direct',
    'ledger.reactant=N2',
  ]);
  expect(flowsheet?.feeds[0]).toMatchObject({ flow: { per: 'mass' } });
  expect(flowsheet?.feeds[0].parts[3]).toBe(0);
  expect(flowsheet).toMatchObject({ gas: 'pr', solve: { method: 'direct' }, ledger: { reactant: 'N2' } });
});

test('a case makes its changes, and a change on the command line goes after it', async () => {
  expect(await settingsOf('condenser', [], 'cold condenser')).toMatchObject({
    temperature: 248.14999999999998,
  });
  const both = await settingsOf('condenser', ['condenser.temperature=0 degC'], 'cold condenser');
  expect(both).toMatchObject({ temperature: 273.15 });
  expect((await read([], 'cold condenser')).flowsheet?.caseName).toBe('cold condenser');
});

test('later changes go over earlier ones', async () => {
  expect(
    await settingsOf('condenser', ['condenser.temperature=1 degC', 'condenser.temperature=2 degC']),
  ).toMatchObject({
    temperature: 275.15,
  });
});

test.each([
  [
    ['condensor.temperature=-20 degC'],
    `--set:1:1 error unknown-setting
  condensor.temperature is no setting of this file.
   1 | condensor.temperature=-20 degC
     | ^^^^^^^^^^^^^^^^^^^^^
  why:  the nearest known name is condenser
  mend: write condenser.temperature

1 error`,
  ],
  [
    ['gas=pr', 'condenser.temperature=-20'],
    `--set:2:23 error missing-unit
  condenser.temperature: the number -20 has no unit.
   2 | condenser.temperature=-20
     |                       ^^^
  why:  a temperature needs its unit; these fit: degC, K, degF
  mend: write -20 degC, or 253.15 K for the same temperature

1 error`,
  ],
  [
    ['condenser.temprature=-20 degC'],
    `--set:1:1 error unknown-key
  condenser has an unknown key temprature.
   1 | condenser.temprature=-20 degC
     | ^^^^^^^^^^^^^^^^^^^^
  why:  the nearest known key is temperature
  mend: write condenser.temperature

1 error`,
  ],
  [
    ['condenser.temperature'],
    `--set:1:1 error bad-set
  "condenser.temperature" is no change of a setting.
   1 | condenser.temperature
     | ^^^^^^^^^^^^^^^^^^^^^
  why:  a change is written PATH=VALUE
  mend: write e.g. --set 'condenser.temperature=-20 degC'

1 error`,
  ],
  [
    ['condenser.temperature='],
    `--set:1:1 error bad-set
  condenser.temperature is given no value.
   1 | condenser.temperature=
     | ^^^^^^^^^^^^^^^^^^^^^
  why:  nothing stands after the =
  mend: write condenser.temperature=VALUE, or condenser.temperature=null to take the setting out

1 error`,
  ],
  [
    ['purge.fractions={bleed: 3 %'],
    `--set:1:17 error yaml
  The value of purge.fractions cannot be read.
   1 | purge.fractions={bleed: 3 %
     |                 ^
  why:  the bracket { is opened here and never closed
  mend: close it with }

1 error`,
  ],
  [
    ['condenser.temperature.x=3 K'],
    `--set:1:1 error unknown-setting
  condenser.temperature.x is no setting of this file.
   1 | condenser.temperature.x=3 K
     | ^^^^^^^^^^^^^^^^^^^^^^^
  why:  on the way there stands a single value, or a list that is shorter
  mend: write e.g. condenser.temperature

1 error`,
  ],
])('%j is refused with its whole message', async (set, message) => {
  expect((await read(set)).message).toBe(message);
});

test('an unknown case is refused with the nearest name', async () => {
  const { message } = await read([], 'cold condensor');
  expect(message).toContain('There is no case "cold condensor".');
  expect(message).toContain("mend: write --case 'cold condenser'");
});

test('a set value that an aim moves anyway is warned of, and the file is still read', async () => {
  const set = ['purge.fractions.bleed=5 %'];
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'ammonia.yaml', set });
  expect(flowsheet).not.toBeNull();
  expect(diagnostics.map(({ code, severity, what }) => ({ code, severity, what }))).toEqual([
    {
      code: 'set-and-aimed',
      severity: 'warning',
      what: 'purge.fractions.bleed is set here and moved by the aim inert cap.',
    },
  ]);
});

test('what --set changed is told among the assumptions', async () => {
  const { flowsheet } = await readFlowsheet(text, {
    file: 'ammonia.yaml',
    set: ['condenser.temperature=-20 degC'],
  });
  expect(flowsheet?.assumptions).toContain('Changed by --set: condenser.temperature = -20 degC.');
});

test.each([
  ['condensor.tempratur=-5 degC', 'write condenser.temperature'],
  ['condenser.temprature=3 degC', 'write condenser.temperature'],
  ['converter.reactions.synthesis.aproach=5 K', 'write converter.reactions.synthesis.approach'],
  ['converter.reactions.sythesis.approach=5 K', 'write converter.reactions.synthesis.approach'],
  ['makup.composition.Arr=0.3', 'write makeup.composition.Ar'],
  ['purge.fractions.bled=3 %', 'write purge.fractions.bleed'],
  ['fractions.bleed=2 %', 'write purge.fractions.bleed'],
  ['temperature=3 degC', 'write converter.temperature or condenser.temperature or makeup.temperature'],
])('the mend of %s is a path that can be typed again', async (set, mend) => {
  const { diagnostics } = await read([set]);
  expect(diagnostics.map((one) => [one.where.file, one.mend])).toEqual([['--set', mend]]);
});
