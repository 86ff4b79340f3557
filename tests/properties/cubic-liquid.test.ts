import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { PassTrouble } from '../../src/diagnostics/diagnostic.ts';
import { equationOfStateRoles } from '../../src/properties/component-roles.ts';
import { R } from '../../src/properties/constants.ts';
import { createCubicLiquid } from '../../src/properties/cubic-liquid.ts';
import { createCubicPhases, createGasModel } from '../../src/properties/gas-models.ts';
import {
  hydrogenInAmmonia,
  saturatedAmmoniaFraction,
  saturationGrid,
} from '../published/ammonia-vapour-liquid.ts';
import { expectRelative } from './expect-relative.ts';
import { componentsOf, gasFractions, liquidFractions, mixtureOf, streamOf } from './mixture-of.ts';

const equations = ['srk', 'pr'] as const;
const plants = [
  ['an ammonia loop', ['H2', 'N2', 'NH3', 'Ar', 'CH4'], 200],
  ['a methanol loop', ['H2', 'CO', 'CO2', 'CH3OH', 'H2O', 'N2'], 200],
  ['ammonia and water', ['NH3', 'H2O'], 10],
] as const;

/** Uniform, unlike fast-check's doubles, which crowd at the ends. */
const between = (low: number, high: number) =>
  fc.integer({ min: 0, max: 10_000 }).map((k) => low + (k * (high - low)) / 10_000);
const shares = fc.array(between(0.05, 5), { minLength: 6, maxLength: 6 });

