import type { Reading } from './findings.ts';
import { child, keyPlaceOfPath, type YamlEntry, type YamlNode } from './yaml-tree.ts';

/** The entries of a part of the file that must be there; null, with a finding, where it has none. */
export function requiredEntries(
  reading: Reading,
  key: string,
  why: string,
  example: string,
): readonly YamlEntry[] | null {
  const { root, findings } = reading;
  const node = child(root, key);
  if (node?.kind === 'mapping' && node.entries.length > 0) return node.entries;
  if (node !== undefined && !isEmpty(node)) return notAMapping(reading, key, node, example);
  findings.error(node === undefined ? { ...root.place, length: 1 } : keyPlaceOfPath(root, [key]), {
    code: 'missing-key',
    what: node === undefined ? `the file has no ${key}.` : `${key}: nothing is given.`,
    why,
    mend: `add ${example}`,
  });
  return null;
}

/** The entries of a part of the file that may be left out. */
export function optionalEntries(reading: Reading, key: string, example: string): readonly YamlEntry[] {
  const node = child(reading.root, key);
  if (node === undefined || isEmpty(node)) return [];
  return node.kind === 'mapping' ? node.entries : (notAMapping(reading, key, node, example) ?? []);
}

function isEmpty(node: YamlNode): boolean {
  return (
    (node.kind === 'scalar' && node.text === '') || (node.kind === 'mapping' && node.entries.length === 0)
  );
}

function notAMapping(reading: Reading, key: string, node: YamlNode, example: string): null {
  reading.findings.error(keyPlaceOfPath(reading.root, [key]), {
    code: 'wrong-value',
    what: `${key}: ${node.kind === 'list' ? 'a list' : 'a single value'} does not fit.`,
    why: 'a mapping (name: value) is needed here',
    mend: `write it as in ${example}`,
  });
  return null;
}
