import { z } from 'zod';
import { blockKinds } from '../blocks/registry.ts';
import { fileSchema } from './schema.ts';

type Json = Record<string, unknown>;

/** JSON Schema (draft 2020-12) of the flowsheet file, for editors: every kind of block with its own settings. */
export function flowsheetJsonSchema(): Json {
  const file = toJson(fileSchema);
  const properties = file['properties'] as Record<string, Json>;
  const kinds = [...blockKinds.values()];
  return {
    $schema: 'https://json-schema.org/draft/2020-12/schema',
    title: 'Looptally flowsheet',
    ...file,
    properties: {
      ...properties,
      blocks: {
        description: properties['blocks']!['description'],
        type: 'object',
        propertyNames: NAME_PATTERN,
        additionalProperties: {
          type: 'object',
          required: ['kind'],
          properties: {
            kind: {
              enum: kinds.map((k) => k.kind),
              description: kinds.map((k) => `${k.kind}: ${k.summary}`).join('\n'),
            },
          },
          allOf: kinds.map((k) => ({
            if: { properties: { kind: { const: k.kind } }, required: ['kind'] },
            // biome-ignore lint/suspicious/noThenProperty: the word of JSON Schema
            then: withKind(toJson(k.settings), k.kind, k.summary),
          })),
        },
      },
    },
  };
}

const NAME_PATTERN = { pattern: '^[A-Za-z][A-Za-z0-9_]*$' };

function withKind(settings: Json, kind: string, summary: string): Json {
  const properties = (settings['properties'] ?? {}) as Json;
  const own = { const: kind, description: summary };
  return { ...settings, description: summary, properties: { kind: own, ...properties } };
}

function toJson(schema: z.ZodType): Json {
  const { $schema: _, ...rest } = z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' }) as Json;
  return rest;
}
