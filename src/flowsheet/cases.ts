import { nearest } from '../diagnostics/nearest.ts';
import { type Change, readCaseChanges } from './changes.ts';
import type { Findings, Reading } from './findings.ts';
import { optionalEntries } from './section.ts';
import { type SettingsWorld, tryChanges } from './settings.ts';
import { child, entriesOf, keyPlaceOfPath, type YamlNode } from './yaml-tree.ts';

/** The changes of the case that was asked for; empty, with a finding, where there is no such case. */
export function chosenCase(root: YamlNode, name: string, findings: Findings): readonly Change[] {
  const cases = child(root, 'cases');
  const found = child(cases, name);
  if (found !== undefined) return readCaseChanges(found);
  const known = entriesOf(cases).map((e) => e.key);
  const near = nearest(name, known);
  const none = known.length === 0 ? 'the file has no cases' : `the cases are ${known.join(', ')}`;
  findings.error(cases === undefined ? { ...root.place, length: 1 } : keyPlaceOfPath(root, ['cases']), {
    code: 'unknown-case',
    what: `there is no case "${name}".`,
    why: near === null ? none : `${none}; the nearest is ${near}`,
    mend: near === null ? 'name one of them, or none' : `write --case '${near}'`,
  });
  return [];
}

/**
 * Check every case, all its changes made together, and list their names.
 *
 * @param reading  the file as written: a case is a change to that, whatever else was changed for this run
 */
export function checkCases(reading: Reading, world: SettingsWorld): readonly string[] {
  const entries = optionalEntries(
    reading,
    'cases',
    'cases: {cold condenser: {condenser.temperature: -25 degC}}',
  );
  return entries.map(({ key, keyPlace, value }) => {
    if (value.kind !== 'mapping') {
      const what = `the case ${key} is no mapping of changes.`;
      const mend = `write e.g. ${key}: {condenser.temperature: -25 degC}`;
      reading.findings.error(keyPlace, {
        code: 'wrong-value',
        what,
        why: 'a case names the settings it changes',
        mend,
      });
    }
    tryChanges(reading, world, readCaseChanges(value));
    return key;
  });
}
