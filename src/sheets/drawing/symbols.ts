/**
 * The symbols of the drawing, after ISO 10628-2:2012 (item numbers of that standard; geometry from descriptions of it,
 * drawn anew here). x runs along the flow, y down; a block on the way back of a recycle is mirrored left to right, never
 * up to down, so that what gravity parts stays parted.
 *
 * - `compressor`: compressor (general), 16.1
 * - `pump`: pump (general), 15.1
 * - `expander`: turbine (general), 20.1
 * - `valve`: valve (general), 21.1
 * - `heater`: heat exchanger (general), 3.1, its utility as a thin line
 * - `exchanger`: heat exchanger (general), 3.1: the side that the flow meets first is the bent line
 * - `condenser`: heat exchanger (general), 3.1, joined to a separator, 8.1
 * - `flash`: vessel with dished ends, 1.5, with a level
 * - `separator`: separator (general), 8.1
 * - `reactor`: column with fixed bed, 2.4; one field of diagonals per bed
 * - `kinetic_bed`: the same with packing drawn as grains: this one knows its catalyst
 * - `mixer`, `splitter`: the standard has no symbol for a plain junction, lines meet: at a full dot where streams join
 *   and at a ring where one divides, at a bar where there are many
 * - any other kind: vessel (general), 1.1
 *
 * Ends at the battery limit are pointed tags of our own.
 */
import { MAIN_LINE, num } from './svg.ts';
import { at, type BlockSymbol, circle, type Maker, path, type SymbolOrder } from './symbol-parts.ts';
import { exchanger, heater } from './symbols-heat.ts';
import { junction } from './symbols-junction.ts';
import { condenser, fixedBeds, flash, separator, vessel } from './symbols-vessel.ts';

const MACHINE = 18;

/** The symbol of a block with a place for each of its streams. */
export function symbolOf(order: SymbolOrder): BlockSymbol {
  return (makers[order.kind] ?? vessel)(order);
}

/** The kinds that have a symbol of their own. */
export function drawnKinds(): string[] {
  return Object.keys(makers);
}

const makers: Readonly<Record<string, Maker>> = {
  mixer: (order) => junction(order, true),
  splitter: (order) => junction(order, false),
  reactor: (order) => fixedBeds(order, false),
  kinetic_bed: (order) => fixedBeds(order, true),
  condenser,
  flash,
  heater,
  exchanger,
  compressor: (order) =>
    machine(order, [
      [-0.52, 0.84, 0.85, 0.49],
      [-0.52, -0.84, 0.85, -0.49],
    ]),
  pump: (order) =>
    machine(order, [
      [0, 1, 1, 0],
      [0, -1, 1, 0],
    ]),
  expander,
  valve,
  separator,
};

function machine({ inlets, outlets }: SymbolOrder, chords: readonly (readonly number[])[]): BlockSymbol {
  const r = MACHINE;
  const lines = chords.map(([x1, y1, x2, y2]) =>
    [x1, y1, x2, y2].map((each) => num(r + r * each!)).join(' '),
  );
  return {
    width: 2 * r,
    height: 2 * r,
    svg: circle(r, r, r) + lines.map((each) => path(`M${each.replace(/^(\S+ \S+) /, '$1L')}`)).join(''),
    inlets: inlets.map(() => at('W', 0, r)),
    outlets: outlets.map(({ port }) => (port === 'condensate' ? at('S', r, 2 * r) : at('E', 2 * r, r))),
  };
}

function expander({ inlets, outlets }: SymbolOrder): BlockSymbol {
  return {
    width: 38,
    height: 42,
    svg: path('M0 14L30 0V42L0 28Z') + path('M30 21H38', `stroke-width="${MAIN_LINE}"`),
    inlets: inlets.map(() => at('W', 0, 21)),
    outlets: outlets.map(() => at('E', 30, 35)),
  };
}

function valve({ inlets, outlets }: SymbolOrder): BlockSymbol {
  return {
    width: 28,
    height: 14,
    svg: path('M0 0L28 14V0L0 14Z'),
    inlets: inlets.map(() => at('W', 0, 7)),
    outlets: outlets.map(() => at('E', 28, 7)),
  };
}
