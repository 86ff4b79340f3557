import type { DrawnNode, DrawnStream } from './network.ts';
import type { Box, PlacedText, Point } from './svg.ts';
import type { Side } from './symbol-parts.ts';

/** Where a stream enters or leaves the box of a node: the way from the symbol to the edge of the box. */
export interface BoxPort {
  readonly stream: DrawnStream;
  readonly enters: boolean;
  readonly side: Side;
  readonly path: readonly Point[];
}

/** A node with its symbol, its words and its ports; origin at the upper left corner of the box. */
export interface NodeBox {
  readonly node: DrawnNode;
  readonly width: number;
  readonly height: number;
  readonly symbol: Box;
  readonly svg: string;
  readonly texts: readonly PlacedText[];
  readonly ports: readonly BoxPort[];
}

/** The widest name beside a symbol; more is clipped. */
export const NAME_WIDTH = 150;
export const LINE_HEIGHT = 12;

/** The streams of a node. */
export interface Ends {
  readonly entering: readonly DrawnStream[];
  readonly leaving: readonly DrawnStream[];
}
