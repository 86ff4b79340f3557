import { z } from 'zod';
import { count, plainNumber } from '../units/schema.ts';

/** A value in the unit of the setting it stands for. */
const valueLike = (description: string, examples: readonly (string | number)[]) =>
  z.union([z.string(), z.number()]).meta({ description, examples: [...examples] });
const ownUnit = 'in a unit of the setting';

export const aimSchema = z.strictObject({
  move: z
    .string()
    .meta({ description: 'path of the setting that is moved', examples: ['purge.fractions.bleed'] }),
  between: z
    .tuple([valueLike(`lower bound, ${ownUnit}`, ['0.2 %']), valueLike(`upper bound, ${ownUnit}`, ['20 %'])])
    .meta({
      description: `bounds of the setting, the lower one first, ${ownUnit}`,
      examples: [['0.2 %', '20 %']],
    }),
  until: z.string().meta({
    description: 'formula = wanted value',
    examples: ['streams.S2.y.Ar + streams.S2.y.CH4 = 12 %'],
  }),
});

export const figureSchema = z.strictObject({
  formula: z.union([z.string(), z.number().transform(String)]).meta({
    description:
      'of streams, blocks and figures, e.g. streams.TAG.y.ID, blocks.NAME.duty, figures.recycle_ratio',
    examples: ['streams.S6.n.H2 / streams.S1.n.H2'],
  }),
  unit: z
    .string()
    .max(20)
    .optional()
    .meta({
      description: 'what stands behind the number; only % converts it. No unit if left out',
      examples: ['%', 'kWh/t'],
    }),
});

const spreadValue = (what: string) => valueLike(`${what}, ${ownUnit}`, ['2 K', '5 bar', '1.5 %']);
const middle = (what: string) => spreadValue(`${what}; the value in the file if left out`).optional();
/** The shapes of a spread by their kind. */
export const spreadSchemas = {
  normal: z.strictObject({
    kind: kindOf('normal', 'bell curve around the mean'),
    mean: middle('mean'),
    sd: spreadValue('standard deviation'),
  }),
  uniform: z.strictObject({
    kind: kindOf('uniform', 'anywhere between low and high, equally likely'),
    low: spreadValue('lower end'),
    high: spreadValue('upper end'),
  }),
  triangular: z.strictObject({
    kind: kindOf('triangular', 'between low and high, most likely at the mode'),
    low: spreadValue('lower end'),
    mode: middle('most likely value'),
    high: spreadValue('upper end'),
  }),
  'log-normal': z.strictObject({
    kind: kindOf('log-normal', 'bell curve of the logarithm, so never below zero'),
    median: middle('half of the cases lie below it'),
    factor: plainNumber({
      above: 1,
      description: 'one standard deviation up is so many times the median, one down so much less',
      examples: [1.03],
    }),
  }),
};
export const spreadSchema = z.union([
  spreadSchemas.normal,
  spreadSchemas.uniform,
  spreadSchemas.triangular,
  spreadSchemas['log-normal'],
]);

function kindOf<K extends string>(kind: K, description: string) {
  return z.literal(kind).meta({ description });
}

export const correlationSchema = z.strictObject({
  between: z.tuple([z.string(), z.string()]).meta({
    description: 'two paths under spreads',
    examples: [['makeup.composition.Ar', 'makeup.composition.CH4']],
  }),
  value: plainNumber({
    above: -1,
    below: 1,
    description: 'correlation of the ranks (Spearman)',
    examples: [0.5],
  }),
});

const goalSchema = z.union([z.array(z.string()).min(1).max(2), z.string().transform((one) => [one])]);

/** What `looptally optimise` is asked; one goal, or two for a trade-off front. */
export const objectiveSchema = z.strictObject({
  minimise: goalSchema.optional().meta({
    description: 'cost, or a formula; this or maximise, or both for a trade-off between two goals',
    examples: ['cost', 'figures.power_kW.total'],
  }),
  maximise: goalSchema.optional().meta({
    description: 'profit, or a formula; this or minimise, or both for a trade-off between two goals',
    examples: ['profit', 'figures.overall_yield.value'],
  }),
  move: z
    .record(
      z.string(),
      z
        .string()
        .meta({ description: `low..high, ${ownUnit}`, examples: ['-30 degC..5 degC', '0.5 %..10 %'] }),
    )
    .meta({
      description: 'settings and the bounds between which they may be moved',
      examples: [{ 'condenser.temperature': '-30 degC..25 degC' }],
    }),
  limits: z
    .union([z.array(z.string()), z.string().transform((one) => [one])])
    .optional()
    .meta({
      description: 'what must hold, formula < value or formula > value; nothing if left out',
      examples: [['figures.inerts.converter < 14 %']],
    }),
});

export const solveSchema = z.strictObject({
  method: z
    .enum(['auto', 'direct', 'wegstein', 'eigenvalue', 'anderson', 'broyden', 'newton'])
    .optional()
    .meta({ description: 'how guesses are improved, auto if left out' }),
  tolerance: plainNumber({
    above: 0,
    max: 0.01,
    description: 'relative residual at which a recycle counts as closed, 1e-9 if left out',
    examples: [1e-9],
  }).optional(),
  max_passes: count({
    max: 100_000,
    description: 'after which it is given up, 200 if left out',
    examples: [200],
  }).optional(),
  tear: z
    .union([z.array(z.string()), z.string().transform((tag) => [tag])])
    .optional()
    .meta({
      description: 'streams that must be among those torn; a smallest set is chosen if left out',
      examples: [['S8']],
    }),
});

export const studySchema = z.strictObject({
  over: z
    .record(
      z.string(),
      valueLike(`a range low..high:count (log behind it: equal ratios), or a list, ${ownUnit}`, [
        '-25 degC..10 degC:8',
        '1 %, 2 %, 5 %',
      ]),
    )
    .meta({
      description: 'settings and the values they take, the last one running fastest',
      examples: [
        { 'condenser.temperature': '-25 degC..10 degC:8', 'purge.fractions.bleed': '1 %, 2 %, 5 %' },
      ],
    }),
  record: z
    .array(z.union([z.string(), z.number()]))
    .optional()
    .meta({
      description: 'formulas read out of every case; the key figures if left out',
      examples: [['figures.recycle_ratio', 'streams.S2.y.Ar']],
    }),
  note: z
    .union([z.array(z.string()), z.string().transform((line) => [line])])
    .optional()
    .meta({
      description:
        'printed after the table; {first COLUMN}, {last COLUMN}, {least COLUMN}, {most COLUMN} and {COLUMN at most COLUMN} stand for numbers of it',
      examples: ['The recycle goes from {first figures.recycle_ratio} to {last figures.recycle_ratio}.'],
    }),
});

export const handlesSchema = z
  .record(z.string(), valueLike(`range, ${ownUnit}`, ['-30 degC..15 degC']))
  .meta({
    description: 'settings that a live page lets its reader move, and their ranges',
    examples: [{ 'condenser.temperature': '-30 degC..15 degC', 'purge.fractions.bleed': '0.5 %..10 %' }],
  });
