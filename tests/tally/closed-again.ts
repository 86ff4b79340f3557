import type { NumericSetting } from '../../src/flowsheet/numeric-settings.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import { closePlant } from '../../src/tally/close-plant.ts';
import { figureLeaves } from '../../src/tally/figure-leaves.ts';
import { createPlant } from '../../src/tally/plant.ts';
import { figuresOf } from '../../src/tally/tally.ts';

/** A slope by closing again, and how far it may be off by the differences it comes from. */
export interface Slope {
  readonly value: number;
  readonly uncertainty: number;
}

export type Way = 'both' | 'more' | 'less';

/** Widest relative step, halved until the slopes are certain. */
const WIDEST = 4e-3;
const LEVELS = 10;

/**
 * Closes a flowsheet again beside a setting for the slopes of its figures: differences at steps halved from level to
 * level, extrapolated to no step, until every slope is `certain`; the best level counts for each figure.
 *
 * @param fromFeeds  closes every time as if anew: where a recycle keeps whatever pressure it starts with
 * @source C. J. F. Ridders, Advances in Engineering Software 4 (1982) 75-76
 */
export function createClosedAgain(flowsheet: Flowsheet, fromFeeds: boolean) {
  const plant = createPlant(flowsheet);
  const options = { method: 'auto', tolerance: 1e-12, maxPasses: 500 } as const;
  closePlant(plant, { ...options, tolerance: 1e-9 });

  function figuresAt({ path }: NumericSetting, value: number): ReadonlyMap<string, number> {
    plant.set(path, value);
    const closed = closePlant(plant, { ...options, warm: !fromFeeds });
    if (!closed.converged && closed.residual > 1e-11)
      throw new Error(`not closed again at ${path} = ${value}`);
    return figureLeaves(figuresOf(plant));
  }

  return {
    /** Slopes per natural unit, one-sided where `way` says so. */
    slopes(
      setting: NumericSetting,
      way: Way,
      names: readonly string[],
      isCertain: (figure: string, slope: Slope) => boolean,
    ): ReadonlyMap<string, Slope> {
      const base = figuresAt(setting, setting.value);
      const best = new Map<string, Slope>();
      const rows = new Map<string, readonly number[]>();
      for (let level = 0; level < LEVELS; level++) {
        const h = (WIDEST * sizeOf(setting)) / 2 ** level;
        const up = way === 'less' ? base : figuresAt(setting, setting.value + h);
        const down = way === 'more' ? base : figuresAt(setting, setting.value - h);
        const width = ((way === 'both' ? 2 : 1) * h) / setting.unitSI;
        for (const figure of names) {
          const before = rows.get(figure) ?? [];
          const row = [(of(up, figure) - of(down, figure)) / width];
          for (let k = 0; k < before.length; k++) {
            const order = way === 'both' ? 2 * (k + 1) : k + 1;
            row.push(row[k]! + (row[k]! - before[k]!) / (2 ** order - 1));
            const value = row[k + 1]!;
            const uncertainty = Math.max(Math.abs(value - row[k]!), Math.abs(value - before[k]!));
            if (uncertainty < (best.get(figure)?.uncertainty ?? Infinity))
              best.set(figure, { value, uncertainty });
          }
          rows.set(figure, row);
        }
        if (level > 1 && [...best].every(([figure, slope]) => isCertain(figure, slope))) break;
      }
      plant.set(setting.path, setting.value);
      return best;
    },
  };
}

/** A duty of nothing is left out of the figures. */
function of(figures: ReadonlyMap<string, number>, name: string): number {
  return figures.get(name) ?? 0;
}

/** What is usual where a setting is next to nothing. */
export function sizeOf({ dimension, value, unitSI }: NumericSetting): number {
  const usual = dimension === 'temperature' ? 300 : dimension === 'temperatureDifference' ? 10 : 1;
  return Math.max(Math.abs(value), usual * unitSI);
}
