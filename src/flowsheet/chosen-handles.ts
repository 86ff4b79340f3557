import type { Flowsheet, Handle } from '../model/flowsheet.ts';
import { dimensions } from '../units/dimension.ts';
import { unitScale } from '../units/quantity.ts';
import { type NumericSetting, numericSettings } from './numeric-settings.ts';

/** More would be a list to search rather than a choice. */
const MOST = 4;

/**
 * The handles of a page whose file names none: the temperatures of condensers, 20 K to either side, and the fractions of
 * splitters, from a third to three times what they are, without what an aim moves.
 */
export function chosenHandles(flowsheet: Flowsheet): readonly Handle[] {
  const kinds = new Map(flowsheet.blocks.map(({ name, kind }) => [name, kind]));
  const aimed = new Set(flowsheet.aims.map(({ move }) => move));
  return numericSettings(flowsheet)
    .filter(({ path }) => !aimed.has(path))
    .flatMap((setting): Handle[] => {
      const [block = '', ...rest] = setting.path.split('.');
      const kind = kinds.get(block);
      const { value } = setting;
      if (kind === 'condenser' && rest.join('.') === 'temperature')
        return [handle(setting, value - 20, value + 20, 81)];
      if (kind === 'splitter' && rest[0] === 'fractions' && value > 0 && value < 1) {
        const low = Number((value / 3).toPrecision(1));
        const high = Number(Math.min(3 * value, (1 + value) / 2).toPrecision(2));
        const step = 10 ** (Math.floor(Math.log10(low)) - 1);
        return [handle(setting, low, high, Math.round((high - low) / step) + 1)];
      }
      return [];
    })
    .slice(0, MOST);
}

function handle({ path, dimension }: NumericSetting, low: number, high: number, places: number): Handle {
  const unit = dimensions[dimension].shown;
  return { path, between: [low, high], unit, scale: unitScale(unit, dimension)!, places };
}
