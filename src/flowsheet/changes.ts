import { nearest } from '../diagnostics/nearest.ts';
import type { Place } from '../model/place.ts';
import type { Fault, Findings } from './findings.ts';
import { readYaml } from './yaml-document.ts';
import { child, entriesOf, type Path, withNode, type YamlNode } from './yaml-tree.ts';

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
        mend: `write ${[near, ...rest].join('.')}`,
      },
    };
  }
  const why = `a path begins with one of: ${[...names, ...roots].join(', ')}`;
  return { fault: { ...notASetting(text), why } };
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
