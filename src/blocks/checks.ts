import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { nearest } from '../diagnostics/nearest.ts';
import type { Component } from '../model/component.ts';
import type { SettingsFault } from './block.ts';

/** A fault unless exactly one of the named settings is given. `examples` shows how each is written. */
export function exactlyOne(
  settings: Readonly<Record<string, unknown>>,
  examples: Readonly<Record<string, string>>,
): SettingsFault[] {
  const names = Object.keys(examples);
  const given = names.filter((name) => settings[name] !== undefined && settings[name] !== false);
  if (given.length === 1) return [];
  const list = listed(names);
  if (given.length === 0) {
    return [
      {
        path: [],
        code: 'missing-setting',
        what: `None of ${list} is given.`,
        why: 'one of them fixes what this block does',
        mend: `add one, e.g. ${examples[names[0]]}`,
      },
    ];
  }
  return [
    {
      path: [given[1]],
      code: 'too-many-settings',
      what: `${listed(given)} are given together.`,
      why: `only one of ${list} can be free to choose; the others follow from the balance`,
      mend: `keep one and take out the rest`,
    },
  ];
}

/** A fault for every id in the list that is no component of the flowsheet. */
export function knownComponents(
  ids: readonly string[],
  components: readonly Component[],
  pathOf: (id: string, index: number) => readonly (string | number)[],
): SettingsFault[] {
  const known = components.map((c) => c.id);
  return ids.flatMap((id, index) => {
    if (known.includes(id)) return [];
    const near = nearest(id, known);
    return [
      {
        path: pathOf(id, index),
        code: 'unknown-component',
        what: `"${id}" is not a component of this flowsheet.`,
        why: near ? `the nearest component is ${near}` : `the components are ${known.join(', ')}`,
        mend: near ? `write ${near}` : `add ${id} to components or take it out here`,
      },
    ];
  });
}

/** Pressure after a drop [Pa]. @throws PassTrouble when nothing is left */
export function pressureAfterDrop(inletPa: number, dropPa: number | undefined): number {
  const outletPa = inletPa - (dropPa ?? 0);
  if (outletPa > 0) return outletPa;
  throw new PassTrouble(
    'pressure-drop',
    `A pressure drop of ${((dropPa ?? 0) / 1e5).toFixed(3)} bar leaves nothing of the inlet's ${(inletPa / 1e5).toFixed(3)} bar.`,
    'an absolute pressure is above zero',
    'lower the pressure drop or raise the pressure of the feed',
  );
}

/** Names joined as in "a, b and c". */
export function listed(names: readonly string[]): string {
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}
