import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { nearest } from '../diagnostics/nearest.ts';
import type { Place } from '../model/place.ts';
import type { Fault, Findings } from './findings.ts';
import { readYaml } from './yaml-document.ts';
import { child, entriesOf, nodeAt, type Path, withNode, type YamlNode } from './yaml-tree.ts';

/** Name of the pseudo file that values of `--set` lie in: one line for each. */
export const SET_FILE = '--set';

/** Text of that pseudo file, to quote its lines in messages. */
export function setFileText(set: readonly string[]): string {
  return set.map((change) => change.replace(/[\r\n]+/g, ' ')).join('\n');
}

export interface Change {
  readonly path: string;
  readonly pathPlace: Place;
  readonly value: YamlNode;
}

/** Read `PATH=VALUE` texts; the value is YAML. */
export function readSetChanges(set: readonly string[], findings: Findings): Change[] {
  return setFileText(set)
    .split('\n')
    .slice(0, set.length)
    .flatMap((change, index) => readSetChange(change, index, findings));
}

function readSetChange(change: string, index: number, findings: Findings): Change[] {
  const at = change.indexOf('=');
  const path = (at < 0 ? change : change.slice(0, at)).trim();
  const column = change.length - change.trimStart().length + 1;
  const pathPlace = { file: SET_FILE, line: index + 1, column, length: Math.max(1, path.length) };
  if (at < 0 || path === '') {
    const what = `"${change}" is no change of a setting.`;
    const why = 'a change is written PATH=VALUE';
    findings.error(pathPlace, {
      code: 'bad-set',
      what,
      why,
      mend: "write e.g. --set 'condenser.temperature=-20 degC'",
    });
    return [];
  }
  // Blanks keep line and column of the value as they are in the change.
  const padded = `${'\n'.repeat(index)}${' '.repeat(at + 1)}${change.slice(at + 1)}`;
  const { root, diagnostics } = readYaml(padded, SET_FILE);
  for (const d of diagnostics) {
    if (d.code !== 'empty-file')
      findings.error(d.where, { ...d, what: `the value of ${path} cannot be read.` });
  }
  if (root !== null) return diagnostics.length > 0 ? [] : [{ path, pathPlace, value: root }];
  if (diagnostics.some((d) => d.code === 'empty-file')) {
    const fault = { code: 'bad-set', what: `${path} is given no value.`, why: 'nothing stands after the =' };
    findings.error(pathPlace, {
      ...fault,
      mend: `write ${path}=VALUE, or ${path}=null to take the setting out`,
    });
  }
  return [];
}

/** The changes of a case in the file. */
export function readCaseChanges(caseNode: YamlNode | undefined): Change[] {
  return entriesOf(caseNode).map(({ key, keyPlace, value }) => ({ path: key, pathPlace: keyPlace, value }));
}

/** The tree with all changes made; null takes a setting out. Changes that lead nowhere are reported. */
export function applyChanges(root: YamlNode, changes: readonly Change[], findings: Findings): YamlNode {
  return changes.reduce((tree, change) => {
    const path = settingPath(tree, change.path);
    const stranger = 'fault' in path ? null : strangeOutlet(tree, path.path, change.path);
    if (stranger !== null) {
      findings.error(change.pathPlace, stranger);
      return tree;
    }
    if (!('fault' in path)) {
      const taken = change.value.kind === 'scalar' && change.value.value === null;
      const changed = withNode(tree, path.path, taken ? null : change.value, change.pathPlace);
      if (changed !== null) return changed;
    }
    findings.error(change.pathPlace, 'fault' in path ? path.fault : deadEnd(change.path));
    return tree;
  }, root);
}

/** Parts of the file besides blocks and feeds that a path may begin with. */
const roots = ['gas', 'liquid', 'dissolved_gases', 'solve', 'ledger'] as const;

