import { strongComponents } from '../graph/strong-components.ts';
import type { StreamSpec } from '../model/flowsheet.ts';

/** Tags of the streams that lie in a loop of blocks: from where they lead, there is a way back to where they begin. */
export function streamsInLoops(streams: readonly StreamSpec[]): ReadonlySet<string> {
  const numbers = new Map<string, number>();
  const numberOf = (name: string): number => {
    const number = numbers.get(name) ?? numbers.size;
    numbers.set(name, number);
    return number;
  };
  const inside = streams.flatMap(({ tag, from, to }) =>
    to === null ? [] : [{ tag, source: numberOf(from.name), target: numberOf(to.name) }],
  );
  const { of } = strongComponents(
    numbers.size,
    Int32Array.from(inside, ({ source }) => source),
    Int32Array.from(inside, ({ target }) => target),
  );
  return new Set(inside.filter(({ source, target }) => of[source] === of[target]).map(({ tag }) => tag));
}
