import {
  at,
  type BlockSymbol,
  dashed,
  path,
  type Side,
  type SymbolOrder,
  type SymbolPort,
  thin,
} from './symbol-parts.ts';
import { HEAT, heatCircle, utility } from './symbols-heat.ts';

/** How far below its top a separator is entered; a whole number, so that lines go straight through. */
function shoulder(a: number): number {
  return Math.round(0.35 * a);
}

/** Pentagon on its point with the arrows of what goes on and what drops out; x, y is its upper left corner. */
function pentagon(x: number, y: number, a: number): string {
  const inner = y + shoulder(a);
  const head = `M${x + 0.2 * a} ${inner}h${0.6 * a}m-4 -2.5l4 2.5l-4 2.5`;
  const drop = `M${x + 0.5 * a} ${inner}v${0.45 * a}m-2.5 -4l2.5 4l2.5 -4`;
  return path(`M${x} ${y}h${a}v${a}l${-a / 2} ${a / 2}l${-a / 2} ${-a / 2}z`) + path(head + drop, thin);
}

export function condenser({ inlets, outlets }: SymbolOrder): BlockSymbol {
  const [cy, a, left] = [HEAT + 9, 32, 2 * HEAT + 12];
  const top = cy - shoulder(a);
  return {
    width: left + a,
    height: Math.max(2 * cy, top + 1.5 * a),
    svg:
      heatCircle(HEAT, cy, HEAT) +
      utility(HEAT, cy, HEAT) +
      path(`M${2 * HEAT} ${cy}h12`) +
      pentagon(left, top, a),
    inlets: inlets.map(() => at('W', 0, cy)),
    outlets: outlets.map(({ port, turned }) => {
      if (port === 'liquid') return at('S', left + a / 2, top + 1.5 * a);
      return turned ? at('N', left + a / 2, top) : at('E', left + a, cy);
    }),
  };
}

export function separator({ inlets, outlets, flipped }: SymbolOrder): BlockSymbol {
  const a = 36;
  const free: SymbolPort[] = [at('E', a, 24), at('E', a, 32), at('E', a, 5)];
  const taken = new Set<Side>();
  const take = (port: SymbolPort): SymbolPort => {
    taken.add(port.side);
    return port;
  };
  const [north, south, east] = [at('N', a / 2, 0), at('S', a / 2, 1.5 * a), at('E', a, shoulder(a))];
  return {
    width: a,
    height: 1.5 * a,
    svg: pentagon(0, 0, a),
    inlets: inlets.map(() => at('W', 0, shoulder(a))),
    outlets: outlets.map(({ port, turned, liquid }) => {
      if (port === 'rest' && !turned && !taken.has('E')) return take(east);
      if (!taken.has('N') && (turned || !(liquid || flipped))) return take(north);
      if (!taken.has('S')) return take(south);
      return free.shift() ?? east;
    }),
  };
}

export function flash({ inlets, outlets }: SymbolOrder): BlockSymbol {
  return {
    width: 36,
    height: 58,
    svg: path('M0 6Q18 -6 36 6V52Q18 64 0 52Z') + path('M0 38H36', dashed),
    inlets: inlets.map(() => at('W', 0, 22)),
    outlets: outlets.map(({ port }) => (port === 'liquid' ? at('S', 18, 58) : at('N', 18, 0))),
  };
}

export function fixedBeds({ beds, inlets, outlets }: SymbolOrder, grains: boolean): BlockSymbol {
  const count = Math.max(1, beds);
  const [width, gap, head] = [40, 12, 18];
  const bed = count === 1 ? 40 : 26;
  const height = 2 * head + count * bed + (count - 1) * gap;
  const shell = path(
    `M0 6Q${width / 2} -6 ${width} 6V${height - 6}Q${width / 2} ${height + 6} 0 ${height - 6}Z`,
  );
  const fields = Array.from({ length: count }, (_, k) => {
    const y = head + k * (bed + gap);
    const ends = path(`M0 ${y}H${width}M0 ${y + bed}H${width}`, dashed);
    return (
      ends +
      (grains ? catalyst(width, y, bed) : path(`M0 ${y}L${width} ${y + bed}M${width} ${y}L0 ${y + bed}`))
    );
  });
  return {
    width,
    height,
    svg: shell + fields.join(''),
    inlets: inlets.map(({ port }) => {
      const shot = Number(/^shot(\d+)$/.exec(port)?.[1] ?? 1);
      return at('W', 0, shot < 2 ? head / 2 + 3 : head + (shot - 1) * (bed + gap) - gap / 2);
    }),
    outlets: outlets.map(() => at('E', width, height - head / 2 - 3)),
  };
}

function catalyst(width: number, y: number, height: number): string {
  let dots = '';
  for (let row = 0; row < Math.floor(height / 8); row++)
    for (let x = row % 2 === 0 ? 6 : 10; x < width - 3; x += 8)
      dots += `M${x - 1.5} ${y + 5 + row * 8}a1.5 1.5 0 1 0 3 0a1.5 1.5 0 1 0 -3 0`;
  return path(dots, thin);
}

export function vessel({ inlets, outlets }: SymbolOrder): BlockSymbol {
  const height = Math.max(60, 14 * (Math.max(inlets.length, outlets.length) + 1));
  const spread = (count: number, k: number): number => (height * (k + 1)) / (count + 1);
  return {
    width: 40,
    height,
    svg: path(`M0 0H40V${height}H0Z`),
    inlets: inlets.map((_, k) => at('W', 0, spread(inlets.length, k))),
    outlets: outlets.map((_, k) => at('E', 40, spread(outlets.length, k))),
  };
}
