import { expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';

const flowsheet = (
  components: string,
  parts: string,
  feedT: string,
  block: string,
  more = '',
) => `looptally: 1
components: [${components}]
${more}
feeds: {makeup: {flow: 100 kmol/h, temperature: ${feedT}, pressure: 50 bar, composition: {${parts}}}}
blocks: {unit: ${block}}
streams: {S1: makeup -> unit, S2: unit -> out}
`;

const warnings = async (text: string) => balance(await read(text)).result.warnings;

test.each([
  [
    'a heat capacity',
    (T: number) => flowsheet('H2, N2', 'H2: 3, N2: 1', `${T} K`, '{kind: heater, temperature: 300 K}'),
    [200, 'above'],
    {
      code: 'heat-capacity-out-of-range',
      where: 'S1',
      message:
        'the heat capacity of N2 is used at -73.6 degC, outside its -73.1 to 5726.9 degC; the heat capacity of the end of its range is kept',
    },
  ],
  [
    'a Henry constant',
    (T: number) => flowsheet('CO2, H2O', 'CO2: 1, H2O: 9', '300 K', `{kind: heater, temperature: ${T} K}`),
    [473, 'below'],
    {
      code: 'henry-out-of-range',
      where: 'S2',
      message:
        'the Henry constant of CO2 in H2O is used at 200.4 degC, outside its 1.9 to 199.9 degC; ln H goes on linear in 1/T',
    },
  ],
  [
    'a published constant',
    (T: number) =>
      flowsheet(
        'CO, H2O, CO2, H2',
        'CO: 1, H2O: 3',
        '300 degC',
        `{kind: reactor, reactions: {shift: {approach: 0 K}}, temperature: ${T} K}`,
        'reactions: {shift: {equation: CO + H2O <=> CO2 + H2, constant: moe-1962}}',
      ),
    [473, 'above'],
    {
      code: 'constant-out-of-range',
      where: 'unit',
      message: 'the constant of shift is used at 199 degC, outside the 200 to 600 degC of its source',
    },
  ],
] as const)(
  '%s is named just outside its range and not just inside',
  async (_, at, [edge, inside], expected) => {
    const sign = inside === 'above' ? 1 : -1;
    const codes = (await warnings(at(edge + 0.5 * sign))).map(({ code }) => code);
    expect(codes).not.toContain(expected.code);
    expect(await warnings(at(edge - 0.5 * sign))).toContainEqual(expected);
  },
);

test('streams that share a correlation are named together, and what a block has said is not repeated', async () => {
  const text = `looptally: 1
components: [N2, H2O]
feeds: {makeup: {flow: 100 kmol/h, temperature: 0 degC, pressure: 20 bar, composition: {N2: 1, H2O: 1}}}
blocks:
  chill: {kind: condenser, temperature: -10 degC}
  heat: {kind: pump, pressure: 30 bar}
streams: {S1: makeup -> chill, S2: chill.gas -> out, S3: chill.liquid -> heat, S4: heat -> out}
`;
  const found = await warnings(text);
  expect(found.filter(({ code }) => code === 'below-freezing')).toHaveLength(1);
  expect(found.filter(({ code }) => code === 'vapour-pressure-out-of-range')).toEqual([]);
  expect(found.filter(({ code }) => code === 'henry-out-of-range')).toEqual([
    {
      code: 'henry-out-of-range',
      where: 'S1, S3, S4',
      message:
        'the Henry constant of N2 in H2O is used at -10.0 to 0.0 degC, outside its 5.9 to 199.9 degC; ln H goes on linear in 1/T',
    },
  ]);
});
