import type { Lever } from './levers.ts';

/** How strongly a setting holds a figure. */
export interface Hold {
  readonly setting: string;
  /** d ln figure / d ln setting: per cent of the figure per per cent of the setting [-] */
  readonly elasticity: number;
}

/**
 * Settings of blocks by how strongly they hold a figure, the strongest first. Measured by elasticity: per cent of
 * the figure per per cent of the setting, temperatures from 0 K and pressures absolute, so that unlike settings
 * can be compared. Where more does something else than less, the stronger side counts. Settings that do not move
 * the figure are left out; feeds come from outside and are no settings of the loop.
 */
export function holdsOn(
  figure: string,
  levers: readonly Lever[],
  figures: Readonly<Record<string, number>>,
  blocks: readonly string[],
): readonly Hold[] {
  const value = figures[figure];
  if (!value) return [];
  return levers
    .filter(({ setting }) => blocks.includes(setting.path.split('.', 1)[0]!))
    .map(({ setting, figures: mean, sides }) => {
      const slopes = (sides === null ? [mean] : [sides.more, sides.less]).map((one) => one[figure] ?? 0);
      const slope = slopes.reduce((most, one) => (Math.abs(one) > Math.abs(most) ? one : most), 0);
      return { setting: setting.path, elasticity: (slope * setting.value) / setting.unitSI / value };
    })
    .filter(({ elasticity }) => Math.abs(elasticity) > IDLE)
    .sort((a, b) => Math.abs(b.elasticity) - Math.abs(a.elasticity));
}

/** An elasticity no larger than this is rounding [-]. */
const IDLE = 1e-7;

/** The figure that a loop is run for: the yield, else the production; null where it has neither. */
export function leadFigure(figures: Readonly<Record<string, number>>): string | null {
  return ['overall_yield', 'production_t_d'].find((name) => figures[name]) ?? null;
}
