import type { StreamSpec } from '../model/flowsheet.ts';

/** The streams by the name of the feed or block that they begin at, each in the order of the file. */
export function bySource<Stream extends StreamSpec>(
  streams: readonly Stream[],
): ReadonlyMap<string, readonly Stream[]> {
  const found = new Map<string, Stream[]>();
  for (const stream of streams) {
    const beside = found.get(stream.from.name);
    if (beside === undefined) found.set(stream.from.name, [stream]);
    else beside.push(stream);
  }
  return found;
}
