import type { DrawnStream, Network } from './network.ts';

/** What the flow turns round at: the way there is drawn left to right, the way back right to left. */
const TURNS = new Set(['condenser', 'reactor', 'kinetic_bed']);

/**
 * Decide which streams lead back (depth first from the feeds, in the order of the file) and which lanes are drawn from
 * right to left. A recycle so drawn is a ring, as the trade draws it, and not a row with a long line above it; and what
 * comes back to an exchanger that it has passed comes back from ahead.
 */
export function giveDirections(network: Network): void {
  const { lanes, nodes, streams } = network;
  const leaving = lanes.map((): DrawnStream[] => []);
  const entering = lanes.map((): DrawnStream[] => []);
  for (const stream of streams) {
    leaving[stream.from]!.push(stream);
    entering[stream.to]!.push(stream);
  }
  const returns = markBack(network, leaving);
  const kindOf = (lane: number): string => nodes[lanes[lane]!.node]!.kind;

  /** The lanes before a stream, nearest first, up to where the flow turns round; and the lane it turns at. */
  function wayBefore(last: DrawnStream): { way: number[]; turn: number } {
    const way: number[] = [];
    let stream = last;
    for (;;) {
      const lane = stream.from;
      const parts = kindOf(lane) === 'separator' && (stream.fromPort === 'rest' || stream.fromPort === '');
      const isTurn = TURNS.has(kindOf(lane)) || parts || lane === last.to || lanes[lane]!.outBackward;
      if (isTurn || lanes[lane]!.inBackward || way.includes(lane)) return { way, turn: lane };
      way.push(lane);
      const [before, ...more] = entering[lane]!.filter((each) => each.loop || !last.loop);
      if (before === undefined || more.length > 0) return { way, turn: lane };
      stream = before;
    }
  }

  const turnBack = (lane: number): void => {
    lanes[lane]!.inBackward = true;
    lanes[lane]!.outBackward = true;
  };

  for (const stream of returns) {
    // What has gone through one side of an exchanger comes to the other from ahead, and leaves it forward again.
    for (const lane of wayBefore(stream).way)
      if (lanes[lane]!.node !== lanes[stream.to]!.node) turnBack(lane);
    lanes[stream.to]!.inBackward = true;
  }
  for (const back of streams) {
    if (!back.back) continue;
    const { way, turn } = wayBefore(back);
    // Without a vessel that parts gas from liquid the way back begins behind the first divider.
    const divider = way.findIndex((lane) => kindOf(lane) === 'splitter');
    const parts = ['condenser', 'separator'].includes(kindOf(turn)) || lanes[turn]!.outBackward;
    for (const lane of parts || divider < 0 ? way : way.slice(0, divider)) {
      turnBack(lane);
      lanes[lane]!.returning = true;
    }
  }
  turnWhatFollows(network, leaving, entering);
}

/** What a backward block hands straight on is drawn backward too, as far as the battery limit. */
function turnWhatFollows(network: Network, leaving: DrawnStream[][], entering: DrawnStream[][]): void {
  const { lanes } = network;
  const pending = lanes.flatMap((lane, index) => (lane.outBackward ? [index] : []));
  for (let lane = pending.pop(); lane !== undefined; lane = pending.pop()) {
    for (const stream of leaving[lane]!) {
      const next = lanes[stream.to]!;
      const straight = stream.fromPort === '' || stream.fromPort === 'rest' || stream.fromPort === 'out';
      if (!straight || stream.loop || next.inBackward || entering[stream.to]!.length > 1) continue;
      if (lanes.some((each) => each !== next && each.node === next.node)) continue;
      next.inBackward = true;
      next.outBackward = true;
      pending.push(stream.to);
    }
  }
}

/**
 * Mark the streams that lead back to a lane they come from. Hands back those that come to the second side of a block
 * whose first side they have passed.
 */
function markBack({ lanes, nodes }: Network, leaving: DrawnStream[][]): DrawnStream[] {
  const returns: DrawnStream[] = [];
  const entered = new Set<number>();
  const open = new Set<number>();
  const starts = lanes.map((_, lane) => lane);
  const isFeed = (lane: number): boolean => nodes[lanes[lane]!.node]!.kind === 'feed';
  const path: { lane: number; next: number }[] = [];
  const enter = (lane: number): void => {
    entered.add(lane);
    open.add(lane);
    path.push({ lane, next: 0 });
  };
  for (const start of [...starts.filter(isFeed), ...starts]) {
    if (entered.has(start)) continue;
    enter(start);
    while (path.length > 0) {
      const top = path.at(-1)!;
      const stream = leaving[top.lane]![top.next++];
      if (stream === undefined) {
        open.delete(top.lane);
        path.pop();
      } else if (!entered.has(stream.to)) {
        const { node } = lanes[stream.to]!;
        if (path.some(({ lane }) => lanes[lane]!.node === node)) returns.push(stream);
        enter(stream.to);
      } else if (open.has(stream.to)) stream.back = true;
    }
  }
  return returns;
}