describe.each(equations)('the liquid of %s', (gas) => {
  describe.each(plants)('of %s', (_, ids, mostBar) => {
    const components = componentsOf(...ids);
    const roles = equationOfStateRoles(components, true, null);
    const { liquid: cubic } = createCubicPhases(gas, components);
    const liquid = createCubicLiquid(components, roles, cubic);
    const size = ids.length;
    const [less, more, out] = [new Float64Array(size), new Float64Array(size), new Float64Array(size)];
    const lnFugacity = (T: number, P: number, x: Float64Array, into: Float64Array) => {
      liquid.at(T, P);
      liquid.lnFugacityPerFraction(x, into);
    };
    // a dense liquid: mostly its heaviest
    const dense = (parts: readonly number[]) => {
      const x = ids.map((id, i) =>
        id === 'NH3' || id === 'CH3OH' || id === 'H2O' ? 5 + parts[i]! : 0.03 * parts[i]!,
      );
      const sum = x.reduce((a, b) => a + b, 0);
      return Float64Array.from(x, (xi) => xi / sum);
    };

    test('has enthalpies and volumes that are the slopes of its fugacities, and that add up', () => {
      fc.assert(
        fc.property(between(230, 360), between(60, 250), shares, (T, bar, parts) => {
          const [x, P] = [dense(parts), bar * 1e5];
          liquid.at(T, P);
          liquid.enthalpyOverIdealGas(x, out);
          lnFugacity(T - 0.01, P, x, less);
          lnFugacity(T + 0.01, P, x, more);
          let sum = 0;
          for (let i = 0; i < size; i++) {
            expectRelative(out[i]!, (-R * T * T * (more[i]! - less[i]!)) / 0.02, 1e-5, 1000);
            sum += x[i]! * out[i]!;
          }
          expectRelative(sum, cubic.enthalpyDeparture(T, P, x), 1e-9, 1000);
          liquid.at(T, P);
          liquid.volumes(x, out);
          lnFugacity(T, P * (1 - 1e-5), x, less);
          lnFugacity(T, P * (1 + 1e-5), x, more);
          sum = 0;
          for (let i = 0; i < size; i++) {
            expectRelative(out[i]!, (R * T * (more[i]! - less[i]!)) / (2e-5 * P), 1e-4, 1e-5);
            sum += x[i]! * out[i]!;
          }
          expectRelative(sum, (cubic.compressibility(T, P, x) * R * T) / P, 1e-9);
        }),
        { numRuns: 60, endOnFailure: true },
      );
    });

    const mixture = mixtureOf(ids, { gas, liquid: 'eos' });

    test('has the fugacities of the gas over it, and the lowest Gibbs energy', () => {
      let seen = 0;
      fc.assert(
        fc.property(between(240, 360), between(0.5, mostBar), shares, (T, bar, parts) => {
          const stream = streamOf(mixture, T, bar, parts.slice(0, size));
          if (stream.vapourFraction < 0.001 || stream.vapourFraction > 0.999) return;
          const [x, y] = [liquidFractions(stream), gasFractions(stream)];
          const P = bar * 1e5;
          lnFugacity(T, P, x, less);
          mixture.gas.lnPhi(T, P, y, more);
          for (let i = 0; i < size; i++) {
            const off = Math.log((x[i]! / y[i]!) * Math.exp(less[i]! - more[i]!)) - Math.log(P);
            expect(Math.abs(off)).toBeLessThan(1e-9 + 1e-13 / Math.min(x[i]!, y[i]!));
          }
          const gibbs = () => {
            mixture.settlePhases(stream);
            return stream.enthalpyW - T * mixture.entropy(stream);
          };
          const at = gibbs();
          const found = stream.liquidMolPerS.slice();
          for (const factor of [0, 0.99]) {
            stream.liquidMolPerS.set(found.map((flow) => factor * flow));
            expect(gibbs()).toBeGreaterThan(at - 1e-10 * Math.abs(at));
          }
          seen += 1;
        }),
        { numRuns: 100, endOnFailure: true },
      );
      expect(seen).toBeGreaterThan(5);
    });

    test('does not depend on what was asked before', () => {
      fc.assert(
        fc.property(between(240, 420), between(2, 250), shares, between(240, 420), (T, bar, parts, other) => {
          const fresh = mixtureOf(ids, { gas, liquid: 'eos' });
          // Where three phases are near a split may not settle; then it does not settle again.
          const shareAt = (at: number) => {
            try {
              return streamOf(fresh, at, bar, parts.slice(0, size)).vapourFraction;
            } catch (trouble) {
              if (trouble instanceof PassTrouble) return trouble.code;
              throw trouble;
            }
          };
          const first = shareAt(T);
          shareAt(other);
          const again = shareAt(T);
          if (typeof first === 'string' || typeof again === 'string') expect(again).toBe(first);
          else expect(Math.abs(again - first)).toBeLessThan(1e-7);
        }),
        { numRuns: 60, endOnFailure: true },
      );
    });
  });

  const mean = (list: readonly number[]) => list.reduce((sum, d) => sum + Math.abs(d), 0) / list.length;

  // Achieved: 9.4 % on average, at most +19 % with Soave-Redlich-Kwong; 10.8 % and +22 % with Peng-Robinson. The vapour
  // pressure of ammonia is 6 % low at -50 degC and 2 % high at 80 degC with the former; the rest is the gas phase.
  test('leaves ammonia over its condensate within a quarter of the published, a tenth on average', () => {
    const mixture = mixtureOf(['H2', 'N2', 'NH3'], { gas, liquid: 'eos' });
    const list = saturationGrid.celsius.flatMap((celsius) =>
      saturationGrid.megapascal.map((megapascal) => {
        const T = celsius + 273.15;
        const y = gasFractions(streamOf(mixture, T, 10 * megapascal, [3, 1, 4]))[2]!;
        return y / saturatedAmmoniaFraction(T, megapascal * 1e6) - 1;
      }),
    );
    expect(mean(list)).toBeLessThan(0.11);
    expect(Math.max(...list.map(Math.abs))).toBeLessThan(0.22);
  });

  // Achieved: 15 and 12 % too much with Soave-Redlich-Kwong, 10 and 6 % with Peng-Robinson; two digits are remembered.
  test('dissolves hydrogen at 25 degC within a sixth of what Wiebe and Tremearne found', () => {
    const mixture = mixtureOf(['H2', 'NH3'], { gas, liquid: 'eos' });
    for (const [atm, x] of hydrogenInAmmonia) {
      expectRelative(liquidFractions(streamOf(mixture, 298.15, atm * 1.01325, [1, 1]))[0]!, x, 1 / 6);
    }
  });

  test('costs the hot gas of an ammonia converter less than 3 % of the quotient of fugacities', () => {
    const components = componentsOf('H2', 'N2', 'NH3');
    const y = Float64Array.of(0.6, 0.2, 0.2);
    const [alone, shared] = [new Float64Array(3), new Float64Array(3)];
    for (const T of [673, 723, 773]) {
      createGasModel(gas, components).lnPhi(T, 200e5, y, alone);
      createCubicPhases(gas, components).gas.lnPhi(T, 200e5, y, shared);
      const quotient = (phi: Float64Array) => 2 * phi[2]! - 3 * phi[0]! - phi[1]!;
      expect(Math.abs(quotient(shared) - quotient(alone))).toBeLessThan(0.03);
    }
  });
});

