import { createLnK } from '../../src/chemistry/equilibrium-constant.ts';
import type { ConstantSource } from '../../src/model/reaction.ts';
import { createIdealGas, enthalpyBasisFor } from '../../src/properties/ideal-gas.ts';
import { builtIn, fixedLnK, reaction, solveCase } from '../chemistry/helpers.ts';
import type { Row } from './deviations-row.ts';
import { type Deviation, difference, percent } from './deviations-statistics.ts';
import { sulphurConversionTables } from './deviations-sulphur-values.ts';
import * as published from './reaction-equilibria.ts';

const KELVIN = 273.15;
const ATM = 101_325;
const components = builtIn(
  ...['H2', 'N2', 'NH3', 'CO', 'CO2', 'H2O', 'CH4', 'CH3OH', 'O2', 'SO2', 'SO3', 'C_gr'],
);
const gibbs: ConstantSource = { kind: 'gibbs' };
const named = (name: string): ConstantSource => ({ kind: 'published', name });

const AMMONIA = 'N2 + 3 H2 <=> 2 NH3';
const METHANOL = 'CO + 2 H2 <=> CH3OH';
const SHIFT = 'CO + H2O <=> CO2 + H2';
const OXIDATION = 'SO2 + 1/2 O2 <=> SO3';

/** Equilibrium constants and what follows from them. */
export function chemistryRows(): Row[] {
  return [
    ...ammoniaRows(),
    ...methanolRows(),
    ...shiftRows(),
    ...carbonRows(),
    ...sulphurRows(),
    ...gasifierRows(),
  ];
}

function ammoniaRows(): Row[] {
  return [
    {
      what: 'K of ammonia from Gibbs energies, 300 to 700 degC',
      source: 'Gillespie & Beattie 1930, fitted to measurements',
      unit: '%',
      deviations: published.gillespieBeattie
        .filter(([t]) => t >= 300)
        .map(([t, Ka]) => constant(AMMONIA, gibbs, t, Ka * Ka, ATM)),
      remark:
        'K of two moles, twice the deviation of one; older formation enthalpies give 11 to 23 % (NASA TM-4513)',
    },
  ];
}

function methanolRows(): Row[] {
  const source = 'Graaf & Winkelman 2016';
  const against = (k: ConstantSource) => published.graaf.map(([t, , K]) => constant(METHANOL, k, t, K));
  return [
    {
      what: 'K of CO + 2 H2 = CH3OH from Gibbs energies, 200 to 300 degC',
      source,
      unit: '%',
      deviations: against(gibbs),
      remark:
        'the tabulated Gibbs energy of methanol gas is about 0.7 kJ/mol off the measured equilibria: name the constant',
    },
    {
      what: 'the same with `constant: graaf-winkelman-2016`',
      source,
      unit: '%',
      deviations: against(named('graaf-winkelman-2016')),
      remark: 'the formula itself; four digits printed',
    },
  ];
}

function shiftRows(): Row[] {
  const against = (k: ConstantSource) => published.moe.map(([t, K]) => constant(SHIFT, k, t, K));
  return [
    {
      what: 'K of the shift from Gibbs energies, 200 to 600 degC',
      source: 'Moe 1962',
      unit: '%',
      deviations: against(gibbs),
      remark: "Moe's two-constant formula is low at both ends; within 5 % from 300 to 500 degC",
    },
    {
      what: 'the same with `constant: moe-1962`',
      source: 'Moe 1962',
      unit: '%',
      deviations: against(named('moe-1962')),
      remark: 'the formula itself; four digits printed',
    },
  ];
}

function carbonRows(): Row[] {
  const equations = [
    'CH4 + H2O <=> CO + 3 H2',
    'C_gr + CO2 <=> 2 CO',
    'C_gr + H2O <=> CO + H2',
    'CH4 <=> C_gr + 2 H2',
  ];
  return [
    {
      what: 'K of reforming and of carbon formation, 300 to 1100 degC',
      source: 'NASA TM-4513 (1993), from memory',
      unit: '%',
      deviations: published.nasaCarbon.flatMap(([t, ...K]) =>
        equations.map((equation, i) => constant(equation, gibbs, t, K[i]!)),
      ),
      remark: 'newer polynomials and formation enthalpies',
    },
    {
      what: 'K of reforming from Gibbs energies, 400 to 900 degC',
      source: 'Catalyst Handbook (Twigg 1989)',
      unit: '%',
      deviations: published.twigg.map(([t, K]) => constant('CH4 + H2O <=> CO + 3 H2', gibbs, t, K)),
      remark: 'a formula of two constants',
    },
  ];
}

