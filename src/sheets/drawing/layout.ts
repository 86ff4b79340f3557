import type { ElkExtendedEdge, ElkNode } from 'elkjs';
import type { Flag } from './flags.ts';
import type { DrawnStream, Network } from './network.ts';
import type { NodeBox } from './node-box.ts';
import type { Point } from './svg.ts';

export interface Layout {
  readonly width: number;
  readonly height: number;
  /** upper left corner of the box of each node */
  readonly nodes: readonly Point[];
  /** the line of each stream, symbol to symbol in the direction of flow */
  readonly lines: readonly (readonly Point[])[];
  /** upper left corner of the flag of each stream */
  readonly flags: readonly Point[];
}

const OPTIONS: Readonly<Record<string, string>> = {
  'elk.algorithm': 'layered',
  'elk.direction': 'RIGHT',
  'elk.edgeRouting': 'ORTHOGONAL',
  'elk.layered.thoroughness': '40',
  'elk.layered.nodePlacement.strategy': 'NETWORK_SIMPLEX',
  'elk.layered.nodePlacement.favorStraightEdges': 'true',
  'elk.layered.unnecessaryBendpoints': 'true',
  'elk.layered.edgeLabels.sideSelection': 'ALWAYS_UP',
  'elk.layered.spacing.nodeNodeBetweenLayers': '16',
  'elk.layered.spacing.edgeNodeBetweenLayers': '12',
  'elk.layered.spacing.edgeEdgeBetweenLayers': '12',
  'elk.spacing.nodeNode': '34',
  'elk.spacing.edgeNode': '18',
  'elk.spacing.edgeEdge': '16',
  'elk.spacing.edgeLabel': '4',
  'elk.spacing.labelNode': '8',
  'elk.spacing.componentComponent': '60',
};
const SIDES = { W: 'WEST', E: 'EAST', N: 'NORTH', S: 'SOUTH' } as const;

/**
 * Places of nodes, lines and flags by the layered method of elkjs, loaded when first needed and run in this thread.
 * The same network and seed give the same places.
 *
 * @source K. Sugiyama, S. Tagawa & M. Toda, IEEE Trans. Syst. Man Cybern. 11 (1981) 109-125, as elkjs carries it out
 */
export async function layOut(
  network: Network,
  boxes: readonly NodeBox[],
  flags: readonly Flag[],
  seed: number,
): Promise<Layout> {
  const { default: Elk } = await import('elkjs/lib/elk.bundled.js');
  const { streams, lanes } = network;
  const index = new Map(streams.map((stream, k) => [stream, k]));
  const portId = (stream: DrawnStream, enters: boolean): string =>
    `${enters ? 'i' : 'o'}${index.get(stream)}`;
  const graph: ElkNode = {
    id: 'sheet',
    layoutOptions: { ...OPTIONS, 'elk.randomSeed': String(seed) },
    children: boxes.map((box, k) => ({
      id: `n${k}`,
      width: box.width,
      height: box.height,
      layoutOptions: { 'elk.portConstraints': 'FIXED_POS' },
      ports: box.ports.map(({ stream, enters, side, path }) => ({
        id: portId(stream, enters),
        ...path.at(-1)!,
        width: 0,
        height: 0,
        layoutOptions: { 'elk.port.side': SIDES[side] },
      })),
    })),
    edges: streams.map((stream, k) => {
      const ends = [portId(stream, false), portId(stream, true)];
      // What flows to the left is laid out as if it flowed to the right, and turned about afterwards.
      if (isReversed(stream, lanes)) ends.reverse();
      return {
        id: `e${k}`,
        sources: [ends[0]!],
        targets: [ends[1]!],
        labels: [{ text: String(k), width: flags[k]!.width, height: flags[k]!.height }],
      };
    }),
  };
  const done = await new Elk().layout(graph);
  const corner = ({ x = 0, y = 0 }: Partial<Point>): Point => ({ x, y });
  const nodes = (done.children ?? []).map(corner);
  const portOf = (stream: DrawnStream, enters: boolean): Point[] => {
    const node = lanes[enters ? stream.to : stream.from]!.node;
    const port = boxes[node]!.ports.find((each) => each.stream === stream && each.enters === enters)!;
    return port.path.map(({ x, y }) => ({ x: x + nodes[node]!.x, y: y + nodes[node]!.y }));
  };
  return {
    width: done.width ?? 0,
    height: done.height ?? 0,
    nodes,
    lines: streams.map((stream, k) => {
      const routed = routeOf(done.edges![k]!);
      if (isReversed(stream, lanes)) routed.reverse();
      return withoutStops([...portOf(stream, false), ...routed, ...portOf(stream, true).reverse()]);
    }),
    flags: streams.map((_, k) => corner(done.edges![k]!.labels![0]!)),
  };
}

function isReversed(stream: DrawnStream, lanes: Network['lanes']): boolean {
  const [source, target] = [lanes[stream.from]!.outBackward, lanes[stream.to]!.inBackward];
  // From ahead back to what comes first, whichever end is the one that is turned.
  if (source !== target) return stream.loop || stream.back || target;
  return source || (stream.back && stream.from !== stream.to);
}

function routeOf(edge: ElkExtendedEdge): Point[] {
  return (edge.sections ?? []).flatMap(({ startPoint, bendPoints = [], endPoint }) => [
    startPoint,
    ...bendPoints,
    endPoint,
  ]);
}

/** The same line without points at which it does not turn. */
function withoutStops(points: readonly Point[]): Point[] {
  const kept: Point[] = [];
  for (const point of points) {
    const last = kept.at(-1);
    if (last !== undefined && same(last.x, point.x) && same(last.y, point.y)) continue;
    const before = kept.at(-2);
    if (before !== undefined && last !== undefined) {
      const upright = same(before.x, last.x) && same(last.x, point.x);
      const level = same(before.y, last.y) && same(last.y, point.y);
      if (upright || level) kept.pop();
    }
    kept.push(point);
  }
  return kept;
}

function same(a: number, b: number): boolean {
  return Math.abs(a - b) < 0.01;
}
