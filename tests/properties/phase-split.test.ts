import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { GasModelName } from '../../src/model/flowsheet.ts';
import { createLiquidPhase } from '../../src/properties/liquid-phase.ts';
import { lnVapourPressure } from '../../src/properties/vapour-pressure.ts';
import {
  hydrogenInAmmonia,
  saturatedAmmoniaFraction,
  saturationGrid,
} from '../published/ammonia-vapour-liquid.ts';
import { expectRelative } from './expect-relative.ts';
import { componentsOf, gasFractions, liquidFractions, mixtureOf, streamOf } from './mixture-of.ts';

const ammonia = ['H2', 'N2', 'NH3', 'Ar', 'CH4'];
const methanol = ['H2', 'CO', 'CO2', 'CH3OH', 'H2O', 'N2'];

describe('ammonia left in 3:1 gas over its condensate, -30 to 30 degC and 50 to 300 bar', () => {
  const deviations = (gas: GasModelName, dissolvedGases: boolean) => {
    const mixture = mixtureOf(['H2', 'N2', 'NH3'], { gas, dissolvedGases });
    return saturationGrid.celsius.flatMap((celsius) =>
      saturationGrid.megapascal.map((megapascal) => {
        const T = celsius + 273.15;
        const y = gasFractions(streamOf(mixture, T, 10 * megapascal, [3, 1, 4]))[2]!;
        return y / saturatedAmmoniaFraction(T, megapascal * 1e6) - 1;
      }),
    );
  };
  const mean = (list: readonly number[]) => list.reduce((sum, d) => sum + Math.abs(d), 0) / list.length;
  const largest = (list: readonly number[]) => Math.max(...list.map(Math.abs));

  // Achieved: 2.9 % on average, at most 9.6 % (at -30 degC and 50 bar, outside the range the correlation is meant for).
  test('is met within 12 % everywhere and 6 % on average with Soave-Redlich-Kwong', () => {
    expect(mean(deviations('srk', true))).toBeLessThan(0.03);
    expect(largest(deviations('srk', true))).toBeLessThan(0.1);
  });

  test('hardly changes with the gases that dissolve', () => {
    expect(mean(deviations('srk', false))).toBeLessThan(0.03);
    expect(largest(deviations('srk', false))).toBeLessThan(0.1);
  });

  // Achieved: 8.9 % on average, at most 19 % (at -30 degC and 300 bar).
  test('is met within 20 % with Peng-Robinson', () => {
    expect(mean(deviations('pr', true))).toBeLessThan(0.09);
    expect(largest(deviations('pr', true))).toBeLessThan(0.2);
  });

  // This is Raoult's law but for the gases that dissolve. Achieved: 39 % on average, 62 % at worst (-30 degC, 300 bar).
  test('is missed by two fifths with an ideal gas, always on the low side', () => {
    const list = deviations('ideal', true);
    expect(mean(list)).toBeGreaterThan(0.35);
    expect(mean(list)).toBeLessThan(0.45);
    expect(Math.max(...list)).toBeLessThan(0);
    expect(largest(list)).toBeGreaterThan(0.55);
  });

  test('is missed by half by the vapour pressure over the total pressure', () => {
    const [nh3] = componentsOf('NH3');
    const list = saturationGrid.celsius.map((celsius) => {
      const T = celsius + 273.15;
      return Math.exp(lnVapourPressure(nh3!, T)) / 200e5 / saturatedAmmoniaFraction(T, 200e5) - 1;
    });
    // at 200 bar
    expect(Math.min(...list)).toBeLessThan(-0.5);
    expect(Math.max(...list)).toBeLessThan(-0.35);
  });
});

test('hydrogen dissolves in liquid ammonia at 25 degC as Wiebe and Tremearne found', () => {
  const mixture = mixtureOf(['H2', 'NH3']);
  for (const [atm, x] of hydrogenInAmmonia) {
    const stream = streamOf(mixture, 298.15, atm * 1.01325, [1, 1]);
    // two digits are remembered
    expectRelative(liquidFractions(stream)[0]!, x, 0.03);
  }
});

interface State {
  readonly T: number;
  readonly bar: number;
  readonly flows: readonly number[];
}
const stateOf = (size: number, most: number): fc.Arbitrary<State> =>
  fc.record({
    T: fc.double({ min: 230, max: 420, noNaN: true }),
    bar: fc.double({ min: 1, max: most, noNaN: true }),
    flows: fc.array(
      fc.oneof(
        fc.constant(0),
        fc.double({ min: -15, max: -5, noNaN: true }).map((e) => 10 ** e),
        fc.double({ min: 0.01, max: 10, noNaN: true }),
      ),
      { minLength: size, maxLength: size },
    ),
  });

