import { expect, test } from 'vitest';
import { builtInComponent } from '../../src/properties/components.ts';
import { R_NASA } from '../../src/properties/constants.ts';
import { henryConstant, lnHenry } from '../../src/properties/henry.ts';
import { createIdealGas } from '../../src/properties/ideal-gas.ts';
import { lnVapourPressure } from '../../src/properties/vapour-pressure.ts';
import { readTable } from '../published/read-table.ts';
import { expectRelative } from './expect-relative.ts';

// tests/published/checkpoints.csv: computed outside this program from the sources named in each row.
const checkpoints = readTable('checkpoints.csv').map((row) => ({
  quantity: row['quantity']!,
  id: row['id']!,
  T: Number(row['T_K']),
  value: Number(row['value']),
}));

function rowsOf(quantity: string) {
  const rows = checkpoints.filter((row) => row.quantity === quantity);
  expect(rows.length).toBeGreaterThan(0);
  return rows;
}

function property(name: 'enthalpies' | 'entropies' | 'heatCapacities', id: string, T: number): number {
  const out = new Float64Array(1);
  createIdealGas([builtInComponent(id)!], 'nasa')[name](T, out);
  return out[0]!;
}

/** Gibbs energy over RT on NASA's own formation enthalpies and gas constant. */
function gibbs(id: string, T: number): number {
  return property('enthalpies', id, T) / (R_NASA * T) - property('entropies', id, T) / R_NASA;
}

// The rows are printed to 5 significant figures, so 1e-4 is rounding alone.
test('heat capacities are those of the NASA tables', () => {
  for (const { id, T, value } of rowsOf('Cp')) expectRelative(property('heatCapacities', id, T), value, 1e-4);
});

// Printed to 7 figures, but never finer than 0.001 J/mol.
test('enthalpies above 298.15 K are those of the NASA tables', () => {
  for (const { id, T, value } of rowsOf('H-H298')) {
    expectRelative(property('enthalpies', id, T) - property('enthalpies', id, 298.15), value, 1e-6, 1000);
  }
});

test('entropies are those of the NASA tables', () => {
  for (const { id, T, value } of rowsOf('S')) expectRelative(property('entropies', id, T), value, 1e-4);
});

const stoichiometry: Readonly<Record<string, Readonly<Record<string, number>>>> = {
  'N2+3H2=2NH3': { N2: -1, H2: -3, NH3: 2 },
  'CO+2H2=CH3OH': { CO: -1, H2: -2, CH3OH: 1 },
  'CO2+3H2=CH3OH+H2O': { CO2: -1, H2: -3, CH3OH: 1, H2O: 1 },
  'CO+H2O=CO2+H2': { CO: -1, H2O: -1, CO2: 1, H2: 1 },
  'CO+3H2=CH4+H2O': { CO: -1, H2: -3, CH4: 1, H2O: 1 },
  '2CO=C(gr)+CO2': { CO: -2, C_gr: 1, CO2: 1 },
  '2CH3OH=DME+H2O': { CH3OH: -2, DME: 1, H2O: 1 },
  'SO2+1/2O2=SO3': { SO2: -1, O2: -0.5, SO3: 1 },
  'NO+1/2O2=NO2': { NO: -1, O2: -0.5, NO2: 1 },
  '2NO2=N2O4': { NO2: -2, N2O4: 1 },
  'CH3OH+CO=HCOOCH3': { CH3OH: -1, CO: -1, MF: 1 },
};

function overReaction(reaction: string, of: (id: string) => number): number {
  return Object.entries(stoichiometry[reaction]!).reduce((sum, [id, nu]) => sum + nu * of(id), 0);
}

// Printed to 0.001 kJ/mol.
test('heats of reaction at 298.15 K are those of the NASA tables', () => {
  for (const { id, T, value } of rowsOf('dH298')) {
    const heat = overReaction(id, (each) => property('enthalpies', each, T)) / 1000;
    expect(Math.abs(heat - value), id).toBeLessThan(0.0015);
  }
});

// Printed to four decimals.
test('equilibrium constants are those of the NASA tables', () => {
  for (const { id, T, value } of rowsOf('lnK')) {
    expect(Math.abs(-overReaction(id, (each) => gibbs(each, T)) - value)).toBeLessThan(1.5e-4);
  }
});

// The Antoine sets follow the reference equations within 0.5 %.
test('vapour pressures are within 0.5 % of the reference equations of state', () => {
  for (const { id, T, value } of rowsOf('Psat')) {
    expectRelative(Math.exp(lnVapourPressure(builtInComponent(id)!, T)) / 1e5, value, 0.005);
  }
});

test('gases dissolve in ammonia as tabulated', () => {
  for (const { id, T, value } of rowsOf('Henry_NH3')) {
    expectRelative(Math.exp(lnHenry(henryConstant('NH3', id)!, T)) / 1e5, value, 1e-4);
  }
});
