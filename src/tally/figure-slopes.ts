import { figureLeaves } from './figure-leaves.ts';
import type { LinearClosure } from './linear-closure.ts';
import type { Plant } from './plant.ts';
import { type Probe, quotient } from './probe.ts';
import { figuresOf } from './tally.ts';

/** Relative step of a tear variable [-]. */
const STEP = 1e-4;
/** A change below this share of a figure is rounding [-]. */
const ROUNDING = 1e-13;

/** The figures of a closed plant and how they answer to its tears. */
export interface FigureResponse {
  readonly base: ReadonlyMap<string, number>;
  /** what a change of a figure is measured against: the figure, for duties and powers the largest heat */
  size(figure: string): number;
  /** by figure: d figure/d tear, the settings as they stand */
  readonly byTear: ReadonlyMap<string, Float64Array>;
}

/** One pass of the whole plant each side of every tear. @throws PassTrouble */
export function figureResponse(plant: Plant, closure: LinearClosure): FigureResponse {
  const base = figureLeaves(figuresOf(plant));
  const x = closure.x.slice();
  const g = new Float64Array(closure.size);
  const byTear = new Map([...base.keys()].map((name) => [name, new Float64Array(closure.size)]));
  const at = (j: number, value: number) => {
    x[j] = value;
    closure.pass(x, g);
    return figureLeaves(figuresOf(plant));
  };
  for (let j = 0; j < closure.size; j++) {
    const x0 = closure.x[j];
    const h = STEP * closure.scale[j];
    const side = x0 > h ? 'both' : 'up';
    const one = at(j, x0 + h);
    const other = at(j, side === 'both' ? x0 - h : x0 + 2 * h);
    x[j] = x0;
    for (const [name, f0] of base)
      byTear.get(name)![j] = quotient(side, f0, of(one, name), of(other, name), h);
  }
  // Duties and powers are differences of the heat that flows about, and as noisy.
  let heat = 0;
  for (const [name, value] of base) if (name.startsWith('duty_kW')) heat = Math.max(heat, Math.abs(value));
  const perTonne = heat * Math.abs(of(base, 'specific_power_kWh_t') / of(base, 'power_kW.total')) || 0;
  const sizes = new Map(
    [...base].map(([name, value]) => {
      const noisy = isHeat(name) ? heat : name === 'specific_power_kWh_t' ? perTonne : 0;
      return [name, Math.max(Math.abs(value), noisy)];
    }),
  );
  return { base, size: (name) => sizes.get(name)!, byTear };
}

/** Slopes of the figures by a probe, with what moving the tears by `more` per unit of the setting adds. */
export function slopesOf(
  probe: Probe,
  { base, size, byTear }: FigureResponse,
  more: Float64Array,
): ReadonlyMap<string, number> {
  const slopes = new Map<string, number>();
  for (const [name, f0] of base) {
    let slope = quotient(probe.side, f0, of(probe.figures[0], name), of(probe.figures[1], name), probe.h);
    const row = byTear.get(name)!;
    for (let j = 0; j < more.length; j++) slope += row[j] * more[j];
    slopes.set(name, Math.abs(slope) * probe.h <= ROUNDING * size(name) ? 0 : slope);
  }
  return slopes;
}

function isHeat(figure: string): boolean {
  return /^(duty|power)_kW/.test(figure);
}

/** A duty or power of nothing is left out of the figures. */
function of(figures: ReadonlyMap<string, number>, name: string): number {
  return figures.get(name) ?? 0;
}