const shares = fc.array(fc.double({ min: 0.5, max: 10, noNaN: true }), { minLength: 6, maxLength: 6 });

describe.each([
  ['an ammonia loop', ammonia, 250],
  ['a methanol loop', methanol, 250],
  ['graphite and wet gas', ['CO', 'CO2', 'H2O', 'C_gr'], 250],
  ['a liquid of three', ['NH3', 'H2O', 'CH3OH'], 15],
])('the streams of %s', (_, ids, most) => {
  for (const gas of ['srk', 'pr', 'ideal'] as const) {
    const mixture = mixtureOf(ids, { gas });
    const liquidPhase = createLiquidPhase(mixture.components, mixture.roles, mixture.gas);
    const lnPhi = new Float64Array(ids.length);

    test(`${gas}: gas and liquid add up to the whole, neither is negative, solids lie with the liquid`, () => {
      fc.assert(
        fc.property(stateOf(ids.length, most), ({ T, bar, flows }) => {
          const s = streamOf(mixture, T, bar, flows);
          expect(s.vapourFraction).toBeGreaterThanOrEqual(0);
          expect(s.vapourFraction).toBeLessThanOrEqual(1);
          let fluid = 0;
          let vapour = 0;
          flows.forEach((flow, i) => {
            const liquid = s.liquidMolPerS[i]!;
            expect(liquid).toBeGreaterThanOrEqual(0);
            expect(liquid).toBeLessThanOrEqual(flow);
            if (mixture.roles[i] === 'solid') expect(liquid).toBe(flow);
            else {
              fluid += flow;
              vapour += flow - liquid;
            }
            if (mixture.roles[i] === 'gas') expect(liquid).toBe(0);
          });
          if (fluid > 0) expectRelative(vapour / fluid, s.vapourFraction, 1e-9, 1e-3);
          expect(Number.isFinite(s.enthalpyW)).toBe(true);
        }),
        { numRuns: 150 },
      );
    });

    test(`${gas}: where two phases are, every fugacity is the same in both`, () => {
      let seen = 0;
      fc.assert(
        fc.property(stateOf(ids.length, most), shares, ({ T, bar, flows }, parts) => {
          // half of the feeds hold everything, so that most of them part
          const s = streamOf(mixture, T, bar, flows[0] === 0 ? flows : parts.slice(0, ids.length));
          if (s.vapourFraction <= 0.001 || s.vapourFraction >= 0.999) return;
          const [x, y] = [
            liquidFractions({ ...s, liquidMolPerS: withoutSolids(s.liquidMolPerS) }),
            gasFractions(s),
          ];
          mixture.gas.lnPhi(T, bar * 1e5, y, lnPhi);
          const lnLiquid = lnFugacities(T, bar * 1e5, x);
          for (let i = 0; i < ids.length; i++) {
            if (x[i]! === 0 || y[i]! < 1e-12) continue;
            const lnGas = Math.log(y[i]! * bar * 1e5) + lnPhi[i]!;
            // A trace is what is left when two amounts are taken from each other.
            expect(Math.abs(Math.log(x[i]!) + lnLiquid[i]! - lnGas)).toBeLessThan(
              1e-9 + 1e-13 / Math.min(x[i]!, y[i]!),
            );
            seen += 1;
          }
        }),
        { numRuns: 150 },
      );
      expect(seen).toBeGreaterThan(20);
    });

    test(`${gas}: twice the flow is twice the liquid, and the order of visits does not matter`, () => {
      fc.assert(
        fc.property(
          stateOf(ids.length, most),
          stateOf(ids.length, most),
          fc.double({ min: 1e-6, max: 1e6, noNaN: true }),
          (a, b, factor) => {
            const fresh = mixtureOf(ids, { gas });
            const first = streamOf(fresh, a.T, a.bar, a.flows);
            streamOf(fresh, b.T, b.bar, b.flows);
            const again = streamOf(
              fresh,
              a.T,
              a.bar,
              a.flows.map((flow) => factor * flow),
            );
            expect(Math.abs(again.vapourFraction - first.vapourFraction)).toBeLessThan(1e-7);
            const total = a.flows.reduce((sum, flow) => sum + flow, 0);
            first.liquidMolPerS.forEach((liquid, i) => {
              expect(Math.abs(again.liquidMolPerS[i]! / factor - liquid)).toBeLessThanOrEqual(1e-7 * total);
            });
          },
        ),
        { numRuns: 100 },
      );
    });

    function withoutSolids(liquid: Float64Array): Float64Array {
      return liquid.map((flow, i) => (mixture.roles[i] === 'solid' ? 0 : flow));
    }
    function lnFugacities(T: number, P: number, x: Float64Array): Float64Array {
      const out = new Float64Array(ids.length);
      liquidPhase.at(T, P);
      liquidPhase.lnFugacityPerFraction(x, out);
      return out;
    }
  }
});

