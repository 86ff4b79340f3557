import type { NumericSetting } from '../flowsheet/numeric-settings.ts';
import { fitsDimension, numberIn } from '../units/quantity.ts';

/** How the values of a setting stand in a column of a file. */
export interface SettingColumn {
  /** the path, with its unit behind it */
  readonly head: string;
  /** a value [SI] in that unit */
  number(value: number): number;
}

/**
 * A column in the unit that the user wrote, as in the table of a sweep: a reader of the file finds his own bounds again. Parts
 * of a composition keep the natural unit, for what they are written in depends on the parts beside them.
 *
 * @param written  '' where there is none
 */
export function settingColumn(
  { path, dimension, unit, unitSI }: Pick<NumericSetting, 'path' | 'dimension' | 'unit' | 'unitSI'>,
  written: string,
): SettingColumn {
  // The flow of a feed's component may be written by mass, and is kept in moles.
  if (path.includes('.composition.') || !fitsDimension(written, dimension))
    return { head: `${path} [${unit}]`, number: (value) => value / unitSI };
  const head = written === '' ? path : `${path} [${written}]`;
  return { head, number: (value) => numberIn(value, written, dimension) };
}
