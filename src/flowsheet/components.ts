import { nearest } from '../diagnostics/nearest.ts';
import type { Component } from '../model/component.ts';
import type { Place } from '../model/place.ts';
import { parseFormula } from '../properties/chemical-formula.ts';
import { builtInComponent, builtInIds } from '../properties/components.ts';
import { customComponent } from '../properties/custom-component.ts';
import { customDefinition } from './custom-definition.ts';
import type { Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import { checkName } from './names.ts';
import { customSchema } from './schema-components.ts';
import {
  child,
  entriesOf,
  keyPlaceOfPath,
  nodeAt,
  type Path,
  placeInside,
  type YamlNode,
} from './yaml-tree.ts';

export interface ReadComponents {
  readonly components: readonly Component[];
  /** ids that stand in the file but could not be read */
  readonly failed: ReadonlySet<string>;
}

/**
 * The components in declared order: a list of ids, or a mapping whose entries are empty for built-in
 * components and carry data for the user's own (which may stand in a list as `- NAME: {...}` as well).
 *
 * @returns what could be read; null where the part as a whole is unfit, so that nothing can be said of names
 */
export function readComponents(reading: Reading): ReadComponents | null {
  const { root, findings } = reading;
  const node = child(root, 'components');
  if (node === undefined) {
    findings.error({ ...root.place, length: 1 }, missing('the file has no components.'));
    return null;
  }
  const entries = entriesOfComponents(node);
  if (entries === null || entries.length === 0) {
    const given = node.kind === 'scalar' && node.text !== '';
    const what = given ? 'components: a single value does not fit.' : 'components: no component is named.';
    findings.error(
      keyPlaceOfPath(root, ['components']),
      given
        ? {
            ...missing(what),
            code: 'wrong-value',
            why: 'a list [...] is needed here',
            mend: 'write e.g. [H2, N2, NH3], with brackets and commas',
          }
        : missing(what),
    );
    return null;
  }
  const found = new Map<string, { component: Component; place: Place }>();
  const failed = new Set<string>();
  for (const entry of entries) {
    const before = found.get(entry.id);
    if (before !== undefined) {
      const what = `the component ${entry.id} is named twice.`;
      const fault = {
        code: 'duplicate-name',
        what,
        why: 'each component stands once',
        mend: 'take one of them out',
      };
      findings.error(entry.place, fault, before.place);
      continue;
    }
    const component = readComponent(reading, entry);
    if (component === null) failed.add(entry.id);
    else found.set(entry.id, { component, place: entry.place });
  }
  return { components: [...found.values()].map((f) => f.component), failed };
}

/**
 * Graphite need not be declared: where a reaction names it, it is carried along as the last component.
 * Null where that is not so.
 */
export function undeclaredGraphite(root: YamlNode, declared: ReadComponents): Component | null {
  const graphite = /(^|[^A-Za-z0-9_])C_gr($|[^A-Za-z0-9_])/;
  const known = declared.failed.has('C_gr') || declared.components.some((c) => c.id === 'C_gr');
  const texts = entriesOf(child(root, 'reactions')).map(({ value }) => child(value, 'equation') ?? value);
  const named = texts.some((node) => node.kind === 'scalar' && graphite.test(node.text));
  return named && !known ? (builtInComponent('C_gr') ?? null) : null;
}

interface Entry {
  readonly id: string;
  readonly place: Place;
  /** null for a built-in component */
  readonly data: YamlNode | null;
  readonly path: Path;
}

function entriesOfComponents(node: YamlNode): readonly Entry[] | null {
  if (node.kind === 'scalar') return null;
  if (node.kind === 'mapping') {
    return node.entries.map(({ key, keyPlace, value }) => ({
      id: key,
      place: keyPlace,
      data: value.kind === 'scalar' && value.text === '' ? null : value,
      path: ['components', key],
    }));
  }
  return node.items.flatMap((item, index): Entry[] => {
    if (item.kind === 'mapping') {
      return item.entries.map(({ key, keyPlace, value }) => ({
        id: key,
        place: keyPlace,
        data: value,
        path: ['components', index, key],
      }));
    }
    const id = item.kind === 'scalar' ? item.text : '';
    return [{ id, place: item.place, data: null, path: ['components', index] }];
  });
}

function readComponent(reading: Reading, { id, place, data, path }: Entry): Component | null {
  const { findings } = reading;
  if (data === null) {
    const component = builtInComponent(id);
    if (component !== undefined) return component;
    const near = nearest(id, builtInIds);
    findings.error(place, {
      code: 'unknown-component',
      what: `${id === '' ? 'an empty entry' : id} is no built-in component.`,
      why:
        near === null
          ? 'no component of a similar name is built in'
          : `the nearest built-in component is ${near}`,
      mend:
        near === null
          ? 'see `looptally data` for the list, or give its own data as an entry with formula and source'
          : `write ${near}, or give your own data as an entry with formula and source`,
    });
    return null;
  }
  if (builtInIds.includes(id)) {
    const why = 'a name has one meaning everywhere, and this one is taken';
    findings.error(place, {
      code: 'reserved-name',
      what: `the component ${id} is built in.`,
      why,
      mend: `leave its data out, or choose another name`,
    });
    return null;
  }
  if (!checkName(findings, id, place, 'a component')) return null;
  return readCustom(reading, id, path);
}

function readCustom(reading: Reading, id: string, path: Path): Component | null {
  const { root, findings } = reading;
  const entry = checkPart(reading, customSchema, path);
  if (entry === undefined) return null;
  const formula = parseFormula(entry.formula);
  if (!formula.ok) {
    const node = nodeAt(root, [...path, 'formula'])!;
    const where = node.kind === 'scalar' ? placeInside(node, formula.offset, formula.length) : node.place;
    findings.error(where, {
      code: 'bad-formula',
      what: `component ${id}: ${formula.what}`,
      why: formula.why,
      mend: formula.mend,
    });
    return null;
  }
  const definition = customDefinition(entry);
  if ('lacks' in definition) {
    findings.error(keyPlaceOfPath(root, path), {
      code: 'missing-key',
      what: `the component ${id} lacks ${definition.lacks}.`,
      why: definition.why,
      mend: `add ${definition.lacks}`,
    });
    return null;
  }
  return customComponent(id, definition.definition);
}

function missing(what: string) {
  const why = 'a flowsheet needs at least one component';
  return { code: 'missing-key', what, why, mend: 'add e.g. components: [H2, N2, NH3]' };
}