describe('with liquid: eos', () => {
  test('a pure component is gas or liquid, never both, and boils once', () => {
    for (const gas of equations) {
      for (const id of ['NH3', 'CH3OH', 'H2O', 'CO2']) {
        const mixture = mixtureOf([id], { gas, liquid: 'eos' });
        const T = 0.75 * mixture.components[0]!.critical!.temperatureK;
        const states = Array.from(
          { length: 60 },
          (_, k) => streamOf(mixture, T, 1.1 ** k, [1]).vapourFraction,
        );
        expect(new Set(states)).toEqual(new Set([0, 1]));
        expect(states).toEqual([...states].sort((a, b) => b - a));
      }
    }
  });

  test('gas far above every critical temperature stays gas, and so does gas without room for a liquid', () => {
    const mixture = mixtureOf(['H2', 'N2', 'NH3'], { liquid: 'eos' });
    expect(streamOf(mixture, 700, 300, [3, 1, 1]).vapourFraction).toBe(1);
    expect(streamOf(mixture, 250, 20, [3, 1, 0]).vapourFraction).toBe(1);
  });

  test('gases stay out of the condensate where dissolved_gases is false', () => {
    const mixture = mixtureOf(['H2', 'N2', 'NH3'], { liquid: 'eos', dissolvedGases: false });
    const stream = streamOf(mixture, 268, 150, [3, 1, 2]);
    expect(stream.vapourFraction).toBeLessThan(0.8);
    expect([...stream.liquidMolPerS.slice(0, 2)]).toEqual([0, 0]);
  });

  test('graphite lies with the liquid', () => {
    const stream = streamOf(mixtureOf(['CO', 'H2O', 'C_gr'], { liquid: 'eos' }), 300, 20, [1, 1, 2]);
    expect(stream.liquidMolPerS[2]).toBe(2);
    expect(stream.vapourFraction).toBeGreaterThan(0.4);
    expect(stream.vapourFraction).toBeLessThan(0.6);
  });

  test('a temperature is found by its enthalpy and by its entropy', () => {
    const mixture = mixtureOf(['H2', 'N2', 'NH3', 'Ar', 'CH4'], { liquid: 'eos' });
    for (const T of [245, 265, 290, 330, 500]) {
      const stream = streamOf(mixture, T, 140, [3, 1, 2, 0.1, 0.2]);
      const [enthalpy, entropy] = [stream.enthalpyW, mixture.entropy(stream)];
      stream.temperatureK = 350;
      mixture.settleAtEnthalpy(stream, enthalpy);
      expectRelative(stream.temperatureK, T, 1e-7);
      stream.temperatureK = 300;
      mixture.settleAtEntropy(stream, entropy);
      expectRelative(stream.temperatureK, T, 1e-7);
    }
  });

  test('along a pressure the entropy of gas with condensate rises as the enthalpy over T', () => {
    // One equation of state: what the vapour-pressure model keeps to a few per cent only is exact here.
    const mixture = mixtureOf(['H2', 'N2', 'NH3'], { liquid: 'eos' });
    for (const T of [250, 280, 310]) {
      const [cold, hot] = [T - 0.02, T + 0.02].map((t) => streamOf(mixture, t, 150, [3, 1, 3]));
      const entropy = mixture.entropy(hot!) - mixture.entropy(cold!);
      expectRelative((hot!.enthalpyW - cold!.enthalpyW) / T, entropy, 1e-6);
    }
  });
});
