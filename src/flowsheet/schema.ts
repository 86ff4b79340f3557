import { z } from 'zod';
import { flow, quantity } from '../units/schema.ts';
import { customSchema, text } from './schema-components.ts';
import {
  aimSchema,
  correlationSchema,
  figureSchema,
  handlesSchema,
  objectiveSchema,
  solveSchema,
  spreadSchema,
  studySchema,
} from './schema-studies.ts';

export const reactionSchema = z.strictObject({
  equation: z
    .string()
    .meta({ description: 'the reaction, balanced; C_gr is graphite', examples: ['N2 + 3 H2 <=> 2 NH3'] }),
  constant: z
    .string()
    .optional()
    .meta({
      description:
        'a published equilibrium constant by its name (looptally data lists them); from Gibbs energies if neither this nor lnK is given',
      examples: ['gillespie-beattie-1930', 'graaf-winkelman-2016', 'moe-1962'],
    }),
  lnK: z
    .union([z.string(), z.number().transform(String)])
    .optional()
    .meta({
      description: 'ln of the equilibrium constant, a formula in T [K]',
      examples: ['4577.8/T - 4.33'],
    }),
  standard_pressure: quantity('pressure', {
    description: 'to which the pressures in an lnK of your own are referred, 1 bar if left out',
    examples: ['1 bar', '1 atm'],
  }).optional(),
});

export const feedSchema = z.strictObject({
  temperature: quantity('temperature', {
    description: 'temperature at the battery limit',
    examples: ['35 degC'],
  }),
  pressure: quantity('pressure', { description: 'pressure at the battery limit' }),
  flow: flow({ description: 'total, by mole, mass or normal volume; needs a composition' }).optional(),
  composition: z
    .record(
      z.string(),
      quantity('fraction', {
        min: 0,
        description: 'part of this component, as a number of parts or per cent',
        examples: [74.2, '24.7 %'],
      }),
    )
    .optional()
    .meta({
      description: 'parts of each component, made to add up to 1; components left out are not in it',
      examples: [{ H2: 74.2, N2: 24.7, Ar: 0.3, CH4: 0.8 }],
    }),
  basis: z
    .enum(['mole', 'mass'])
    .optional()
    .meta({ description: 'what the parts of the composition count, mole if left out' }),
  flows: z
    .record(z.string(), flow({ description: 'flow of this component' }))
    .optional()
    .meta({
      description: 'flow of each component, instead of flow and composition',
      examples: [{ H2: '4800 kmol/h', N2: '1600 kmol/h' }],
    }),
});

export const ledgerSchema = z.strictObject({
  product: z
    .string()
    .optional()
    .meta({
      description:
        'component and stream; if left out what the first reaction makes, in the stream its liquid leaves by',
      examples: ['NH3 in S5'],
    }),
  reactant: z
    .string()
    .optional()
    .meta({
      description: 'component that the yield refers to; hydrogen or the first reactant if left out',
      examples: ['H2'],
    }),
  purge: z
    .union([z.array(z.string()), z.string().transform((tag) => [tag])])
    .optional()
    .meta({
      description: 'streams that count as purge; what leaves the plant from splitters if left out',
      examples: [['S6'], 'S6'],
    }),
  recycle: z
    .string()
    .optional()
    .meta({
      description: 'stream that counts as the recycle; the first that comes back into a mixer if left out',
      examples: ['S8'],
    }),
});

/** The parts of the file that are one value each. */
export const headerShape = {
  looptally: z.literal(1).meta({ description: 'version of this format' }),
  title: text.optional().meta({ description: 'heading of every sheet', examples: ['Ammonia loop'] }),
  notes: text.optional().meta({ description: 'free text, printed with the sheets' }),
  gas: z
    .enum(['ideal', 'srk', 'pr'])
    .optional()
    .meta({ description: 'vapour model: ideal gas, Soave-Redlich-Kwong or Peng-Robinson; srk if left out' }),
  liquid: z.enum(['antoine', 'eos']).optional().meta({
    description:
      'how gas and liquid are parted: by vapour pressures, or by the equation of state alone; antoine if left out',
  }),
  dissolved_gases: z
    .boolean()
    .optional()
    .meta({ description: "gases dissolve in the condensate by Henry's law; true if left out" }),
};

