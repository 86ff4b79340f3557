import { readFileSync } from 'node:fs';
import { load } from 'js-yaml';
import { expect, test } from 'vitest';
import { blockKinds } from '../../src/blocks/registry.ts';
import { starters } from '../../src/cli/starters.ts';
import { flowsheetJsonSchema } from '../../src/flowsheet/json-schema.ts';
import { fileKeys } from '../../src/flowsheet/schema.ts';
import { dimensionsOf } from '../../src/units/unit-table.ts';
import { shipped, shippedText } from '../tally/shipped.ts';
import { faultsOf, type Node, partsOf } from './json-schema-rules.ts';

const schema = flowsheetJsonSchema() as Node & {
  $schema: string;
  required: string[];
  additionalProperties: boolean;
  properties: Record<
    string,
    { additionalProperties: { allOf: { then: { properties: Record<string, unknown> } }[] } }
  >;
};
const parts = [...partsOf(schema)];
/** What is written as text with a unit: nothing else is held to begin with a number. */
const quantities = parts.filter(({ part }) => String(part['pattern'] ?? '').includes('\\d'));

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
  const { summary } = blockKinds.get('condenser')!;
  expect(kinds).toContainEqual({ const: 'condenser', description: summary });
});

test('it is plain JSON', () => {
  expect(JSON.parse(JSON.stringify(schema))).toEqual(schema);
});

test('every key of the file says what it is', () => {
  const keys = parts.filter(({ property }) => property);
  expect(keys.length).toBeGreaterThan(200);
  const silent = keys.filter(
    ({ part }) => !/[a-z]{3}/.test(String(part['description'] ?? '').split(' [')[0]),
  );
  expect(silent.map(({ path }) => path)).toEqual([]);
});

test('every quantity says which units fit, and shows an example', () => {
  expect(quantities.length).toBeGreaterThan(90);
  const lacking = quantities.filter(({ part }) => {
    const units = /\w.* \[([^[\]]+)\]$/.exec(String(part['description'] ?? ''))?.[1]?.split(', ') ?? [];
    const known = units.every((unit) => unit === 'or none' || dimensionsOf(unit).length > 0);
    return units.length === 0 || !known || !Array.isArray(part['examples']);
  });
  expect(lacking.map(({ path }) => path)).toEqual([]);
});

test('every example fits the place where it stands', () => {
  const examples = parts.flatMap(({ path, part }) =>
    ((part['examples'] ?? []) as unknown[]).map((example) => ({ path, part, example })),
  );
  expect(examples.length).toBeGreaterThan(200);
  for (const { path, part, example } of examples) expect(faultsOf(part, example, path)).toEqual([]);
});

test.each(shipped)('%s fits the schema', (name) => {
  expect(faultsOf(schema, load(shippedText(name)))).toEqual([]);
});

test.each([...starters.keys()])('the starter %s fits the schema', (name) => {
  expect(faultsOf(schema, load(starters.get(name)!.text))).toEqual([]);
});

test.each([
  ['missing-version', /^file lacks looptally$/],
  ['wrong-version', /^file\.looptally is not 1$/],
  ['unknown-top-key', /^file has no key /],
  ['unknown-kind', /\.kind is none of mixer, splitter, /],
  ['unknown-setting', /^file\.blocks\.\w+ has no key /],
  ['unknown-gas-model', /^file\.gas is none of ideal, srk, pr$/],
  ['flow-without-unit', /^file\.feeds\.\w+\.flow is no string$/],
  ['title-is-a-list', /^file\.title is no string or number$/],
  ['solve-unknown-method', /^file\.solve\.method is none of auto, /],
  ['name-with-a-blank', /^file\.blocks, the name does not match$/],
  ['feed-without-pressure', /^file\.feeds\.\w+ lacks pressure$/],
])('the broken file %s does not fit', (name, fault) => {
  const text = readFileSync(new URL(`broken/${name}.yaml`, import.meta.url), 'utf8');
  expect(faultsOf(schema, load(text))).toContainEqual(expect.stringMatching(fault));
});
