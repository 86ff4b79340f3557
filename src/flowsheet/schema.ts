import { z } from 'zod';
import { count, flow, plainNumber, quantity } from '../units/schema.ts';

/** Text; a title may well be a year. */
const text = z.union([z.string(), z.number().transform(String)]);

/** Share of a component: a number of parts, or per cent. */
const part = quantity('fraction', { min: 0, description: 'parts, or per cent' });

const nasaSchema = z.strictObject({
  from: quantity('temperature'),
  to: quantity('temperature'),
  a: z.array(plainNumber()).length(7),
  b1: plainNumber(),
  b2: plainNumber(),
});

const antoineSchema = z.strictObject({
  A: plainNumber(),
  B: plainNumber(),
  C: plainNumber(),
  from: quantity('temperature'),
  to: quantity('temperature'),
});

/** A component of the user's own under `components`. */
export const customSchema = z.strictObject({
  formula: z.string().meta({ description: 'atoms of one molecule, e.g. C2H6O' }),
  source: text.meta({ description: 'where the data come from' }),
  name: text.optional(),
  cas: text.optional(),
  solid: z.boolean().optional(),
  formation_enthalpy: quantity('molarEnergy', { description: 'at 298.15 K, gas' }).optional(),
  entropy: quantity('molarHeatCapacity', { description: 'at 298.15 K and 1 bar, gas' }).optional(),
  heat_capacity: z
    .union([z.array(plainNumber()).min(1).max(4), quantity('molarHeatCapacity')])
    .optional()
    .meta({ description: 'ideal gas; or the list a, b, c, d of a + bT + cT2 + dT3 in J/(mol K), T in K' }),
  heat_capacity_range: z
    .strictObject({ from: quantity('temperature'), to: quantity('temperature') })
    .optional(),
  nasa: z.array(nasaSchema).min(1).optional(),
  critical_temperature: quantity('temperature').optional(),
  critical_pressure: quantity('pressure').optional(),
  acentric_factor: plainNumber({ min: -1, max: 3 }).optional(),
  boiling_temperature: quantity('temperature').optional(),
  antoine: antoineSchema.optional().meta({ description: 'log10(P/bar) = A - B/(T + C), T in K' }),
  liquid_volume: quantity('molarVolume').optional(),
  vaporisation_enthalpy: quantity('molarEnergy', {
    above: 0,
    description: 'at the boiling point',
  }).optional(),
});

export const reactionSchema = z.strictObject({
  equation: z.string(),
  constant: z.string().optional().meta({ description: 'a published constant by its name' }),
  lnK: z
    .union([z.string(), z.number().transform(String)])
    .optional()
    .meta({ description: 'formula in T [K]' }),
  standard_pressure: quantity('pressure').optional(),
});

export const feedSchema = z.strictObject({
  temperature: quantity('temperature'),
  pressure: quantity('pressure'),
  flow: flow({ description: 'total, by mole, mass or normal volume' }).optional(),
  composition: z.record(z.string(), part).optional(),
  basis: z.enum(['mole', 'mass']).optional(),
  flows: z.record(z.string(), flow()).optional(),
});

export const ledgerSchema = z.strictObject({
  product: z
    .string()
    .optional()
    .meta({ examples: ['NH3 in S5'] }),
  reactant: z.string().optional(),
  purge: z.union([z.array(z.string()), z.string().transform((tag) => [tag])]).optional(),
  recycle: z.string().optional(),
});

const bound = z.union([z.string(), z.number()]);
export const aimSchema = z.strictObject({
  move: z.string().meta({ description: 'the setting that is moved', examples: ['purge.fractions.bleed'] }),
  between: z.tuple([bound, bound]),
  until: z.string().meta({ description: 'formula = target', examples: ['streams.S2.y.Ar = 12 %'] }),
});

export const figureSchema = z.strictObject({
  formula: z.union([z.string(), z.number().transform(String)]),
  unit: z.string().max(20).optional(),
});

/** A value in the unit of the setting that is spread. */
const spreadValue = z.union([z.string(), z.number()]);
const middle = spreadValue.optional().meta({ description: 'the value in the file if left out' });
/** The shapes of a spread by their kind. */
export const spreadSchemas = {
  normal: z.strictObject({ kind: z.literal('normal'), mean: middle, sd: spreadValue }),
  uniform: z.strictObject({ kind: z.literal('uniform'), low: spreadValue, high: spreadValue }),
  triangular: z.strictObject({
    kind: z.literal('triangular'),
    low: spreadValue,
    mode: middle,
    high: spreadValue,
  }),
  'log-normal': z.strictObject({
    kind: z.literal('log-normal'),
    median: middle,
    factor: plainNumber({
      above: 1,
      description: 'one standard deviation up is so many times the median, one down so much less',
    }),
  }),
};