/** The names that prices always know, for editors; their units depend on what is priced. */
const priceHints = Object.fromEntries(
  Object.entries({
    makeup: [
      'all feeds without a price of their own, per t, kmol, Nm3, or MWh or GJ of lower heating value',
      '25 EUR/MWh',
    ],
    power: [
      'power of machines, and of refrigeration where that has no price of its own, per MWh or GJ',
      '70 EUR/MWh',
    ],
    refrigeration: ['cold that is bought for condensers with cooling, per MWh or GJ', '4 EUR/GJ'],
    cooling_water: ['heat that water takes from condensers with cooling, per MWh or GJ', '0.5 EUR/GJ'],
    product: ['the product of the ledger, per t, kmol or Nm3', '420 EUR/t'],
    purge: ['fuel value of the purge, per MWh or GJ of lower heating value', '20 EUR/MWh'],
  }).map(([name, [description, example]]) => [name, { type: 'string', description, examples: [example] }]),
);

/**
 * The whole file. The reader checks it part by part, so that a fault in one part does not hide those in the
 * others; blocks are checked with the schema of their kind.
 */
export const fileSchema = z.strictObject({
  ...headerShape,
  components: z
    .union([
      z.array(z.union([z.string(), z.record(z.string(), customSchema)])).min(1),
      z.record(z.string(), customSchema.nullable()),
    ])
    .meta({
      description:
        'what the streams may contain: a list of ids (looptally data lists the built-in ones), with components of your own as {ID: {formula: ..., ...}}',
      examples: [['H2', 'N2', 'NH3', 'Ar', 'CH4']],
    }),
  reactions: z
    .record(z.string(), z.union([z.string(), reactionSchema]))
    .optional()
    .meta({
      description: 'reactions by name: an equation, or a mapping with an equilibrium constant',
      examples: [{ synthesis: 'N2 + 3 H2 <=> 2 NH3' }],
    }),
  feeds: z.record(z.string(), feedSchema).meta({
    description: 'streams that enter across the battery limit, by name',
    examples: [
      {
        makeup: {
          flow: '6500 kmol/h',
          temperature: '35 degC',
          pressure: '200 bar',
          composition: { H2: 75, N2: 25 },
        },
      },
    ],
  }),
  blocks: z.record(z.string(), z.looseObject({ kind: z.string() })).meta({
    description: 'unit operations by name; the kind says what a block does and which settings it has',
  }),
  streams: z
    .record(
      z.string(),
      z.string().meta({
        description: 'from -> to; a port follows a dot, out is the battery limit',
        examples: ['makeup -> mixer', 'condenser.liquid -> out'],
      }),
    )
    .meta({
      description: 'what flows from one port to another, by tag',
      examples: [{ S1: 'makeup -> mixer', S5: 'condenser.liquid -> out' }],
    }),
  ledger: ledgerSchema.optional().meta({ description: 'what the key figures refer to' }),
  aims: z
    .record(z.string(), aimSchema)
    .optional()
    .meta({ description: 'wanted values, each reached by moving one setting, by name' }),
  cases: z
    .record(z.string(), z.record(z.string(), z.unknown()))
    .optional()
    .meta({
      description: 'named sets of changes: setting and its value in this case',
      examples: [{ 'cold condenser': { 'condenser.temperature': '-25 degC' } }],
    }),
  figures: z
    .record(z.string(), figureSchema)
    .optional()
    .meta({ description: 'figures of your own, by name' }),
  spreads: z
    .record(z.string(), spreadSchema)
    .optional()
    .meta({
      description:
        'what is not known for sure, by the path of a setting or of a constant; drawn by looptally uncertainty',
      examples: [{ 'condenser.temperature': { kind: 'normal', sd: '2 K' } }],
    }),
  correlations: z
    .array(correlationSchema)
    .optional()
    .meta({ description: 'spreads that vary together; independent if left out' }),
  prices: z
    .record(
      z.string(),
      z.string().meta({
        description: 'price of what this feed brings: money per unit, always in the same currency',
        examples: ['60 EUR/MWh', '350 EUR/t'],
      }),
    )
    .optional()
    .meta({
      description: 'money per unit, in one currency, for cost and profit; feeds also by name',
      examples: [{ makeup: '25 EUR/MWh', power: '70 EUR/MWh', product: '420 EUR/t' }],
      properties: priceHints,
    }),
  objective: objectiveSchema
    .optional()
    .meta({ description: 'what looptally optimise is to make best, within bounds and limits' }),
  solve: solveSchema.optional().meta({ description: 'how the recycles are closed' }),
  study: studySchema.optional().meta({ description: 'the question that looptally sweep asks of this file' }),
  handles: handlesSchema.optional(),
});

/** Keys of the file in the order they are usually written. */
export const fileKeys: readonly string[] = Object.keys(fileSchema.shape);
