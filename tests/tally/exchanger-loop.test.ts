import { describe, expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { planFlowsheet } from '../../src/tally/plan.ts';
import { read } from './read.ts';
import { shippedText } from './shipped.ts';

/** The shipped loop with another setting of its exchanger. */
async function loopWith(setting: string) {
  const text = shippedText('ammonia-heat-recovery.yaml').replace(/cold_temperature: 290 degC.*/, setting);
  // Its cases move the setting that is gone.
  return read(text.replace(/\ncases:[\s\S]*$/, '\n'));
}

describe('a feed/effluent exchanger in a recycle', () => {
  test('is no recycle of its own where an outlet temperature is set: one tear, the exchanger taken in two steps', async () => {
    const plan = planFlowsheet(await loopWith('cold_temperature: 290 degC'));
    expect(plan.tears).toEqual(['S13']);
    expect(plan.order.slice(1, 6)).toEqual(['mixer', 'exchanger.cold', 'converter', 'boiler', 'exchanger']);
    expect(plan.loops[0].blocks.filter((name) => name === 'exchanger')).toHaveLength(1);
    expect(planFlowsheet(await loopWith('hot_temperature: 70 degC')).tears).toHaveLength(1);
    expect(planFlowsheet(await loopWith('duty: 50 MW')).tears).toHaveLength(1);
    expect(planFlowsheet(await loopWith('approach: 40 K')).tears).toHaveLength(2);
  });

  test('closes to the same plant whichever of its settings is given, energy to 1e-9', async () => {
    const { result } = balance(await loopWith('cold_temperature: 290 degC'), { tolerance: 1e-11 });
    const { details } = result.blocks['exchanger'];
    expect(result.convergence.passes).toBeLessThanOrEqual(16);
    for (const setting of [
      `hot_temperature: ${details['hot_outlet_K']} K`,
      `duty: ${details['exchanged_kW']} kW`,
      `approach: ${details['closest_approach_K']} K`,
    ]) {
      const { result: other, diagnosis } = balance(await loopWith(setting));
      expect(diagnosis, setting).toBeNull();
      expect(Math.abs(other.closure.energy), setting).toBeLessThan(1e-9);
      expect(other.blocks['exchanger'].duty_kW).toBe(0);
      for (const [tag, stream] of Object.entries(result.streams)) {
        // The loop multiplies the tolerance of 1e-9; hence a ten-thousandth of a kelvin.
        expect(
          Math.abs(other.streams[tag].temperature_K - stream.temperature_K),
          `${setting} ${tag}`,
        ).toBeLessThan(1e-4);
        expect(
          Math.abs(other.streams[tag].flow_kmol_h / stream.flow_kmol_h - 1),
          `${setting} ${tag}`,
        ).toBeLessThan(1e-6);
      }
    }
  });

  test('gives the heat of reaction to steam and coolers, all of it', async () => {
    const { result } = balance(await loopWith('cold_temperature: 290 degC'));
    const duty = (name: string) => result.blocks[name].duty_kW;
    const steam = result.blocks['boiler'].details['steam'] as { raised_t_h: number };
    // IF97 at 110 bar: h'' = 2706.39 kJ/kg; water of 130 degC at 110 bar holds 553.0 (tables, from memory: 1e-3).
    expect(Math.abs(((steam.raised_t_h / 3.6) * (2706.39 - 553.0)) / -duty('boiler') - 1)).toBeLessThan(1e-3);
    // 1000 t/d at 54 to 56 kJ/mol (reaction at 450 degC and 200 bar) make 37 MW.
    const given = -(duty('boiler') + duty('water_cooler') + duty('condenser'));
    expect(given).toBeGreaterThan(37e3);
  });

  test('has one solution: the hotter the inlet of the converter, the smaller its temperature rise', async () => {
    const rises: number[] = [];
    for (const celsius of [200, 240, 280, 310]) {
      const { result } = balance(await loopWith(`cold_temperature: ${celsius} degC`));
      rises.push(result.streams['S5'].temperature_K - result.streams['S4'].temperature_K);
    }
    expect([...rises].sort((a, b) => b - a)).toEqual(rises);
  });

  test('that would have to cross does not count as closed: the error names block, setting and line', async () => {
    const flowsheet = await loopWith('cold_temperature: 500 degC');
    const { result, diagnosis } = balance(flowsheet);
    expect(result.convergence.converged).toBe(false);
    expect(diagnosis?.code).toBe('temperature-cross');
    expect(diagnosis?.what).toMatch(/^exchanger: To move \d+ kW the streams would have to cross: /);
    expect(diagnosis?.where).toEqual(flowsheet.placeOf('blocks.exchanger.cold_temperature'));
    expect(diagnosis?.where).not.toEqual(flowsheet.placeOf('blocks.exchanger'));
    expect(result.warnings.map((w) => [w.code, w.where])).toContainEqual(['temperature-cross', 'exchanger']);
  });

  test('with an approach beyond reach says so', async () => {
    const { diagnosis } = balance(await loopWith('approach: 500 K'));
    expect(diagnosis?.code).toBe('approach-out-of-reach');
  });
});

test('a reactor that is started cold heats its feed until the approach is what was asked for', async () => {
  // At the first pass nothing is hot.
  const flowsheet = await read(`
looptally: 1
title: preheat of a reactor by its effluent
components: [H2, N2, NH3]
reactions: {synthesis: N2 + 3 H2 <=> 2 NH3}
feeds:
  gas: {flow: 1000 kmol/h, temperature: 30 degC, pressure: 200 bar, composition: {H2: 75, N2: 25}}
blocks:
  exchanger: {kind: exchanger, approach: 150 K}
  converter: {kind: reactor, reactions: {synthesis: {approach: 10 K}}, adiabatic: true}
streams:
  S1: gas -> exchanger.cold
  S2: exchanger.cold -> converter
  S3: converter -> exchanger.hot
  S4: exchanger.hot -> out
`);
  const { result, diagnosis } = balance(flowsheet);
  expect(diagnosis).toBeNull();
  const { S1: feed, S2: into, S3: outOf, S4: away } = result.streams;
  expect(result.blocks['exchanger'].details['closest_approach_K']).toBeCloseTo(150, 6);
  expect(into.temperature_K).toBeGreaterThan(573);
  expect(away.temperature_K - feed.temperature_K).toBeCloseTo(150, 6);
  expect(outOf.temperature_K - into.temperature_K).toBeGreaterThan(150);
  expect(Math.abs(result.closure.energy)).toBeLessThan(1e-9);
});

test('a component trapped on one side of an exchanger is not let out by the other', async () => {
  const flowsheet = await read(`
looptally: 1
title: argon goes round through the cold side, nitrogen passes by on the hot side
components: [N2, Ar]
feeds:
  fresh: {flow: 10 kmol/h, temperature: 30 degC, pressure: 10 bar, composition: {N2: 90, Ar: 10}}
  hot: {flow: 100 kmol/h, temperature: 200 degC, pressure: 10 bar, composition: {N2: 100}}
blocks:
  mixer: {kind: mixer}
  exchanger: {kind: exchanger, approach: 20 K}
  drier: {kind: separator, recover: {away: {N2: 50 %}}}
streams:
  S1: fresh -> mixer
  S2: mixer -> exchanger.cold
  S3: exchanger.cold -> drier
  S4: drier.away -> out
  S5: drier.rest -> mixer
  S6: hot -> exchanger.hot
  S7: exchanger.hot -> out
`);
  expect(planFlowsheet(flowsheet).diagnostics.map((d) => d.what)).toEqual([
    'Ar can enter the loop of mixer, exchanger, drier and has no way out of it.',
  ]);
});
