import { describe, expect, test } from 'vitest';
import { commandLine } from './looptally.ts';

const { run } = commandLine();
const ammonia = ['equilibrium', 'N2 + 3 H2 <=> 2 NH3', '--temperature', '450 degC', '--pressure', '300 atm'];
const feed = ['--feed', 'N2=1,H2=3'];

describe('equilibrium', () => {
  test('as JSON has the keys agreed, and its amounts follow from feed and extent', () => {
    const { code, out, err } = run([...ammonia, ...feed, '--json']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    const result = JSON.parse(out);
    expect(Object.keys(result)).toEqual(
      expect.arrayContaining([
        'reactions',
        'temperature_K',
        'pressure_bar',
        'mole_fraction',
        'amounts',
        'conversion',
        'carbon_activity',
      ]),
    );
    const { extent, K, lnK } = result.reactions[0];
    expect(result.temperature_K).toBeCloseTo(723.15, 9);
    expect(result.pressure_bar).toBeCloseTo(303.975, 9);
    expect(Math.log(K)).toBeCloseTo(lnK, 9);
    expect(result.amounts.N2).toBeCloseTo(1 - extent, 12);
    expect(result.amounts.H2).toBeCloseTo(3 - 3 * extent, 12);
    expect(result.amounts.NH3).toBeCloseTo(2 * extent, 12);
    expect(result.conversion.H2).toBeCloseTo(extent, 12);
    expect(result.carbon_activity).toBeNull();
  });

  test('as text shows state, constant, gas and assumptions', () => {
    const { code, out, err } = run([...ammonia, ...feed]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toMatch(/^Reaction equilibrium\n {2}450\.00 degC, 303\.98 bar, gas: srk\n/);
    expect(out).toMatch(/\n {2}NH3 +0 +\d\.\d+ +3\d\.\d{3}\n/);
  });

  test('adiabatic takes the temperature as that of the inlet: methanation leaves hotter', () => {
    const words = ['equilibrium', 'CO + 3 H2 <=> CH4 + H2O', '--reaction', 'CO + H2O <=> CO2 + H2'];
    const state = [
      '--temperature',
      '300 degC',
      '--pressure',
      '30 bar',
      '--feed',
      'CO=1,H2=4',
      '--adiabatic',
      '--json',
    ];
    const result = JSON.parse(run([...words, ...state]).out);
    expect(result.temperature_K).toBeGreaterThan(900);
    expect(result.reactions).toHaveLength(2);
    expect(result.carbon_activity).toBeGreaterThan(0);
  });

  test('all faults of the command line are told at once, each under its place', () => {
    const { code, out, err } = run([
      'equilibrium',
      'N2 + 3 H2 <=> 2 NH3',
      '--temperature',
      '450',
      '--pressure',
      '300 atmo',
      '--feed',
      'N2=1,H2=-3,Xy=1',
    ]);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toBe(`command line:1:97 error bad-feed
  The amount of H2 cannot be -3.
   1 | looptally equilibrium 'N2 + 3 H2 <=> 2 NH3' --temperature 450 --pressure '300 atmo' --feed N2=1,H2=-3,Xy=1
     |                                                                                                 ^^^^^
  why:  amounts are numbers of moles, 0 or more, without a unit
  mend: write it like --feed 'N2=1,H2=3'

command line:1:103 error unknown-component
  There is no component Xy.
   1 | looptally equilibrium 'N2 + 3 H2 <=> 2 NH3' --temperature 450 --pressure '300 atmo' --feed N2=1,H2=-3,Xy=1
     |                                                                                                       ^^^^
  why:  looptally data lists the built-in components
  mend: name a built-in component

command line:1:59 error missing-unit
  The number 450 has no unit.
   1 | looptally equilibrium 'N2 + 3 H2 <=> 2 NH3' --temperature 450 --pressure '300 atmo' --feed N2=1,H2=-3,Xy=1
     |                                                           ^^^
  why:  a temperature needs its unit; these fit: degC, K, degF
  mend: write 450 degC, or 723.15 K for the same temperature

command line:1:75 error unknown-unit
  300 atmo is no pressure.
   1 | looptally equilibrium 'N2 + 3 H2 <=> 2 NH3' --temperature 450 --pressure '300 atmo' --feed N2=1,H2=-3,Xy=1
     |                                                                           ^^^^^^^^
  why:  no unit "atmo"; the nearest known unit is atm
  mend: write 300 atm

4 errors
`);
  });

  test('a missing option is named', () => {
    const { code, err } = run([...ammonia]);
    expect(code).toBe(2);
    expect(err).toContain('looptally equilibrium needs the option --feed.');
  });
});
