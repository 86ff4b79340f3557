import fc from 'fast-check';
import { expect, test } from 'vitest';
import { createEquilibriumSolver } from '../../src/chemistry/equilibrium.ts';
import { solveEquilibriumCase } from '../../src/chemistry/equilibrium-case.ts';
import { createLnK } from '../../src/chemistry/equilibrium-constant.ts';
import { createGasModel } from '../../src/properties/gas-models.ts';
import { createIdealGas } from '../../src/properties/ideal-gas.ts';
import { builtIn, expectWithin, reaction } from './helpers.ts';

const components = builtIn('H2', 'N2', 'NH3', 'CO', 'CO2', 'H2O', 'CH4', 'CH3OH', 'Ar');
const idealGas = createIdealGas(components, 'atct');
const sets = [
  ['N2 + 3 H2 <=> 2 NH3'],
  ['CO + 2 H2 <=> CH3OH', 'CO2 + H2 <=> CO + H2O'],
  ['CO + 3 H2 <=> CH4 + H2O', 'CO + H2O <=> CO2 + H2'],
  ['N2 + 3 H2 <=> 2 NH3', 'CO + 3 H2 <=> CH4 + H2O', 'CO + H2O <=> CO2 + H2', 'CO + 2 H2 <=> CH3OH'],
].map((set) =>
  set.map((equation) => {
    const r = reaction(equation, components);
    const k = createLnK(r, idealGas);
    return {
      coefficients: r.coefficients,
      lnK: k.lnK,
      standardPressurePa: k.standardPressurePa,
      approachK: 0,
    };
  }),
);
const amount = fc.oneof(fc.double({ min: 0.01, max: 10, noNaN: true }), fc.constant(0), fc.constant(1e-12));
const feeds = fc
  .array(amount, { minLength: components.length, maxLength: components.length })
  .map((x) => Float64Array.from(x));

test('in a real gas the fugacities meet the constants, from any feed, up to 300 bar', () => {
  fc.assert(
    fc.property(
      fc.constantFrom(...sets),
      fc.constantFrom('srk' as const, 'pr' as const),
      fc.double({ min: 450, max: 1100, noNaN: true }),
      fc.double({ min: 1e5, max: 3e7, noNaN: true }),
      feeds,
      (reactions, name, T, P, feed) => {
        const gas = createGasModel(name, components);
        const solver = createEquilibriumSolver(reactions, gas, components);
        const n = new Float64Array(components.length);
        solver.solve(T, P, feed, n);
        const total = n.reduce((a, b) => a + b, 0);
        const y = n.map((x) => x / total);
        const lnPhi = new Float64Array(components.length);
        if (total > 0) gas.lnPhi(T, P, y, lnPhi);
        for (const r of reactions) {
          let affinity = -r.lnK(T);
          let blur = 0;
          components.forEach((_, i) => {
            const v = r.coefficients[i]!;
            if (v === 0) return;
            affinity += v * (Math.log((y[i]! * P) / 1e5) + lnPhi[i]!);
            blur += (Math.abs(v) * 1e-15) / y[i]!;
          });
          if (Number.isFinite(affinity)) expect(Math.abs(affinity)).toBeLessThanOrEqual(1e-10 + blur);
        }
      },
    ),
    { numRuns: 500 },
  );
});

test('an adiabatic equilibrium keeps the enthalpy of the feed', () => {
  const list = builtIn('H2', 'N2', 'NH3', 'Ar');
  const own = createIdealGas(list, 'atct');
  const gas = createGasModel('srk', list);
  const P = 200e5;
  const h = new Float64Array(4);
  const enthalpy = (T: number, n: Float64Array): number => {
    own.enthalpies(T, h);
    const total = n.reduce((a, b) => a + b, 0);
    return (
      n.reduce((sum, x, i) => sum + x * h[i]!, 0) +
      total *
        gas.enthalpyDeparture(
          T,
          P,
          n.map((x) => x / total),
        )
    );
  };
  const feed = Float64Array.of(3, 1, 0.1, 0.2);
  const result = solveEquilibriumCase({
    components: list,
    reactions: [reaction('N2 + 3 H2 <=> 2 NH3', list)],
    temperatureK: 650,
    pressurePa: P,
    feed,
    gas: 'srk',
    approachK: 5,
    adiabatic: true,
  });
  const out = Float64Array.from(list, (c) => result.amounts[c.id]!);
  // 1e-10 of the 40 kJ that heating by 300 K takes
  expectWithin(enthalpy(result.temperature_K, out), enthalpy(650, feed), 1e-5);
  expect(result.temperature_K).toBeGreaterThan(750);
});