/** Where a setting such as `condenser.temperature` or `solve.tolerance` lies in the tree. */
export function settingPath(
  root: YamlNode,
  text: string,
): { readonly path: Path } | { readonly fault: Fault } {
  const parts = text.split('.').map((part) => part.trim());
  const [first, ...rest] = parts;
  if (parts.includes(''))
    return { fault: { ...notASetting(text), why: 'a path is names with dots between them' } };
  for (const section of ['blocks', 'feeds']) {
    if (child(child(root, section), first) !== undefined) {
      if (rest.length > 0) return { path: [section, ...parts] };
      const why = `${first} is a whole ${section.slice(0, -1)}; a path leads to one of its settings`;
      return { fault: { ...notASetting(text), why, mend: `write ${first}.SETTING, e.g. ${first}.pressure` } };
    }
  }
  const known = (roots as readonly string[]).includes(first);
  const needsKey = first === 'solve' || first === 'ledger';
  if (known && rest.length === (needsKey ? 1 : 0)) return { path: parts };
  const names = ['blocks', 'feeds'].flatMap((section) => entriesOf(child(root, section)).map((e) => e.key));
  if (first === 'blocks' || first === 'feeds') {
    return {
      fault: {
        ...notASetting(text),
        why: 'a path begins with the name of the block or feed',
        mend: `write ${rest.join('.')}`,
      },
    };
  }
  const near = known ? null : nearest(first, [...names, ...roots]);
  if (near !== null) {
    return {
      fault: {
        ...notASetting(text),
        why: `the nearest known name is ${near}`,
        mend: `write ${nearestPath(root, [near, ...rest])}`,
      },
    };
  }
  const why = `a path begins with one of: ${[...names, ...roots].join(', ')}`;
  const meant = pathsEndingIn(root, parts);
  const mend = meant.length === 0 ? {} : { mend: `write ${meant.slice(0, MOST_MEANT).join(' or ')}` };
  return { fault: { ...notASetting(text), why, ...mend } };
}

/** More paths than this are no help. */
const MOST_MEANT = 4;

/** A path whose first name is known, the others mended as far as the file has names that are near. */
function nearestPath(root: YamlNode, parts: readonly string[]): string {
  const [first] = parts;
  let node =
    child(child(root, 'blocks'), first!) ?? child(child(root, 'feeds'), first!) ?? child(root, first!);
  const mended = parts.slice(1).map((part) => {
    const keys = entriesOf(node).map(({ key }) => key);
    const name = keys.includes(part) ? part : (nearest(part, keys) ?? part);
    node = child(node, name);
    return name;
  });
  return [first, ...mended].join('.');
}

/** The settings in the file that a path without the name of its block or feed may mean. */
function pathsEndingIn(root: YamlNode, parts: readonly string[]): string[] {
  return ['blocks', 'feeds'].flatMap((section) =>
    entriesOf(child(root, section)).flatMap(({ key, value }) => {
      const end = parts.reduce<YamlNode | undefined>((at, part) => child(at, part), value);
      return end === undefined ? [] : [[key, ...parts].join('.')];
    }),
  );
}

/**
 * The outlets of a splitter or separator are named where streams begin at them: a change brings no new one, so what is not
 * there is a slip. Null where the path is none of them.
 */
function strangeOutlet(root: YamlNode, path: Path, text: string): Fault | null {
  const [section, block, list, outlet] = path;
  if (section !== 'blocks' || path.length !== 4 || !OUTLET_LISTS.includes(String(list))) return null;
  const known = entriesOf(nodeAt(root, [section, block!, list!])).map(({ key }) => key);
  if (known.length === 0 || known.includes(String(outlet))) return null;
  const near = nearest(String(outlet), known) ?? (known.length === 1 ? known[0]! : null);
  return {
    ...notASetting(text),
    why: `no stream begins at an outlet ${outlet}; ${block} has ${known.join(', ')}`,
    mend: near === null ? 'name one of these' : `write ${[block, list, near].join('.')}`,
  };
}

const OUTLET_LISTS: readonly string[] = ['fractions', 'flows', 'recover'];

/** Findings whose mend is the name of one key. */
const NAMES_A_KEY: readonly string[] = ['unknown-key', 'unknown-reaction', 'unknown-component'];

/** The mend of a slip inside a path that was typed, with the whole path: what is shown can be typed again. */
export function mendInFull(finding: Diagnostic, changes: readonly Change[]): Diagnostic {
  const change = changes.find(
    ({ pathPlace: at }) => at.file === finding.where.file && at.line === finding.where.line,
  );
  const name = /^write ([A-Za-z_][\w-]*)$/.exec(finding.mend)?.[1];
  if (change === undefined || name === undefined || !NAMES_A_KEY.includes(finding.code)) return finding;
  const parts = change.path.split('.').map((part) => part.trim());
  const at = parts.findLastIndex((part) => part !== name && nearest(part, [name]) !== null);
  return at < 0 ? finding : { ...finding, mend: `write ${parts.with(at, name).join('.')}` };
}

function notASetting(text: string): Fault {
  return {
    code: 'unknown-setting',
    what: `${text} is no setting of this file.`,
    why: 'it leads nowhere',
    mend: 'write e.g. condenser.temperature',
  };
}

function deadEnd(text: string): Fault {
  return { ...notASetting(text), why: 'on the way there stands a single value, or a list that is shorter' };
}
