import {
  at,
  type BlockSymbol,
  type Connection,
  circle,
  type Side,
  type SymbolOrder,
  type SymbolPort,
} from './symbol-parts.ts';

/** Lines that meet. The single end has its side to itself, the others take the sides that are left. */
export function junction({ inlets, outlets, flipped }: SymbolOrder, joins: boolean): BlockSymbol {
  const many = joins ? inlets : outlets;
  if (many.length > 3 || many.filter(({ turned }) => turned).length > 2) return bar(inlets, outlets);
  const r = 4;
  const ports: Readonly<Record<Side, SymbolPort>> = {
    W: at('W', 0, r),
    E: at('E', 2 * r, r),
    N: at('N', r, 0),
    S: at('S', r, 2 * r),
  };
  const along: Side = joins ? 'W' : 'E';
  const placed = new Map<Connection, SymbolPort>();
  const free: Side[] = [along, 'N', 'S'];
  const take = (connection: Connection, wishes: readonly Side[]): void => {
    const side = wishes.find((each) => free.includes(each)) ?? along;
    free.splice(free.indexOf(side), 1);
    placed.set(connection, ports[side]);
  };
  const byFlow = [...many].sort((a, b) => b.flow - a.flow);
  // The main stream goes straight on; what turns back goes over the top.
  const turned = byFlow.filter((each) => each.turned);
  const straight = byFlow.filter((each) => !each.turned);
  const main = straight.find(({ port }) => port === 'rest') ?? straight[0];
  if (main !== undefined) take(main, flipped && !joins ? ['N'] : [along]);
  const ways: Side[] = joins !== flipped ? ['S', 'N'] : ['N', 'S'];
  if (flipped && !joins) ways.unshift(along);
  for (const each of turned) take(each, ['N', 'S', along]);
  for (const each of straight) if (each !== main) take(each, ways);
  return {
    width: 2 * r,
    height: 2 * r,
    svg: joins ? `<circle cx="${r}" cy="${r}" r="${r}" fill="#000"/>` : circle(r, r, r),
    inlets: inlets.map((each) => placed.get(each) ?? ports.W),
    outlets: outlets.map((each) => placed.get(each) ?? ports.E),
  };
}

function bar(inlets: readonly Connection[], outlets: readonly Connection[]): BlockSymbol {
  const count = Math.max(inlets.length, outlets.length);
  const height = 16 * count;
  const places = (ends: readonly Connection[], side: Side, x: number): SymbolPort[] =>
    ends.map((_, k) => at(side, x, (height * (k + 0.5)) / ends.length));
  return {
    width: 6,
    height,
    svg: `<path d="M0 0H6V${height}H0Z" fill="#000"/>`,
    inlets: places(inlets, 'W', 0),
    outlets: places(outlets, 'E', 6),
  };
}
