import type { BlockResult, Result } from '../../model/result.ts';
import { significant } from '../numbers.ts';
import { batteryBox } from './battery-tag.ts';
import type { DrawnNode, DrawnStream, Network } from './network.ts';
import { type BoxPort, type Ends, LINE_HEIGHT, NAME_WIDTH, type NodeBox } from './node-box.ts';
import { num, type Point, text } from './svg.ts';
import type { BlockSymbol, Connection, Side, SymbolPort } from './symbol-parts.ts';
import { symbolOf } from './symbols.ts';

const LABEL_GAP = 5;
/** What is less is left over from differences of enthalpies. */
const NOISE_KW = 1e-6;

/** The box of every node, in their order. */
export function nodeBoxes(
  network: Network,
  result: Result,
  product: string | null,
  flipped: ReadonlySet<number>,
): NodeBox[] {
  const { lanes, nodes, streams } = network;
  const ends = nodes.map(() => ({ entering: [] as DrawnStream[], leaving: [] as DrawnStream[] }));
  for (const stream of streams) {
    ends[lanes[stream.from]!.node]!.leaving.push(stream);
    ends[lanes[stream.to]!.node]!.entering.push(stream);
  }
  return nodes.map((node) =>
    node.block === null
      ? batteryBox(network, node, ends[node.id]!, result, product)
      : blockBox(network, node, node.block, ends[node.id]!, flipped.has(node.id)),
  );
}

function blockBox(
  network: Network,
  node: DrawnNode,
  block: BlockResult,
  ends: Ends,
  flipped: boolean,
): NodeBox {
  const { entering, leaving } = ends;
  const { lanes } = network;
  const sides = lanes.filter((lane) => lane.node === node.id);
  // Lanes are met in the order of the file; the one with a turn in it is the one that is met again.
  const first = sides.find((lane) => !lane.inBackward && !lane.outBackward) ?? sides[0]!;
  const mirrored = first.outBackward;
  const connection = (stream: DrawnStream, enters: boolean): Connection => ({
    port: enters ? stream.toPort : stream.fromPort,
    turned: isTurned(network, stream, enters),
    against: (enters ? lanes[stream.to]!.inBackward : lanes[stream.from]!.outBackward) !== mirrored,
    liquid: stream.state.phase === 'liquid',
    flow: stream.state.flow_kmol_h,
  });
  const symbol = symbolOf({
    kind: node.kind,
    beds: bedsOf(block),
    inlets: entering.map((stream) => connection(stream, true)),
    outlets: leaving.map((stream) => connection(stream, false)),
    bent: first.side,
    flipped,
  });
  const ports = [
    ...symbol.inlets.map((port, k) => ({ port, stream: entering[k]!, enters: true })),
    ...symbol.outlets.map((port, k) => ({ port, stream: leaving[k]!, enters: false })),
  ].map(({ port, ...rest }) => ({ ...rest, ...(mirrored ? mirroredPort(port, symbol.width) : port) }));
  return withLabel(node, symbol, mirrored, ports, blockWords(node.name, block));
}

/** Does the stream come from ahead into a block drawn forward, or go back from one? */
function isTurned({ lanes }: Network, { from, to, back }: DrawnStream, enters: boolean): boolean {
  const [source, target] = [lanes[from]!.outBackward, lanes[to]!.inBackward];
  if (source === target) return back && !source;
  return enters ? source : target;
}

/** Puts the words where no stream leaves: above, below, or below and beside the stream that goes down. */
function withLabel(
  node: DrawnNode,
  symbol: BlockSymbol,
  mirrored: boolean,
  ports: readonly BoxPort[],
  lines: readonly string[],
): NodeBox {
  const { width, height } = symbol;
  const north = ports.some(({ side }) => side === 'N');
  const south = ports.find(({ side }) => side === 'S');
  const middle = { anchor: 'middle', x: width / 2 } as const;
  const room = LINE_HEIGHT * lines.length;
  const down = south?.path[0]?.x ?? 0;
  const spot = !north
    ? { ...middle, y: -LABEL_GAP - room }
    : south === undefined
      ? { ...middle, y: height + LABEL_GAP }
      : down > width / 2
        ? ({ anchor: 'end', x: down - 8, y: height + 2 } as const)
        : ({ anchor: 'start', x: down + 8, y: height + 2 } as const);
  const words = lines.map((content, k) =>
    text(content, spot.x, spot.y + LINE_HEIGHT * k + 9, {
      anchor: spot.anchor,
      bold: k === 0,
      width: NAME_WIDTH,
    }),
  );
  const left = Math.min(0, ...words.map(({ box }) => box.x));
  const top = Math.min(0, spot.y);
  const right = Math.max(width, ...words.map(({ box }) => box.x + box.width));
  const bottom = Math.max(height, spot.y + room);
  const turn = mirrored
    ? `translate(${num(width - left)} ${num(-top)}) scale(-1 1)`
    : `translate(${num(-left)} ${num(-top)})`;
  const edge: Record<Side, (last: Point) => Point> = {
    W: ({ y }) => ({ x: left, y }),
    E: ({ y }) => ({ x: right, y }),
    N: ({ x }) => ({ x, y: top }),
    S: ({ x }) => ({ x, y: bottom }),
  };
  return {
    node,
    width: right - left,
    height: bottom - top,
    symbol: { x: -left, y: -top, width, height },
    svg: `<g transform="${turn}">${symbol.svg}</g>`,
    texts: words.map((_, k) =>
      text(lines[k]!, spot.x - left, spot.y + LINE_HEIGHT * k + 9 - top, {
        anchor: spot.anchor,
        bold: k === 0,
        width: NAME_WIDTH,
      }),
    ),
    ports: ports.map((port) => ({
      ...port,
      path: [...port.path, edge[port.side](port.path.at(-1)!)].map(({ x, y }) => ({
        x: x - left,
        y: y - top,
      })),
    })),
  };
}

function mirroredPort({ side, path }: SymbolPort, width: number): SymbolPort {
  return {
    side: side === 'W' ? 'E' : side === 'E' ? 'W' : side,
    path: path.map(({ x, y }) => ({ x: width - x, y })),
  };
}

function bedsOf({ details }: BlockResult): number {
  const beds = details['beds'];
  return typeof beds === 'object' && beds !== null ? Object.keys(beds).length : 1;
}

/** What stands beside a block: its name, and what it takes or gives. */
export function blockWords(name: string, block: BlockResult): string[] {
  return [name, ...figureOf(block)];
}

/** What a block takes or gives, in a word and a figure; nothing where it is nothing. */
function figureOf({ duty_kW, power_kW, details }: BlockResult): string[] {
  const exchanged = details['exchanged_kW'];
  if (typeof exchanged === 'number') return [`exchanges ${energy(exchanged)}`];
  if (Math.abs(power_kW) > NOISE_KW) return [`${power_kW > 0 ? 'takes' : 'delivers'} ${energy(power_kW)}`];
  if (Math.abs(duty_kW) > NOISE_KW) return [`${duty_kW > 0 ? 'heating' : 'cooling'} ${energy(duty_kW)}`];
  return [];
}

function energy(kW: number): string {
  const size = Math.abs(kW);
  return size >= 1000 ? `${significant(size / 1000, 3)} MW` : `${significant(size, 3)} kW`;
}