export const correlationSchema = z.strictObject({
  between: z.tuple([z.string(), z.string()]).meta({ description: 'two paths under spreads' }),
  value: plainNumber({ above: -1, below: 1, description: 'correlation of the ranks (Spearman)' }),
});

const goalSchema = z.union([z.array(z.string()).min(1).max(2), z.string().transform((one) => [one])]);

/** What `looptally optimise` is asked; one goal, or two for a trade-off front. */
export const objectiveSchema = z.strictObject({
  minimise: goalSchema.optional().meta({
    description: 'cost, or a formula',
    examples: ['cost', 'figures.power_kW.total'],
  }),
  maximise: goalSchema.optional().meta({ description: 'profit, or a formula', examples: ['profit'] }),
  move: z.record(z.string(), z.string().meta({ examples: ['-30 degC..5 degC'] })).meta({
    description: 'settings and the bounds between which they may be moved',
  }),
  limits: z
    .union([z.array(z.string()), z.string().transform((one) => [one])])
    .optional()
    .meta({
      description: 'what must hold, formula < value or formula > value',
      examples: [['figures.inerts.converter < 14 %']],
    }),
});

export const solveSchema = z.strictObject({
  method: z.enum(['auto', 'direct', 'wegstein', 'eigenvalue', 'anderson', 'broyden', 'newton']).optional(),
  tolerance: plainNumber({ above: 0, max: 0.01, description: 'relative' }).optional(),
  max_passes: count({ max: 100_000 }).optional(),
  tear: z.union([z.array(z.string()), z.string().transform((tag) => [tag])]).optional(),
});

export const studySchema = z.strictObject({
  over: z.record(z.string(), bound).meta({
    description: 'settings and the values they take, the last one running fastest',
    examples: [{ 'condenser.temperature': '-25 degC..10 degC:8', 'purge.fractions.bleed': '1 %, 2 %, 5 %' }],
  }),
  record: z.array(bound).optional().meta({ description: 'formulas read out of every case' }),
  note: z
    .union([z.array(z.string()), z.string().transform((line) => [line])])
    .optional()
    .meta({ description: 'printed after the table; {last COLUMN} stands for a number of it' }),
});

export const handlesSchema = z.record(z.string(), bound).meta({
  description: 'settings that a live page lets its reader move, and their ranges',
  examples: [{ 'condenser.temperature': '-30 degC..15 degC', 'purge.fractions.bleed': '0.5 %..10 %' }],
});

/** The parts of the file that are one value each. */
export const headerShape = {
  looptally: z.literal(1).meta({ description: 'version of this format' }),
  title: text.optional(),
  notes: text.optional(),
  gas: z.enum(['ideal', 'srk', 'pr']).optional().meta({ description: 'vapour model' }),
  liquid: z.enum(['antoine', 'eos']).optional(),
  dissolved_gases: z.boolean().optional(),
};

/**
 * The whole file. The reader checks it part by part, so that a fault in one part does not hide those in the
 * others; blocks are checked with the schema of their kind.
 */
export const fileSchema = z.strictObject({
  ...headerShape,
  components: z.union([
    z.array(z.union([z.string(), z.record(z.string(), customSchema)])).min(1),
    z.record(z.string(), customSchema.nullable()),
  ]),
  reactions: z.record(z.string(), z.union([z.string(), reactionSchema])).optional(),
  feeds: z.record(z.string(), feedSchema),
  blocks: z.record(z.string(), z.looseObject({ kind: z.string() })),
  streams: z.record(z.string(), z.string().meta({ examples: ['makeup -> mixer'] })),
  ledger: ledgerSchema.optional(),
  aims: z.record(z.string(), aimSchema).optional(),
  cases: z.record(z.string(), z.record(z.string(), z.unknown())).optional(),
  figures: z.record(z.string(), figureSchema).optional(),
  spreads: z
    .record(
      z.string(),
      z.union([
        spreadSchemas.normal,
        spreadSchemas.uniform,
        spreadSchemas.triangular,
        spreadSchemas['log-normal'],
      ]),
    )
    .optional()
    .meta({ description: 'what is not known for sure, by the path of a setting or constant' }),
  correlations: z.array(correlationSchema).optional(),
  prices: z
    .record(z.string(), z.string().meta({ examples: ['60 EUR/MWh', '350 EUR/t'] }))
    .optional()
    .meta({
      description:
        'of makeup (or a feed), power, refrigeration (cold), cooling_water (heat), product, purge (fuel value)',
    }),
  objective: objectiveSchema.optional(),
  solve: solveSchema.optional(),
  study: studySchema.optional(),
  handles: handlesSchema.optional(),
});

/** Keys of the file in the order they are usually written. */
export const fileKeys: readonly string[] = Object.keys(fileSchema.shape);