describe('a pure component', () => {
  test.each([
    ['NH3', 'srk'],
    ['NH3', 'pr'],
    ['NH3', 'ideal'],
    ['CH3OH', 'srk'],
    ['H2O', 'pr'],
  ] as const)('%s with %s is gas below its vapour pressure and liquid above it, however far', (id, gas) => {
    const mixture = mixtureOf([id], { gas });
    const [c] = mixture.components;
    fc.assert(
      fc.property(
        fc.double({ min: 0.55, max: 0.95, noNaN: true }),
        fc.double({ min: 0.05, max: 0.9999, noNaN: true }),
        fc.double({ min: 1.0001, max: 400, noNaN: true }),
        (reduced, below, above) => {
          const T = reduced * c!.critical!.temperatureK;
          const bar = Math.exp(lnVapourPressure(c!, T)) / 1e5;
          expect(streamOf(mixture, T, below * bar, [1]).vapourFraction).toBe(1);
          // up to the pressures of a synthesis loop: the liquid is taken as incompressible
          if (above * bar < 600) expect(streamOf(mixture, T, above * bar, [1]).vapourFraction).toBe(0);
        },
      ),
      { numRuns: 200 },
    );
  });

  test('is gas above its critical temperature at any pressure', () => {
    const mixture = mixtureOf(['NH3']);
    for (const bar of [1, 50, 113, 200, 400]) expect(streamOf(mixture, 406, bar, [1]).vapourFraction).toBe(1);
  });
});

describe('named cases', () => {
  test('product ammonia with its dissolved gas stays liquid when it is pumped up', () => {
    const mixture = mixtureOf(ammonia);
    for (const bar of [25, 50, 100, 200, 300]) {
      const s = streamOf(mixture, 265, bar, [0.0002, 0.0001, 1, 0.0002, 0.0005]);
      expect(s.vapourFraction).toBe(0);
    }
  });

  test('a trace of water does not let hot synthesis gas rain', () => {
    const mixture = mixtureOf(['NH3', 'H2O', 'H2']);
    expect(streamOf(mixture, 640, 60, [0.005, 0.0002, 0.995]).vapourFraction).toBe(1);
    expect(streamOf(mixture, 480, 300, [0.95, 1e-6, 0.05]).vapourFraction).toBe(1);
  });

  test('a trace of water in cold methane is a film of dew, and settles', () => {
    const mixture = mixtureOf(['NH3', 'CH4', 'H2O']);
    const s = streamOf(mixture, 174.8, 3, [2.7e-5, 1, 3e-7]);
    expect(s.liquidMolPerS[2]).toBeGreaterThan(2.5e-7);
    // half as much ammonia as water: attraction in the cold liquid draws it in, an ideal one holds less than 1e-8
    expect(s.liquidMolPerS[0]).toBeGreaterThan(1e-7);
    expect(s.liquidMolPerS[0]).toBeLessThan(2e-7);
  });

  test('ammonia under dense methane settles where substitution alone creeps', () => {
    const mixture = mixtureOf(['NH3', 'CH4']);
    const s = streamOf(mixture, 262.46, 208, [0.85306, 0.14694]);
    expect(s.vapourFraction).toBeGreaterThan(0.1);
    expect(s.vapourFraction).toBeLessThan(0.3);
    // above the critical pressure of the mixture, 210 bar in this model, they are one fluid, as dense as ammonia
    expect(streamOf(mixture, 262.46, 212, [0.85306, 0.14694]).vapourFraction).toBe(0);
    expect(streamOf(mixture, 262.46, 212, [0.2, 0.8]).vapourFraction).toBe(1);
  });

  test('an empty stream is gas by name', () => {
    const mixture = mixtureOf(ammonia);
    expect(streamOf(mixture, 250, 100, [0, 0, 0, 0, 0]).vapourFraction).toBe(1);
  });

  test('gas without a condensable stays gas however cold', () => {
    const mixture = mixtureOf(['H2', 'N2', 'NH3']);
    expect(streamOf(mixture, 120, 100, [3, 1, 0]).vapourFraction).toBe(1);
  });
});
