import { describe, expect, test } from 'vitest';
import { liquidWaterEnthalpy, saturationTemperatureK, steamEnthalpy } from '../../src/properties/steam.ts';
import {
  components,
  expectClose,
  faultsOf,
  KELVIN,
  mixtureOf,
  reaction,
  refusedBySchema,
  streamOf,
  trial,
} from './helpers.ts';

// Argon has the heat capacity 5/2 R at any temperature: its cooling curve is straight.
const argon = mixtureOf(['Ar'], { gas: 'ideal' });
const hot = streamOf(argon, { celsius: 450, bar: 20, flows: { Ar: 1000 } });

interface Steam {
  readonly raised_t_h: number;
  readonly boils_at_K: number;
  readonly leaves_at_K: number;
  readonly closest_approach_K: number | null;
}
const cooledTo = (celsius: number, steam: Record<string, string>) => {
  const { report } = trial('heater', { temperature: `${celsius} degC`, steam }, argon, [hot]);
  return { report, dutyW: report.dutyW, steam: report.details['steam'] as Steam };
};

test('40 bar steam takes 2801 kJ/kg less what its feedwater brings', () => {
  const { dutyW, steam } = cooledTo(300, { pressure: '40 bar', feedwater: '105 degC' });
  // h'' of the steam tables; water at 105 degC and 40 bar holds 443.0 kJ/kg (tables, from memory; hence 1e-4).
  const wanted = (-dutyW / (2800.9e3 - 443.0e3)) * 3.6;
  expectClose(steam.raised_t_h, wanted, 1e-4 * wanted);
  expectClose(steam.boils_at_K - KELVIN, 250.358, 0.001);
});

test('superheat costs steam, colder feedwater too', () => {
  const plain = cooledTo(300, { pressure: '40 bar', feedwater: '105 degC' }).steam;
  const superheated = cooledTo(300, { pressure: '40 bar', feedwater: '105 degC', superheat: '100 K' }).steam;
  const cold = cooledTo(300, { pressure: '40 bar', feedwater: '30 degC' }).steam;
  expect(superheated.raised_t_h).toBeLessThan(plain.raised_t_h);
  expect(cold.raised_t_h).toBeLessThan(plain.raised_t_h);
  expectClose(superheated.leaves_at_K - superheated.boils_at_K, 100, 1e-9);
});

test('the closest approach lies where boiling starts, as a straight cooling curve gives it by hand', () => {
  const P = 40e5;
  const { steam } = cooledTo(220, { pressure: '40 bar', feedwater: '105 degC' });
  const boilsK = saturationTemperatureK(P);
  const cold = liquidWaterEnthalpy(105 + KELVIN, P);
  const share = (liquidWaterEnthalpy(boilsK, P) - cold) / (steamEnthalpy(boilsK, P) - cold);
  expectClose(steam.closest_approach_K!, 220 + KELVIN + share * 230 - boilsK, 1e-6);
});

describe('steam too hot for the process is worth a word', () => {
  test('where it boils', () => {
    const { report, steam } = cooledTo(180, { pressure: '40 bar', feedwater: '105 degC' });
    expect(steam.closest_approach_K).toBeLessThan(10);
    expect(report.warnings).toEqual([
      {
        code: 'steam-too-hot',
        message:
          'where the water boils the process is at 253.8 degC and the water at 250.4 degC, closer than 10 K: this heat does not raise so much steam of 40 bar; lower its pressure or superheat, or give the block less to cool',
      },
    ]);
  });

  test('where the feedwater enters, and where the steam leaves', () => {
    const glowing = streamOf(argon, { celsius: 800, bar: 20, flows: { Ar: 1000 } });
    const raw = { temperature: '110 degC', steam: { pressure: '40 bar', feedwater: '105 degC' } };
    const cold = trial('heater', raw, argon, [glowing]);
    expect(cold.report.warnings[0].message).toMatch(
      /^where the feedwater enters the process is at 110\.0 degC and the water at 105\.0 degC/,
    );
    const dry = cooledTo(400, { pressure: '40 bar', feedwater: '105 degC', superheat: '195 K' });
    expect(dry.report.warnings[0].message).toMatch(
      /^where the steam is superheated the process is at 450\.0 degC and the water at 445\.4 degC/,
    );
  });

  test('an approach of one’s own decides', () => {
    const steam = { pressure: '40 bar', feedwater: '105 degC', approach: '60 K' };
    expect(cooledTo(250, steam).report.warnings.map((w) => w.code)).toEqual(['steam-too-hot']);
    expect(cooledTo(300, steam).report.warnings).toEqual([]);
  });
});

test('what is heated raises no steam, and says so', () => {
  const { report, steam } = cooledTo(500, { pressure: '40 bar', feedwater: '105 degC' });
  expect(steam.raised_t_h).toBe(0);
  expect(steam.closest_approach_K).toBeNull();
  expect(report.warnings.map((w) => w.code)).toEqual(['no-heat-for-steam']);
});

test('a cooled reactor raises steam at the temperature of its catalyst', () => {
  const list = components('H2', 'N2', 'NH3');
  const synthesis = reaction('synthesis', 'N2 + 3 H2 <=> 2 NH3', list);
  const mixture = mixtureOf(['H2', 'N2', 'NH3'], { reactions: [synthesis] });
  const feed = streamOf(mixture, { celsius: 400, bar: 200, flows: { H2: 300, N2: 100 } });
  const raw = {
    reactions: { synthesis: {} },
    temperature: '400 degC',
    steam: { pressure: '100 bar', feedwater: '105 degC' },
  };
  const { report } = trial('reactor', raw, mixture, [feed], [synthesis]);
  const steam = report.details['steam'] as Steam;
  expect(report.dutyW).toBeLessThan(0);
  expectClose(steam.closest_approach_K!, 400 + KELVIN - saturationTemperatureK(100e5), 1e-6);
  expectClose(
    (steam.raised_t_h / 3.6) *
      (steamEnthalpy(steam.boils_at_K, 100e5) - liquidWaterEnthalpy(105 + KELVIN, 100e5)),
    -report.dutyW,
    1e-6,
  );
});

test('feedwater that would boil, steam beyond the tables and steam without heat are refused', () => {
  const heater = (steam: Record<string, string>) => faultsOf('heater', { temperature: '300 degC', steam });
  expect(heater({ pressure: '2 bar', feedwater: '130 degC' })).toEqual([
    {
      path: ['steam', 'feedwater'],
      code: 'feedwater-boils',
      what: 'Feedwater of 130.0 degC is set for steam of 2 bar.',
      why: 'water boils at 120.2 degC there, so this feed would be steam already',
      mend: 'set feedwater below 120.2 degC, e.g. 105 degC as it leaves a deaerator',
    },
  ]);
  expect(
    heater({ pressure: '40 bar', feedwater: '105 degC', superheat: '700 K' }).map((f) => f.code),
  ).toEqual(['out-of-range']);
  expect(
    refusedBySchema('heater', {
      temperature: '300 degC',
      steam: { pressure: '200 bar', feedwater: '105 degC' },
    }),
  ).toBe(true);
  const list = components('H2', 'N2', 'NH3');
  const raw = {
    reactions: { synthesis: {} },
    adiabatic: true,
    steam: { pressure: '40 bar', feedwater: '105 degC' },
  };
  const known = { components: list, reactions: [reaction('synthesis', 'N2 + 3 H2 <=> 2 NH3', list)] };
  expect(faultsOf('reactor', raw, known).map((f) => [f.code, f.path.join('.')])).toEqual([
    ['idle-setting', 'steam'],
  ]);
});
