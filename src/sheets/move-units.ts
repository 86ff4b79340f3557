import { numericSettings } from '../flowsheet/numeric-settings.ts';
import type { Flowsheet, Move } from '../model/flowsheet.ts';
import { type Dimension, dimensions } from '../units/dimension.ts';
import { formatQuantity } from '../units/quantity.ts';
import { valueText } from './numbers.ts';
import { type SettingColumn, settingColumn } from './written-unit.ts';

/** How the values of a moved setting are told. */
export interface MoveUnit {
  readonly path: string;
  /** natural unit: K, bar, %, ... */
  readonly unit: string;
  /** a value in that unit */
  natural(value: number): number;
  /** in the unit of its bounds, for files */
  readonly column: SettingColumn;
  /** as an engineer reads it */
  text(value: number): string;
  /** as it is written in the file, so that it comes back to seven digits */
  yaml(value: number): string;
}

/** The units of the settings of an objective, in its order. */
export function moveUnits(flowsheet: Flowsheet, moves: readonly Move[]): MoveUnit[] {
  const known = numericSettings(flowsheet);
  return moves.map(({ path, unit, written }): MoveUnit => {
    const setting = known.find((one) => one.path === path);
    if (setting === undefined) {
      const dimension = (Object.keys(dimensions) as Dimension[]).find((d) => dimensions[d].si === unit)!;
      return {
        path,
        unit,
        natural: (value) => value,
        column: settingColumn({ path, dimension, unit, unitSI: 1 }, written),
        text: (value) => formatQuantity(value, dimension, 5),
        yaml: (value) => formatQuantity(value, dimension, 7),
      };
    }
    // Parts of a composition are bare numbers beside the others.
    const isPart = path.includes('.composition.');
    return {
      path,
      unit: isPart ? 'part' : setting.unit,
      natural: (value) => (isPart ? value : value / setting.unitSI),
      column: settingColumn(isPart ? { ...setting, unit: 'part', unitSI: 1 } : setting, written),
      text: (value) => (isPart ? formatQuantity(value, 'number', 5) : valueText({ ...setting, value })),
      yaml: (value) => formatQuantity(value, isPart ? 'number' : setting.dimension, 7),
    };
  });
}
