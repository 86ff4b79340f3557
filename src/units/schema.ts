import { z } from 'zod';
import { type Dimension, dimensions } from './dimension.ts';
import { type Limits, parseQuantity, type QuantityFault, withinLimits } from './quantity.ts';

/** A setting written as text with a unit, handed over as a number in SI. */
export type QuantitySchema = z.ZodPipe<z.ZodUnknown, z.ZodTransform<number, unknown>>;

/** How much flows, and whether it is counted in moles, mass or normal volume. */
export interface Flow {
  /** mol/s for molar, kg/s for mass, normal m3/s for normalVolume */
  readonly value: number;
  readonly per: 'molar' | 'mass' | 'normalVolume';
}
export type FlowSchema = z.ZodPipe<z.ZodUnknown, z.ZodTransform<Flow, unknown>>;

export type QuantityOptions = Limits & {
  /** what the setting is, for editors */
  readonly description?: string;
  /** as it may be written there, for editors; those of the dimension if left out */
  readonly examples?: readonly (string | number)[];
};

/**
 * The `params` of every custom issue of these schemas. Where `code` is `missing`, `mend` is an example of the
 * value that is wanted.
 */
export interface FaultParams {
  readonly code: string;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
}

/**
 * Schema of a quantity: `quantity('pressure', {max: 1e8})`. Faults become custom issues whose `params` carry
 * code, what, why and mend.
 */
export function quantity(dimension: Dimension, options: QuantityOptions = {}): QuantitySchema {
  const schema = z
    .unknown()
    .meta(jsonSchemaOf(dimension, options))
    .transform((raw, context) => {
      const result = readQuantity(raw, dimension, options);
      if (result.ok) return result.value;
      context.issues.push(issueOf(result, raw));
      return z.NEVER;
    });
  dimensionOf.set(schema, dimension);
  limitsOf.set(schema, options);
  return schema;
}

/** What the quantity schemas stand for. */
const dimensionOf = new WeakMap<object, Dimension>();

const limitsOf = new WeakMap<object, Limits>();

/** The bounds asked for of a schema made by `quantity`, `fraction`, `plainNumber` or `flow`; those of its dimension apart. */
export function limitsOfSchema(schema: object): Limits {
  return limitsOf.get(schema) ?? {};
}

/** The dimension of a schema made by `quantity`, `fraction` or `plainNumber`; undefined for any other. */
export function dimensionOfSchema(schema: object): Dimension | undefined {
  return dimensionOf.get(schema);
}

/** Schema of a fraction, 0 to 1 unless said otherwise; `3 %` and `0.03` mean the same. */
export function fraction(options: QuantityOptions = {}): QuantitySchema {
  return quantity('fraction', { min: 0, max: 1, ...options });
}

/** Schema of a plain number without any unit. */
export function plainNumber(options: QuantityOptions = {}): QuantitySchema {
  return quantity('number', options);
}

/** Schema of a whole number, 1 or more unless said otherwise. */
export function count(options: QuantityOptions = {}): QuantitySchema {
  const bounds = { min: 1, ...options };
  return z
    .unknown()
    .meta({
      type: 'integer',
      minimum: bounds.min,
      ...optional('maximum', bounds.max),
      ...describe(options, []),
    })
    .transform((raw, context) => {
      const result = readQuantity(raw, 'number', bounds);
      if (result.ok && Number.isInteger(result.value)) return result.value;
      const whole: QuantityFault = {
        ok: false,
        code: 'out-of-range',
        what: `${shown(raw)} is no whole number.`,
        why: 'things are counted here, and half a thing does not exist',
        mend: 'write a whole number, e.g. 3',
      };
      context.issues.push(issueOf(result.ok ? whole : result, raw));
      return z.NEVER;
    });
}

/** Schema of a flow in moles, mass or normal volume, told apart by its unit. */
export function flow(options: QuantityOptions = {}): FlowSchema {
  const schema = z
    .unknown()
    .meta({
      type: 'string',
      pattern: WITH_UNIT,
      examples: ['6500 kmol/h', '1200 t/d', '145000 Nm3/h'],
      ...describe(options, FLOW_UNITS),
    })
    .transform((raw, context): Flow => {
      const faults: QuantityFault[] = [];
      for (const [per, dimension] of flowDimensions) {
        const result = readQuantity(raw, dimension, options);
        if (result.ok) return { value: result.value, per };
        faults.push(result);
      }
      // The fault that got furthest tells most: out of range before unknown unit.
      const fault = faults.find((f) => f.code === 'out-of-range') ?? generalFlowFault(faults, shown(raw));
      context.issues.push(issueOf(fault, raw));
      return z.NEVER;
    });
  limitsOf.set(schema, options);
  return schema;
}

