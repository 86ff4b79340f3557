import { expect, test } from 'vitest';
import { blockKinds } from '../../src/blocks/registry.ts';
import { flowsheetJsonSchema } from '../../src/flowsheet/json-schema.ts';
import { fileKeys } from '../../src/flowsheet/schema.ts';

const schema = flowsheetJsonSchema() as {
  $schema: string;
  required: string[];
  additionalProperties: boolean;
  properties: Record<
    string,
    { additionalProperties: { allOf: { then: { properties: Record<string, unknown> } }[] } }
  >;
};

test('the schema is of draft 2020-12 and knows every key of the file, and no other', () => {
  expect(schema.$schema).toBe('https://json-schema.org/draft/2020-12/schema');
  expect(Object.keys(schema.properties)).toEqual(fileKeys);
  expect(schema.additionalProperties).toBe(false);
  expect(schema.required.toSorted()).toEqual(['blocks', 'components', 'feeds', 'looptally', 'streams']);
});

test('every kind of block has its own settings in it', () => {
  const { allOf } = schema.properties['blocks'].additionalProperties;
  expect(allOf).toHaveLength(blockKinds.size);
  for (const { then } of allOf) expect(then.properties).toHaveProperty('kind');
  const kinds = allOf.map(({ then }) => then.properties['kind']);
  expect(kinds).toContainEqual({ const: 'condenser' });
});

test('it is plain JSON', () => {
  expect(JSON.parse(JSON.stringify(schema))).toEqual(schema);
});
