import { num, type Point, THIN_LINE } from './svg.ts';

export type Side = 'W' | 'E' | 'N' | 'S';

/** Where a stream meets a symbol, and the way from there to the outside. */
export interface SymbolPort {
  readonly side: Side;
  /** from the outline of the symbol outwards; the last point is led on straight to the side */
  readonly path: readonly Point[];
}

/** A stream end that a symbol has to find a place for. */
export interface Connection {
  readonly port: string;
  /** it comes from ahead into a block drawn forward, or goes back from one */
  readonly turned: boolean;
  /** of the right or left side, the one of its lane: along the flow of the block, or against it */
  readonly against: boolean;
  readonly liquid: boolean;
  readonly flow: number;
}

export interface SymbolOrder {
  readonly kind: string;
  readonly beds: number;
  readonly inlets: readonly Connection[];
  readonly outlets: readonly Connection[];
  /** port of the side that an exchanger shows as the bent line; the other is the straight one */
  readonly bent: string;
  /** streams that may leave upwards or downwards take the other way */
  readonly flipped: boolean;
}

export interface BlockSymbol {
  readonly width: number;
  readonly height: number;
  readonly svg: string;
  readonly inlets: readonly SymbolPort[];
  readonly outlets: readonly SymbolPort[];
}

export type Maker = (order: SymbolOrder) => BlockSymbol;

/** A port at a point of the outline, and points on its way outwards. */
export function at(side: Side, x: number, y: number, ...further: Point[]): SymbolPort {
  return { side, path: [{ x, y }, ...further] };
}

export function path(d: string, attributes = ''): string {
  return `<path d="${d}"${attributes === '' ? '' : ` ${attributes}`}/>`;
}

export function circle(x: number, y: number, r: number): string {
  return `<circle cx="${num(x)}" cy="${num(y)}" r="${num(r)}"/>`;
}

export const thin = `stroke-width="${THIN_LINE}"`;
export const dashed = `stroke-width="${THIN_LINE}" stroke-dasharray="4 2.5"`;
