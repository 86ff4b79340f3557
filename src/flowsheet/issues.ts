import type { z } from 'zod';
import { nearest } from '../diagnostics/nearest.ts';
import type { FaultParams } from '../units/schema.ts';
import type { Reading } from './findings.ts';
import { keyPlaceOfPath, nodeAt, type Path, placeOfPath, toValue, type YamlNode } from './yaml-tree.ts';

type Issue = z.core.$ZodIssue;

/**
 * Check the part of the file at a path with a schema and report what does not fit.
 *
 * @param node  the part, where it is not the one at `path` of the tree as it stands
 * @returns the checked value; undefined where there were faults
 */
export function checkPart<T>(
  reading: Reading,
  schema: z.ZodType<T>,
  path: Path,
  node: YamlNode | undefined = nodeAt(reading.root, path),
): T | undefined {
  const result = schema.safeParse(toValue(node));
  if (result.success) return result.data;
  for (const issue of result.error.issues) reportIssue(reading, issue, path, schema);
  return undefined;
}

/** `converter.temperature` for ['blocks', 'converter', 'temperature']: the way a setting is called. */
function nameOfPath(path: Path): string {
  const shown = path[0] === 'blocks' || path[0] === 'feeds' ? path.slice(1) : path;
  return shown.length === 0 ? 'the file' : shown.join('.');
}

function reportIssue(reading: Reading, issue: Issue, base: Path, schema: z.ZodType): void {
  const path = [...base, ...(issue.path as (string | number)[])];
  const { root, findings } = reading;
  const name = nameOfPath(path);
  switch (issue.code) {
    case 'unrecognized_keys': {
      const known = keysAt(schema, issue.path as Path);
      for (const key of issue.keys)
        findings.error(keyPlaceOfPath(root, [...path, key]), unknownKey(key, name, known));
      return;
    }
    case 'invalid_key': {
      const key = String(path.at(-1));
      findings.error(keyPlaceOfPath(root, path), unfitKey(key, nameOfPath(path.slice(0, -1)), issue.issues));
      return;
    }
    case 'invalid_union': {
      const branch = likeliestBranch(issue.errors);
      if (branch !== undefined) {
        for (const inner of branch) {
          reportIssue(reading, { ...inner, path: [...issue.path, ...inner.path] } as Issue, base, schema);
        }
        return;
      }
      break;
    }
    case 'custom': {
      const params = issue.params as FaultParams | undefined;
      if (params?.why !== undefined && params.code !== 'missing') {
        findings.error(placeOfPath(root, path), { ...params, what: `${name}: ${params.what}` });
        return;
      }
      if (params?.code === 'missing') {
        reportMissing(reading, path, params.mend);
        return;
      }
      break;
    }
    default:
  }
  if (nodeAt(root, path) === undefined && path.length > 0) {
    reportMissing(reading, path, exampleOf(issue));
    return;
  }
  findings.error(placeOfPath(root, path), { code: 'wrong-value', ...describeMisfit(reading, issue, path) });
}

function reportMissing(reading: Reading, path: Path, example: string): void {
  const owner = path.slice(0, -1);
  const key = String(path.at(-1));
  const whole = owner.length === 0;
  reading.findings.error(whole ? { ...reading.root.place, length: 1 } : placeOfPath(reading.root, owner), {
    code: 'missing-key',
    what: `${nameOfPath(owner)} has no ${key}.`,
    why: key === 'looptally' ? 'it tells the version of the format' : `${key} is needed and has no default`,
    mend: `add ${key}: ${example}`,
  });
}

function unknownKey(key: string, owner: string, known: readonly string[]) {
  const near = nearest(key, known);
  const list = known.join(', ');
  return {
    code: 'unknown-key',
    what: `${owner} has an unknown key ${key}.`,
    why:
      near !== null
        ? `the nearest known key is ${near}`
        : known.length === 0
          ? 'it takes no settings'
          : `it takes: ${list}`,
    mend: near === null ? `take ${key} out` : `write ${near}`,
  };
}

function unfitKey(key: string, owner: string, issues: readonly Issue[]) {
  const reserved = issues.some((i) => i.code === 'custom' && i.params?.['code'] === 'reserved-name');
  const params = issues.find((i) => i.code === 'custom' && i.params?.['why'] !== undefined);
  if (params?.code === 'custom') {
    const { code, what, why, mend } = params.params as unknown as FaultParams;
    return { code, what: `${owner}: ${what}`, why, mend };
  }
  return {
    code: reserved ? 'reserved-name' : 'bad-name',
    what: `${owner} cannot have an entry called ${key}.`,
    why: reserved
      ? `${key} has a meaning of its own`
      : 'a name begins with a letter and has letters, digits and _ only',
    mend: 'choose another name',
  };
}

