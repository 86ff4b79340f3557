import {
  at,
  type BlockSymbol,
  circle,
  path,
  type SymbolOrder,
  type SymbolPort,
  thin,
} from './symbol-parts.ts';

/** Radius of the circle of a heat exchanger; that of a machine stands to it as 0.9 to 1. */
export const HEAT = 20;

/** Circle with the bent line of the process; cx, cy is its centre. */
export function heatCircle(cx: number, cy: number, r: number): string {
  const bent = `M${cx - r} ${cy}h${r / 2}l${r / 2} ${-r / 2}v${r}l${r / 2} ${-r / 2}h${r / 2}`;
  return circle(cx, cy, r) + path(bent);
}

/** The utility's thin line from below through the circle, with a small open head on top. */
export function utility(cx: number, cy: number, r: number): string {
  const top = cy - r - 9;
  return path(`M${cx} ${cy + r + 9}V${top}M${cx - 3} ${top + 6}L${cx} ${top}L${cx + 3} ${top + 6}`, thin);
}

export function heater({ inlets, outlets }: SymbolOrder): BlockSymbol {
  const cy = HEAT + 9;
  return {
    width: 2 * HEAT,
    height: 2 * cy,
    svg: heatCircle(HEAT, cy, HEAT) + utility(HEAT, cy, HEAT),
    inlets: inlets.map(() => at('W', 0, cy)),
    outlets: outlets.map(() => at('E', 2 * HEAT, cy)),
  };
}

export function exchanger({ inlets, outlets, bent, flipped }: SymbolOrder): BlockSymbol {
  const cx = HEAT + 12;
  const cy = HEAT + 16;
  const straight = (into: boolean, against: boolean): SymbolPort => {
    const above = into !== flipped;
    const y = above ? cy - HEAT : cy + HEAT;
    return at(into !== against ? 'W' : 'E', cx, y, { x: cx, y: above ? 2 : 2 * cy - 2 });
  };
  return {
    width: 2 * cx,
    height: 2 * cy,
    svg: heatCircle(cx, cy, HEAT) + path(`M${cx} ${cy - HEAT}v${2 * HEAT}`),
    inlets: inlets.map(({ port, against }) =>
      port === bent ? at('W', cx - HEAT, cy) : straight(true, against),
    ),
    outlets: outlets.map(({ port, against }) =>
      port === bent ? at('E', cx + HEAT, cy) : straight(false, against),
    ),
  };
}
