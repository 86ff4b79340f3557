import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { GasModelName } from '../../src/model/flowsheet.ts';
import { componentRoles } from '../../src/properties/component-roles.ts';
import { R } from '../../src/properties/constants.ts';
import { createGasModel } from '../../src/properties/gas-models.ts';
import { createLiquidPhase } from '../../src/properties/liquid-phase.ts';
import { lnVapourPressure } from '../../src/properties/vapour-pressure.ts';
import { readTable } from '../published/read-table.ts';
import { expectRelative } from './expect-relative.ts';
import { componentsOf, mixtureOf, streamOf } from './mixture-of.ts';

function liquidOf(ids: readonly string[], name: GasModelName = 'srk') {
  const components = componentsOf(...ids);
  const roles = componentRoles(components, true, null);
  const gas = createGasModel(name, components);
  const phase = createLiquidPhase(components, roles, gas);
  const lnFugacity = (T: number, P: number, x: Float64Array) => {
    const out = new Float64Array(components.length);
    phase.at(T, P);
    phase.lnFugacityPerFraction(x, out);
    return out;
  };
  const excess = (T: number, P: number, x: Float64Array) => {
    const out = new Float64Array(components.length);
    phase.at(T, P);
    phase.enthalpyOverIdealGas(x, out);
    return out;
  };
  return { components, roles, gas, phase, lnFugacity, excess };
}

test('a pure liquid at its vapour pressure has the fugacity of its saturated gas', () => {
  for (const name of ['ideal', 'srk', 'pr'] as const) {
    const { components, gas, lnFugacity } = liquidOf(['NH3'], name);
    for (const T of [220, 260, 300, 340, 380]) {
      const lnPsat = lnVapourPressure(components[0]!, T);
      const lnGas = lnPsat + gas.pureLnPhi(0, T, Math.exp(lnPsat));
      expectRelative(lnFugacity(T, Math.exp(lnPsat), Float64Array.of(1))[0]!, lnGas, 1e-13);
    }
  }
});

test('pressure raises the fugacity of a liquid by its volume (Poynting)', () => {
  const { lnFugacity, phase } = liquidOf(['NH3', 'H2']);
  const x = Float64Array.of(1, 0);
  const volume = new Float64Array(2);
  phase.at(280, 100e5);
  phase.volumes(x, volume);
  const [low, high] = [lnFugacity(280, 50e5, x), lnFugacity(280, 150e5, x)];
  volume.forEach((v, i) => {
    expectRelative(high[i]! - low[i]!, (v * 100e5) / (R * 280), 1e-10);
  });
});

test("with an ideal gas the condensate is Raoult's: pressure acts neither on its fugacity nor on its enthalpy", () => {
  const { components, lnFugacity, excess } = liquidOf(['NH3', 'N2'], 'ideal');
  const x = Float64Array.of(0.98, 0.02);
  for (const T of [240, 280, 320, 380]) {
    for (const bar of [1, 50, 300]) {
      expectRelative(lnFugacity(T, bar * 1e5, x)[0]!, lnVapourPressure(components[0]!, T), 1e-14);
      expect(excess(T, bar * 1e5, x)[0]).toBe(excess(T, 1e5, x)[0]);
    }
    // Krichevsky and Kasarnovsky's correction of the dissolved gas stays
    expect(lnFugacity(T, 300e5, x)[1]).toBeGreaterThan(lnFugacity(T, 1e5, x)[1]! + 0.1);
  }
});