const NUMBER = '^\\s*[+-]?(\\d+\\.?\\d*|\\.\\d+)([eE][+-]?\\d+)?\\s*';
const WITH_UNIT = `${NUMBER}[A-Za-z%°º].*$`;
const WITH_UNIT_OR_NONE = `${NUMBER}([A-Za-z%°º].*)?$`;
const FLOW_UNITS = ['kmol/h', 'mol/s', 'kg/h', 't/d', 'Nm3/h', 'lbmol/h', 'MMscf/d'];
const flowDimensions = [
  ['molar', 'molarFlow'],
  ['mass', 'massFlow'],
  ['normalVolume', 'normalVolumeFlow'],
] as const;

function readQuantity(raw: unknown, dimension: Dimension, limits: Limits) {
  if (typeof raw === 'string') return parseQuantity(raw, dimension, limits);
  if (typeof raw === 'number' && Number.isFinite(raw)) {
    if (dimensions[dimension].si === '') return withinLimits(raw, `${raw}`, dimension, limits);
    return parseQuantity(`${raw}`, dimension, limits);
  }
  return wrongType(raw, dimension);
}

function wrongType(raw: unknown, dimension: Dimension): QuantityFault {
  const { noun, examples } = dimensions[dimension];
  if (raw === undefined) {
    const why = `${noun} is needed here`;
    return { ok: false, code: 'missing', what: 'the value is missing.', why, mend: examples[0] };
  }
  if (raw === null) {
    const why = `${noun} is needed here`;
    return {
      ok: false,
      code: 'empty-value',
      what: 'no value is given.',
      why,
      mend: `write it as in ${examples[0]}`,
    };
  }
  return {
    ok: false,
    code: 'wrong-type',
    what: `${shown(raw)} stands where ${noun} is needed.`,
    why: `${noun} is written as one value`,
    mend: `write it as in ${examples.join(' or ')}`,
  };
}

function generalFlowFault(faults: readonly QuantityFault[], text: string): QuantityFault {
  const near = faults.find((f) => f.code === 'unknown-unit' && f.why.includes('nearest'));
  const first = faults[0];
  if (near !== undefined) return { ...near, what: `${text} is no flow.` };
  const ambiguous = faults.find((f) => f.why.includes('long ton'));
  if (ambiguous !== undefined) return { ...ambiguous, what: `${text} is no flow.` };
  if (first.code === 'missing-unit') {
    const why = `a flow needs its unit: ${FLOW_UNITS.join(', ')}`;
    return { ...first, why, mend: `write ${text} kmol/h or another of these units` };
  }
  return {
    ...first,
    what: first.code === 'missing' ? 'the flow is missing.' : `${text} is no flow.`,
    why:
      first.code === 'wrong-type' || first.code === 'missing'
        ? 'a flow is a number followed by its unit'
        : first.why,
    mend:
      first.code === 'missing'
        ? '6500 kmol/h'
        : 'write it in kmol/h, mol/s, kg/h, t/d, Nm3/h, lbmol/h or MMscf/d',
  };
}

function issueOf(fault: QuantityFault, input: unknown) {
  const { code, what, why, mend } = fault;
  const params: FaultParams = { code, what, why, mend };
  return { code: 'custom' as const, message: what, input, params: { ...params } };
}

function jsonSchemaOf(dimension: Dimension, options: QuantityOptions): Record<string, unknown> {
  const { si, offered, examples } = dimensions[dimension];
  if (dimension === 'number') {
    const bounds = {
      ...optional('minimum', options.min),
      ...optional('maximum', options.max),
      ...optional('exclusiveMinimum', options.above),
      ...optional('exclusiveMaximum', options.below),
    };
    return { type: 'number', ...bounds, ...describe(options, []) };
  }
  const shared = { examples: [...examples] };
  if (si !== '') return { type: 'string', pattern: WITH_UNIT, ...shared, ...describe(options, offered) };
  const units = describe(options, [...offered, 'or none']);
  return { type: ['string', 'number'], pattern: WITH_UNIT_OR_NONE, ...shared, ...units };
}

/** What an editor shows: the description, with the units that fit behind it, and examples. */
function describe({ description, examples }: QuantityOptions, units: readonly string[]) {
  const inUnits = units.length === 0 ? '' : ` [${units.join(', ')}]`;
  return {
    ...optional('description', description === undefined ? undefined : `${description}${inUnits}`),
    ...optional('examples', examples === undefined ? undefined : [...examples]),
  };
}

function optional(key: string, value: unknown): Record<string, unknown> {
  return value === undefined ? {} : { [key]: value };
}

function shown(raw: unknown): string {
  if (typeof raw === 'string') return raw.length > 40 ? `${raw.slice(0, 40)}...` : raw;
  if (Array.isArray(raw)) return 'a list';
  if (raw === null) return 'an empty value';
  return typeof raw === 'object' ? 'a mapping' : String(raw);
}
