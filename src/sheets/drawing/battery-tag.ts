import type { Result } from '../../model/result.ts';
import type { DrawnNode, DrawnStream, Network } from './network.ts';
import { type BoxPort, type Ends, LINE_HEIGHT, NAME_WIDTH, type NodeBox } from './node-box.ts';
import { LINE, line, num, SMALL, text } from './svg.ts';
import { textWidth } from './text-width.ts';

/** A tag at the battery limit: a feed or what leaves, and what it mainly is. */
export function batteryBox(
  network: Network,
  node: DrawnNode,
  { entering, leaving }: Ends,
  result: Result,
  product: string | null,
): NodeBox {
  const stream = (node.kind === 'feed' ? leaving : entering)[0]!;
  const purges = result.figures.purge?.streams ?? [];
  const lost = purges.includes(stream.tag);
  // Where there are two they are told apart.
  const purge = purges.length > 1 ? `purge ${stream.tag}` : 'purge';
  const lines = [
    node.kind === 'feed' ? node.name : stream.tag === product ? 'product' : lost ? purge : 'outlet',
    mainly(stream),
  ];
  const words = Math.min(NAME_WIDTH, Math.max(...lines.map((each, k) => textWidth(each, SMALL, k === 0))));
  const [height, width] = [32, words + 28];
  const lane = network.lanes.find((each) => each.node === node.id)!;
  const port = (enters: boolean, each: DrawnStream): BoxPort => {
    const west = enters !== lane.outBackward;
    return { stream: each, enters, side: west ? 'W' : 'E', path: [{ x: west ? 0 : width, y: height / 2 }] };
  };
  const tag = outline(width, height);
  return {
    node,
    width,
    height,
    symbol: { x: 0, y: 0, width, height },
    svg: lane.outBackward ? `<g transform="translate(${num(width)} 0) scale(-1 1)">${tag}</g>` : tag,
    texts: lines.map((content, k) =>
      text(content, lane.outBackward ? width - 6 : 6, 13 + LINE_HEIGHT * k, {
        bold: k === 0,
        width: NAME_WIDTH,
        anchor: lane.outBackward ? 'end' : 'start',
      }),
    ),
    ports: [...entering.map((each) => port(true, each)), ...leaving.map((each) => port(false, each))],
  };
}

/** The component that a stream has most of. */
export function mainly({ state }: DrawnStream): string {
  const [id, part] = Object.entries(state.mole_fraction).reduce(
    (most, each) => (each[1] > most[1] ? each : most),
    ['', 0],
  );
  return id === '' ? 'no flow' : `${id} ${(100 * part).toFixed(1)} mol %`;
}

/** The outline of a tag; its point looks along the flow. */
function outline(width: number, height: number): string {
  const point = height / 2;
  return line(
    [
      { x: 0, y: 0 },
      { x: width - point, y: 0 },
      { x: width, y: height / 2 },
      { x: width - point, y: height },
      { x: 0, y: height },
      { x: 0, y: 0 },
    ],
    LINE,
  );
}