function sulphurRows(): Row[] {
  const { conversion, outletK } = published.sulphurBed;
  const bed = solveCase(
    [OXIDATION],
    { SO2: 10, O2: 11, N2: 79, SO3: 0 },
    { temperatureK: 690, pressurePa: 1.2e5, adiabatic: true },
  );
  const book = 'King, Moats & Davenport 2013, from memory';
  return [
    {
      what: 'K of SO2 oxidation from Gibbs energies, 400 to 600 degC',
      source: book,
      unit: '%',
      deviations: published.sulphurTrioxide.map(([t, , K]) => constant(OXIDATION, gibbs, t, K, ATM)),
    },
    {
      what: 'the same',
      source: 'Eklund 1956',
      unit: '%',
      deviations: published.sulphurTrioxide.map(([t, K]) => constant(OXIDATION, gibbs, t, K, ATM)),
      remark: "Eklund's formula lies 1 to 15 % below the Gibbs energies; `constant: eklund-1956` uses it",
    },
    {
      what: 'SO2 conversion with `constant: eklund-1956`, four gases, 400 to 600 degC, 1 atm and 1.2 bar',
      source: 'solved independently from the constant of Eklund 1956',
      unit: '%',
      deviations: [
        ...sulphurConversions(named('eklund-1956'), ATM, 1),
        ...sulphurConversions(named('eklund-1956'), 1.2e5, 3),
      ],
      remark: 'four digits printed',
    },
    {
      what: 'SO2 conversion from Gibbs energies, the same gases at 1 atm',
      source: 'solved independently from NASA TM-4513 (1993)',
      unit: '%',
      deviations: sulphurConversions(gibbs, ATM, 2),
      remark: 'newer polynomials of SO2 and SO3',
    },
    {
      what: 'adiabatic first SO2 bed, conversion',
      source: book,
      unit: '%',
      deviations: [percent('', bed.conversion['SO2']!, conversion)],
      remark: 'read from a diagram of the book',
    },
    {
      what: 'adiabatic first SO2 bed, outlet temperature',
      source: book,
      unit: 'K',
      deviations: [difference('', bed.temperature_K, outletK)],
      remark: 'read from a diagram of the book',
    },
  ];
}

/** Textbook gasifier: 0.5 CO2 + 1.881 N2 + 1 H2O over carbon in excess, 20 bar. */
function gasifierRows(): Row[] {
  const source = 'Smith, Van Ness & Abbott, Example 13.13';
  const ids = ['H2', 'CO', 'H2O', 'CO2', 'N2'];
  const gasAt = (T: number, a: ConstantSource, b: ConstantSource) =>
    solveCase(
      [
        ['C_gr + CO2 <=> 2 CO', a],
        ['C_gr + H2O <=> CO + H2', b],
      ],
      { C_gr: 5, CO2: 0.5, N2: 1.881, H2O: 1, CO: 0, H2: 0 },
      { temperatureK: T, pressurePa: 20e5 },
    ).mole_fraction;
  const compare = (gas: Readonly<Record<string, number>>, T: number, y: readonly number[]) =>
    ids.map((id, i) => difference(`${id}, ${T} K`, 100 * gas[id]!, 100 * y[i]!));
  return [
    {
      what: 'gasifier over solid carbon, 1000 to 1500 K, with the constants of the book',
      source,
      unit: 'mol %',
      deviations: published.gasifier.flatMap(([T, Ka, Kb, , , ...y]) =>
        compare(gasAt(T!, fixedLnK(Math.log(Ka!)), fixedLnK(Math.log(Kb!))), T!, y),
      ),
      remark: 'one decimal of mol % printed',
    },
    {
      what: 'the same with K from Gibbs energies',
      source,
      unit: 'mol %',
      deviations: published.gasifier.flatMap(([T, , , , , ...y]) => compare(gasAt(T!, gibbs, gibbs), T!, y)),
    },
  ];
}

/** K at a temperature [degC] against a published one referred to `standardPa`. */
function constant(
  equation: string,
  source: ConstantSource,
  celsius: number,
  K: number,
  standardPa = 1e5,
): Deviation {
  const own = reaction(equation, components, source);
  const { lnK, standardPressurePa } = createLnK(
    own,
    createIdealGas(components, enthalpyBasisFor(components, [own])),
  );
  const change = own.coefficients.reduce((sum, v, i) => (components[i]!.solid ? sum : sum + v), 0);
  const ours = lnK(celsius + KELVIN) + change * Math.log(standardPressurePa / standardPa);
  return percent(`${celsius} degC`, Math.exp(ours), K);
}

/** @param column  of the rows of the tables: 1 to 3 */
function sulphurConversions(source: ConstantSource, pressurePa: number, column: 1 | 2 | 3): Deviation[] {
  return sulphurConversionTables.flatMap(({ SO2, O2, rows }) =>
    rows.map((row) => {
      const feed = { SO2, O2, N2: 100 - SO2 - O2, SO3: 0 };
      const state = { temperatureK: row[0] + KELVIN, pressurePa };
      const ours = solveCase([[OXIDATION, source]], feed, state).conversion['SO2']!;
      return percent(`${SO2} % SO2, ${row[0]} degC`, ours, row[column]);
    }),
  );
}