/** The branch of a union that came furthest: it failed deepest, or on a value rather than on the type. */
function likeliestBranch(branches: readonly (readonly Issue[])[]): readonly Issue[] | undefined {
  const score = (issues: readonly Issue[]): number =>
    issues.reduce((sum, i) => sum + (i.path.length === 0 && i.code === 'invalid_type' ? 100 : 1), 0);
  const best = branches.toSorted((a, b) => score(a) - score(b))[0];
  return best !== undefined && score(best) < 100 ? best : undefined;
}

/** Words that YAML 1.1 took for true or false. */
const booleans: ReadonlyMap<string, string> = new Map([
  ...['yes', 'y', 'on'].map((word) => [word, 'true'] as const),
  ...['no', 'n', 'off'].map((word) => [word, 'false'] as const),
]);

const typeNames: Readonly<Record<string, string>> = {
  object: 'a mapping (name: value)',
  record: 'a mapping (name: value)',
  array: 'a list [..., ...]',
  string: 'a text',
  boolean: 'true or false',
  number: 'a number',
};

function describeMisfit(reading: Reading, issue: Issue, path: Path) {
  const name = nameOfPath(path);
  const found = shown(nodeAt(reading.root, path));
  if (issue.code === 'invalid_type') {
    const wanted = typeNames[issue.expected] ?? issue.expected;
    const meant = issue.expected === 'boolean' ? booleans.get(found.toLowerCase()) : undefined;
    return {
      what: `${name}: ${found} does not fit.`,
      why:
        meant === undefined
          ? `${wanted} is needed here`
          : `${found} is a text in YAML 1.2; ${wanted} is needed here`,
      mend: `write ${meant ?? wanted}`,
    };
  }
  if (issue.code === 'invalid_value') {
    const values = issue.values.map(String);
    const near = typeof toValue(nodeAt(reading.root, path)) === 'string' ? nearest(found, values) : null;
    const choice =
      values.length === 1 ? `only ${values[0]} fits here` : `one of ${values.join(', ')} is needed`;
    return {
      what: `${name}: ${found} is not known.`,
      why: near === null ? choice : `${choice}; the nearest is ${near}`,
      mend: `write ${near ?? values[0]}`,
    };
  }
  if (issue.code === 'invalid_union') {
    const wanted = [
      ...new Set(
        issue.errors
          .flat()
          .map((i) => (i.code === 'invalid_type' ? (typeNames[i.expected] ?? i.expected) : '')),
      ),
    ];
    const forms = wanted.filter((form) => form !== '').join(' or ');
    return {
      what: `${name}: ${found} does not fit.`,
      why: `${forms} is needed here`,
      mend: `write ${forms}`,
    };
  }
  if (issue.code === 'too_small' || issue.code === 'too_big') {
    const bound = issue.code === 'too_small' ? issue.minimum : issue.maximum;
    const unit = issue.origin === 'array' ? ' entries' : issue.origin === 'string' ? ' characters' : '';
    const rule = `${issue.code === 'too_small' ? 'at least' : 'at most'} ${bound}${unit}`;
    return { what: `${name}: ${found} does not fit.`, why: `${rule} must stand here`, mend: `write ${rule}` };
  }
  return { what: `${name}: ${found} does not fit.`, why: issue.message, mend: 'write a value that fits' };
}

function exampleOf(issue: Issue): string {
  if (issue.code === 'invalid_value') return String(issue.values[0]);
  if (issue.code !== 'invalid_type') return '...';
  if (issue.expected === 'record' || issue.expected === 'object') return '{...}';
  return issue.expected === 'array' ? '[...]' : issue.expected === 'boolean' ? 'true' : '...';
}

function shown(node: YamlNode | undefined): string {
  if (node === undefined) return 'nothing';
  if (node.kind === 'list') return 'a list';
  if (node.kind === 'mapping') return 'a mapping';
  if (node.text === '') return 'an empty value';
  return node.text.length > 40 ? `${node.text.slice(0, 40)}...` : node.text;
}

/** The keys of the object schema at a path inside a schema, seen through optional and default wrappers. */
function keysAt(schema: z.ZodType, path: Path): readonly string[] {
  let inner = unwrap(schema);
  for (const key of path) {
    const { def } = inner._zod as unknown as { def: SchemaParts };
    const next = def.shape?.[String(key)] ?? def.valueType ?? def.element;
    if (next === undefined) return [];
    inner = unwrap(next);
  }
  return Object.keys((inner._zod.def as SchemaParts).shape ?? {});
}

/** The parts of a zod definition that are looked into here. */
interface SchemaParts {
  readonly shape?: Readonly<Record<string, z.ZodType>>;
  readonly valueType?: z.ZodType;
  readonly element?: z.ZodType;
  readonly innerType?: z.ZodType;
  readonly in?: z.ZodType;
  readonly options?: readonly z.ZodType[];
}

function unwrap(schema: z.ZodType): z.ZodType {
  const def = schema._zod.def as SchemaParts;
  const inner =
    def.innerType ?? def.in ?? def.options?.find((o) => (o._zod.def as SchemaParts).shape !== undefined);
  return inner === undefined ? schema : unwrap(inner);
}