describe('heat of vaporisation against the tables of the reference equations', () => {
  // Deviations achieved, largest between the bounds: NH3 0.11 %, CH3OH 1.2 % (at 478 K, where the slope of its vapour
  // pressure equation is the limit), H2O 0.05 %. Asked for are 4 %.
  test.each([
    ['NH3', 240, 370, 0.002],
    ['CH3OH', 300, 480, 0.015],
    ['H2O', 300, 480, 0.001],
  ])('%s from %d to %d K', (id, fromK, toK, tolerance) => {
    const rows = readTable('liquid-saturation.csv').filter(
      (row) => row['id'] === id && Number(row['T_K']) >= fromK && Number(row['T_K']) <= toK,
    );
    expect(rows.length).toBeGreaterThan(8);
    for (const name of ['ideal', 'srk', 'pr'] as const) {
      const { gas, excess } = liquidOf([id], name);
      for (const row of rows) {
        const [T, P] = [Number(row['T_K']), Number(row['Psat_bar']) * 1e5];
        const heat = gas.pureEnthalpyDeparture(0, T, P) - excess(T, P, Float64Array.of(1))[0]!;
        expectRelative(heat, 1e3 * Number(row['dHvap_kJ_mol']), tolerance);
      }
    }
  });
});

// A known fault: the liquid's heat capacity carries that of the departures of the saturated gas, which cubic
// equations get wrong for polar gases. Too large by 6 % at 240 K to 11 % at 335 K for ammonia, 3 to 6 % for water up
// to 400 K, 13 to 19 % for methanol. With an ideal gas the heat of vaporisation that falls with temperature is all
// left to the liquid: 11 to 50 % for ammonia.
test.each([
  ['NH3', 235, 340, 0.12],
  ['H2O', 290, 400, 0.06],
  ['CH3OH', 285, 390, 0.2],
])(
  'the heat capacity of liquid %s between %d and %d K is too large, by less than stated',
  (id, fromK, toK, most) => {
    const mixture = mixtureOf([id]);
    for (const row of readTable('liquid-saturation.csv')) {
      const T = Number(row['T_K']);
      if (row['id'] !== id || T < fromK || T > toK) continue;
      const enthalpyAt = (kelvin: number) => {
        const stream = streamOf(mixture, T - 10, 1.001 * Number(row['Psat_bar']), [1]);
        stream.temperatureK = kelvin;
        stream.liquidMolPerS[0] = 1;
        mixture.settlePhases(stream);
        return stream.enthalpyW;
      };
      const ratio = (enthalpyAt(T + 0.1) - enthalpyAt(T - 0.1)) / 0.2 / Number(row['CpL_J_mol_K']);
      expect(ratio).toBeGreaterThan(1);
      expect(ratio).toBeLessThan(1 + most);
    }
  },
);

describe('enthalpies follow from fugacities by h - h(ideal) = -R T² d ln(f/x)/dT', () => {
  const slope = (of: (T: number) => number, T: number) => (of(T + 0.01) - of(T - 0.01)) / 0.02;

  test('exactly for dissolved gases, but for the slope of the solvent pressure', () => {
    const { lnFugacity, excess, phase } = liquidOf(['H2', 'N2', 'Ar', 'CH4', 'NH3']);
    const x = Float64Array.of(0.01, 0.01, 0.01, 0.01, 0.96);
    const volume = new Float64Array(5);
    fc.assert(
      fc.property(
        fc.double({ min: 232, max: 346, noNaN: true }),
        fc.double({ min: 20, max: 300, noNaN: true }),
        (T, bar) => {
          const h = excess(T, bar * 1e5, x);
          phase.volumes(x, volume);
          for (let i = 0; i < 4; i++) {
            const exact = -R * T * T * slope((t) => lnFugacity(t, bar * 1e5, x)[i]!, T);
            // T v dPsat/dT takes the slope of the wide-range equation, Antoine's differs by up to 4 %: a few J/mol.
            const psatSlope = slope((t) => Math.exp(lnVapourPressure(componentsOf('NH3')[0]!, t)), T);
            expect(Math.abs(h[i]! - exact)).toBeLessThan(0.05 * T * volume[i]! * psatSlope + 0.05);
          }
        },
      ),
      { numRuns: 60 },
    );
  });

  test('within 6 % for condensables', () => {
    // Here the slope is that of the wide-range equation, and the volume of the saturated gas that of its table: the
    // heat of vaporisation is right, the consistency with the gas model is what gives: 5.2 % at 350 K.
    const { lnFugacity, excess } = liquidOf(['NH3']);
    const x = Float64Array.of(1);
    for (let T = 230; T <= 350; T += 4) {
      const exact = -R * T * T * slope((t) => lnFugacity(t, 150e5, x)[0]!, T);
      expect(Math.abs(excess(T, 150e5, x)[0]! - exact)).toBeLessThan(0.06 * Math.abs(exact));
    }
  });

  test('pressure changes them as it changes the fugacities', () => {
    const { lnFugacity, excess } = liquidOf(['NH3', 'H2']);
    const x = Float64Array.of(0.99, 0.01);
    for (const T of [240, 270, 300, 330]) {
      const [low, high] = [excess(T, 20e5, x), excess(T, 220e5, x)];
      for (let i = 0; i < 2; i++) {
        const difference = (t: number) => lnFugacity(t, 220e5, x)[i]! - lnFugacity(t, 20e5, x)[i]!;
        // -R T² d/dT of the difference; what cancels in it is what the wide slope and the table change
        expect(Math.abs(high[i]! - low[i]! + R * T * T * slope(difference, T))).toBeLessThan(0.05);
      }
    }
  });
});

