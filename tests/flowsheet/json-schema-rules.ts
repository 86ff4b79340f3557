import { expect } from 'vitest';

export type Node = Readonly<Record<string, unknown>>;

const isObject = (value: unknown): value is Node =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
const same = (a: unknown, b: unknown) => JSON.stringify(a) === JSON.stringify(b);
const typeOf = (value: unknown) =>
  value === null ? 'null' : Array.isArray(value) ? 'array' : isObject(value) ? 'object' : typeof value;

/**
 * The words of JSON Schema 2020-12 that the schema of the file uses, each as the fault it finds; written from the
 * specification, apart from zod. Words that only describe find none.
 */
const rules: Readonly<
  Record<string, (wanted: never, value: unknown, node: Node, path: string) => readonly string[]>
> = {
  $schema: () => [],
  title: () => [],
  description: () => [],
  examples: () => [],
  type: (wanted: string | readonly string[], value, _, path) => {
    const fits = [wanted].flat().some((type) => {
      if (type === 'integer') return Number.isInteger(value);
      return typeOf(value) === type;
    });
    return fits ? [] : [`${path} is no ${[wanted].flat().join(' or ')}`];
  },
  const: (wanted: unknown, value, _, path) => (same(wanted, value) ? [] : [`${path} is not ${wanted}`]),
  enum: (wanted: readonly unknown[], value, _, path) =>
    wanted.some((one) => same(one, value)) ? [] : [`${path} is none of ${wanted.join(', ')}`],
  pattern: (wanted: string, value, _, path) =>
    typeof value !== 'string' || new RegExp(wanted, 'u').test(value) ? [] : [`${path} does not match`],
  maxLength: (wanted: number, value, _, path) =>
    typeof value !== 'string' || [...value].length <= wanted ? [] : [`${path} is too long`],
  minimum: (wanted: number, value, _, path) =>
    typeof value !== 'number' || value >= wanted ? [] : [`${path} is below ${wanted}`],
  maximum: (wanted: number, value, _, path) =>
    typeof value !== 'number' || value <= wanted ? [] : [`${path} is above ${wanted}`],
  exclusiveMinimum: (wanted: number, value, _, path) =>
    typeof value !== 'number' || value > wanted ? [] : [`${path} is not above ${wanted}`],
  exclusiveMaximum: (wanted: number, value, _, path) =>
    typeof value !== 'number' || value < wanted ? [] : [`${path} is not below ${wanted}`],
  minItems: (wanted: number, value, _, path) =>
    !Array.isArray(value) || value.length >= wanted ? [] : [`${path} has too few items`],
  maxItems: (wanted: number, value, _, path) =>
    !Array.isArray(value) || value.length <= wanted ? [] : [`${path} has too many items`],
  prefixItems: (wanted: readonly Node[], value, _, path) =>
    Array.isArray(value)
      ? wanted.flatMap((one, i) => (i < value.length ? faultsOf(one, value[i], `${path}.${i}`) : []))
      : [],
  items: (wanted: Node, value, node, path) => {
    if (!Array.isArray(value)) return [];
    const first = (node['prefixItems'] as readonly Node[] | undefined)?.length ?? 0;
    return value.slice(first).flatMap((item, i) => faultsOf(wanted, item, `${path}.${i + first}`));
  },
  required: (wanted: readonly string[], value, _, path) =>
    isObject(value) ? wanted.filter((key) => !(key in value)).map((key) => `${path} lacks ${key}`) : [],
  properties: (wanted: Readonly<Record<string, Node>>, value, _, path) =>
    isObject(value)
      ? Object.entries(wanted).flatMap(([key, one]) =>
          key in value ? faultsOf(one, value[key], `${path}.${key}`) : [],
        )
      : [],
  additionalProperties: (wanted: Node | boolean, value, node, path) => {
    if (!isObject(value) || wanted === true) return [];
    const own = Object.keys((node['properties'] as Node | undefined) ?? {});
    const more = Object.keys(value).filter((key) => !own.includes(key));
    if (wanted === false) return more.map((key) => `${path} has no key ${key}`);
    return more.flatMap((key) => faultsOf(wanted, value[key], `${path}.${key}`));
  },
  propertyNames: (wanted: Node, value, _, path) =>
    isObject(value) ? Object.keys(value).flatMap((key) => faultsOf(wanted, key, `${path}, the name`)) : [],
  anyOf: (wanted: readonly Node[], value, _, path) => {
    const all = wanted.map((one) => faultsOf(one, value, path));
    return all.some((faults) => faults.length === 0) ? [] : all.flat();
  },
  allOf: (wanted: readonly Node[], value, _, path) => wanted.flatMap((one) => faultsOf(one, value, path)),
  if: (wanted: Node, value, node, path) =>
    faultsOf(wanted, value, path).length === 0 ? faultsOf(node['then'] as Node, value, path) : [],
  // Read by `if`.
  // biome-ignore lint/suspicious/noThenProperty: the word of JSON Schema
  then: () => [],
};

/** What a JSON value has against a schema, each with its path; empty where it fits. Fails for a word it does not know. */
export function faultsOf(node: Node, value: unknown, path = 'file'): readonly string[] {
  return Object.entries(node).flatMap(([word, wanted]) => {
    expect(rules, `${word} is unknown here`).toHaveProperty([word]);
    return rules[word](wanted as never, value, node, path);
  });
}

/** Every part of a schema that says something of a value, by its path; `property`: it has a name of its own. */
export function* partsOf(node: Node, path = ''): Generator<{ path: string; part: Node; property: boolean }> {
  for (const [key, one] of Object.entries((node['properties'] ?? {}) as Readonly<Record<string, Node>>)) {
    yield { path: `${path}.${key}`, part: one, property: true };
    yield* partsOf(one, `${path}.${key}`);
  }
  const within: [string, unknown][] = ['items', 'additionalProperties', 'then'].map((word) => [
    word,
    node[word],
  ]);
  for (const word of ['anyOf', 'allOf', 'prefixItems'])
    for (const [i, one] of ((node[word] ?? []) as readonly Node[]).entries())
      within.push([`${word}${i}`, one]);
  for (const [word, one] of within) {
    if (!isObject(one)) continue;
    yield { path: `${path}<${word}>`, part: one, property: false };
    yield* partsOf(one, `${path}<${word}>`);
  }
}
