import { z } from 'zod';
import { plainNumber, quantity } from '../units/schema.ts';

/** Text; a title may well be a year. */
export const text = z.union([z.string(), z.number().transform(String)]);

const lowEnd = quantity('temperature', { description: 'lower end of the range', examples: ['200 K'] });
const highEnd = quantity('temperature', { description: 'upper end of the range', examples: ['1000 K'] });

const nasaSchema = z.strictObject({
  from: lowEnd,
  to: highEnd,
  a: z.array(plainNumber()).length(7).meta({
    description: 'coefficients a1 to a7: Cp/R = a1/T² + a2/T + a3 + a4 T + a5 T² + a6 T³ + a7 T⁴, T in K',
  }),
  b1: plainNumber({ description: 'constant of the enthalpy: H/RT has b1/T' }),
  b2: plainNumber({ description: 'constant of the entropy: S/R has b2' }),
});

const antoineSchema = z.strictObject({
  A: plainNumber({ description: 'A of log10(P/bar) = A - B/(T + C), T in K', examples: [4.86886] }),
  B: plainNumber({ description: 'B of log10(P/bar) = A - B/(T + C), T in K', examples: [1113.928] }),
  C: plainNumber({ description: 'C of log10(P/bar) = A - B/(T + C), T in K', examples: [-10.409] }),
  from: lowEnd,
  to: highEnd,
});

/** A component of the user's own under `components`. */
export const customSchema = z.strictObject({
  formula: z.string().meta({ description: 'atoms of one molecule', examples: ['C2H6O'] }),
  source: text.meta({ description: 'where the data come from; goes with them into every result' }),
  name: text.optional().meta({ description: 'name for tables; the id if left out' }),
  cas: text.optional().meta({ description: 'CAS number, for information', examples: ['64-17-5'] }),
  solid: z
    .boolean()
    .optional()
    .meta({ description: 'a solid, which is in neither gas nor liquid; false if left out' }),
  formation_enthalpy: quantity('molarEnergy', {
    description: 'enthalpy of formation at 298.15 K, gas; needed where there is no nasa',
    examples: ['-234.8 kJ/mol'],
  }).optional(),
  entropy: quantity('molarHeatCapacity', {
    description: 'at 298.15 K and 1 bar, gas; needed for equilibria where there is no nasa',
    examples: ['280.6 J/(mol K)'],
  }).optional(),
  heat_capacity: z
    .union([
      z.array(plainNumber()).min(1).max(4),
      quantity('molarHeatCapacity', {
        description: 'constant heat capacity of the ideal gas',
        examples: ['65.6 J/(mol K)'],
      }),
    ])
    .optional()
    .meta({
      description:
        'heat capacity of the ideal gas: one value with its unit, or the list a, b, c, d of a + bT + cT² + dT³ in ' +
        'J/(mol K), T in K; needed where there is no nasa',
      examples: ['65.6 J/(mol K)', [9.0, 0.2141, -8.39e-5, 1.37e-9]],
    }),
  heat_capacity_range: z.strictObject({ from: lowEnd, to: highEnd }).optional().meta({
    description:
      'between which temperatures heat_capacity holds; 200 to 6000 K for one value, 250 to 1500 K for a list if left out',
  }),
  nasa: z
    .array(nasaSchema)
    .min(1)
    .optional()
    .meta({
      description:
        'NASA nine-coefficient polynomials, one entry for each range, ascending; take precedence over ' +
        'formation_enthalpy, entropy and heat_capacity',
    }),
  critical_temperature: quantity('temperature', {
    description: 'for the equation of state, together with critical_pressure and acentric_factor',
    examples: ['513.9 K'],
  }).optional(),
  critical_pressure: quantity('pressure', {
    description: 'for the equation of state, together with critical_temperature and acentric_factor',
    examples: ['61.4 bar'],
  }).optional(),
  acentric_factor: plainNumber({
    min: -1,
    max: 3,
    description: 'for the equation of state, together with critical_temperature and critical_pressure',
    examples: [0.644],
  }).optional(),
  boiling_temperature: quantity('temperature', {
    description: 'normal boiling point, at 1 atm',
    examples: ['351.4 K'],
  }).optional(),
  antoine: antoineSchema.optional().meta({
    description:
      'vapour pressure, log10(P/bar) = A - B/(T + C), T in K; needed for a component that condenses',
  }),
  liquid_volume: quantity('molarVolume', {
    description: 'molar volume of the liquid',
    examples: ['58.4 cm3/mol'],
  }).optional(),
  vaporisation_enthalpy: quantity('molarEnergy', {
    above: 0,
    description: 'heat of vaporisation at the boiling point',
    examples: ['38.6 kJ/mol'],
  }).optional(),
});
