import { z } from 'zod';
import { blockKinds } from '../blocks/registry.ts';
import type { BlockSpec, Feed, Flowsheet } from '../model/flowsheet.ts';
import { type Dimension, dimensions } from '../units/dimension.ts';
import type { Limits } from '../units/quantity.ts';
import { dimensionOfSchema, limitsOfSchema } from '../units/schema.ts';
import { unitFactor } from '../units/unit-table.ts';

/** A setting that is one number and has a value, e.g. `condenser.temperature`. */
export interface NumericSetting {
  readonly path: string;
  readonly dimension: Dimension;
  /** SI; a flow in mol/s, kg/s or normal m3/s as the file counts it; a part of a composition as written */
  readonly value: number;
  /** SI in one natural unit: 1 K, 1e5 Pa, 0.01 of a fraction; of a composition a hundredth of all its parts */
  readonly unitSI: number;
  /** the natural unit: K, bar, %, kmol/h, ... */
  readonly unit: string;
  /** SI; infinite where there is none. A value on a bound may still be refused, as a pressure of nothing is. */
  readonly bounds: { readonly low: number; readonly high: number };
}

/**
 * Every setting of blocks and feeds that is a number with a value, in the order of the file. Counts (stages)
 * and settings left to their defaults are none of them.
 */
export function numericSettings(
  flowsheet: Pick<Flowsheet, 'blocks' | 'components' | 'feeds'>,
): readonly NumericSetting[] {
  const ids = flowsheet.components.map((c) => c.id);
  return [
    ...flowsheet.feeds.flatMap((feed) => ofFeed(feed, ids)),
    ...flowsheet.blocks.flatMap((block) => ofBlock(block)),
  ];
}

function ofFeed({ name, flow, parts, temperatureK, pressurePa }: Feed, ids: readonly string[]) {
  const sum = parts.reduce((all, part) => all + part, 0);
  const shares = ids.flatMap((id, i): NumericSetting[] => {
    if (parts[i] === 0) return [];
    if (flow === null) return [setting(`${name}.flows.${id}`, 'molarFlow', parts[i])];
    const part = setting(`${name}.composition.${id}`, 'fraction', parts[i], { min: 0, max: sum });
    return [{ ...part, unitSI: 0.01 * sum }];
  });
  return [
    ...(flow === null ? [] : [setting(`${name}.flow`, flowDimensions[flow.per], flow.value)]),
    setting(`${name}.temperature`, 'temperature', temperatureK),
    setting(`${name}.pressure`, 'pressure', pressurePa),
    ...shares,
  ];
}

function ofBlock({ name, kind, settings }: BlockSpec): NumericSetting[] {
  return within(name, settings, blockKinds.get(kind)!.settings);
}

function within(path: string, value: unknown, schema: z.ZodType): NumericSetting[] {
  if (typeof value === 'number') {
    const leaf = alternatives(schema).find((one) => dimensionOfSchema(one) !== undefined);
    return leaf === undefined ? [] : [setting(path, dimensionOfSchema(leaf)!, value, limitsOfSchema(leaf))];
  }
  if (typeof value !== 'object' || value === null) return [];
  if (isFlow(value)) {
    const limits = Object.assign({}, ...alternatives(schema).map(limitsOfSchema)) as Limits;
    return [setting(path, flowDimensions[value.per], value.value, limits)];
  }
  return Object.entries(value).flatMap(([key, part]) => {
    const inner = child(schema, key);
    return inner === undefined ? [] : within(`${path}.${key}`, part, inner);
  });
}

function child(schema: z.ZodType, key: string): z.ZodType | undefined {
  for (const one of alternatives(schema)) {
    if (one instanceof z.ZodObject && key in one.shape) return one.shape[key];
    if (one instanceof z.ZodRecord) return one.valueType as z.ZodType;
    if (one instanceof z.ZodArray) return one.element as z.ZodType;
  }
  return undefined;
}

/** What a schema may stand for once optional, default and union wrappings are taken off. */
function alternatives(schema: z.ZodType): z.ZodType[] {
  if (schema instanceof z.ZodOptional || schema instanceof z.ZodNullable || schema instanceof z.ZodDefault)
    return alternatives(schema.def.innerType as z.ZodType);
  if (schema instanceof z.ZodUnion)
    return schema.options.flatMap((option) => alternatives(option as z.ZodType));
  if (schema instanceof z.ZodPipe && dimensionOfSchema(schema) === undefined)
    return alternatives(schema.def.in as z.ZodType);
  return [schema];
}

function setting(path: string, dimension: Dimension, value: number, limits: Limits = {}): NumericSetting {
  const { shown, min, above } = dimensions[dimension];
  const unit = dimension === 'temperature' ? 'K' : shown || '1';
  const lows = [min, above, limits.min, limits.above].filter((one) => one !== undefined);
  const highs = [limits.max, limits.below].filter((one) => one !== undefined);
  return {
    path,
    dimension,
    value,
    unit,
    unitSI: unitFactor(shown, dimension)?.factor ?? 1,
    bounds: {
      low: Math.max(Number.NEGATIVE_INFINITY, ...lows),
      high: Math.min(Number.POSITIVE_INFINITY, ...highs),
    },
  };
}

const flowDimensions = {
  molar: 'molarFlow',
  mass: 'massFlow',
  normalVolume: 'normalVolumeFlow',
} as const;

function isFlow(value: object): value is { value: number; per: keyof typeof flowDimensions } {
  return 'per' in value && 'value' in value && typeof value.value === 'number';
}