test('the enthalpy of a liquid never jumps up to its critical temperature', () => {
  for (const id of ['NH3', 'H2O', 'CH3OH', 'DME', 'SO2', 'C3H8', 'H2S']) {
    for (const name of ['ideal', 'srk', 'pr'] as const) {
      const { components, excess } = liquidOf([id], name);
      const criticalK = components[0]!.critical!.temperatureK;
      const h = (T: number) => excess(T, 50e5, Float64Array.of(1))[0]!;
      for (let T = 0.4 * criticalK; T < 0.995 * criticalK; T += 0.1) {
        expect(Math.abs(h(T + 0.1) - h(T)), `${id} ${name} at ${T}`).toBeLessThan(120);
      }
    }
  }
});

describe('solvents', () => {
  test('a gas dissolves in two of them as in their mean, by ln H', () => {
    const { lnFugacity } = liquidOf(['H2', 'CH3OH', 'H2O']);
    const at = (methanol: number) => lnFugacity(300, 1e5, Float64Array.of(0, methanol, 1 - methanol))[0]!;
    expectRelative(at(0.3), 0.3 * at(1) + 0.7 * at(0), 1e-12);
  });

  test('above its critical temperature a solvent dissolves nothing', () => {
    const { lnFugacity } = liquidOf(['H2', 'NH3']);
    expect(lnFugacity(404, 100e5, Float64Array.of(0.01, 0.99))[0]).toBeLessThan(30);
    expect(lnFugacity(406, 100e5, Float64Array.of(0.01, 0.99))[0]).toBe(Number.POSITIVE_INFINITY);
  });

  test('a gas without a Henry constant stays out of the liquid', () => {
    const { lnFugacity } = liquidOf(['He', 'NH3']);
    expect(lnFugacity(280, 100e5, Float64Array.of(0.01, 0.99))[0]).toBe(Number.POSITIVE_INFINITY);
  });

  test('a liquid needs a condensable below its critical temperature, and more of it than of gas', () => {
    const { phase } = liquidOf(['NH3', 'H2O', 'H2']);
    expect(phase.mayForm(450, Float64Array.of(1, 0, 5))).toBe(false);
    expect(phase.mayForm(450, Float64Array.of(1, 1e-9, 5))).toBe(true);
    expect(phase.isLiquid(450, Float64Array.of(1, 1e-9, 0))).toBe(false);
    expect(phase.isLiquid(450, Float64Array.of(0.2, 0.8, 0))).toBe(true);
    expect(phase.isLiquid(300, Float64Array.of(0.6, 0, 0.4))).toBe(true);
    expect(phase.isLiquid(300, Float64Array.of(0.4, 0, 0.6))).toBe(false);
  });
});
