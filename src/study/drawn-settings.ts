import type { Feed, Flowsheet } from '../model/flowsheet.ts';

/** Which settings of a plant are moved for a row of drawn values, and to what. */
export interface DrawnSettings {
  /** paths of all that is moved: what is spread, and the parts of a feed that make room for it */
  readonly paths: readonly string[];
  /**
   * @param drawn  one value per spread
   * @param out  written: one per path
   * @returns why the row cannot be, '' where it can
   */
  fill(drawn: ArrayLike<number>, out: Float64Array): string;
}

/** One feed whose composition is spread. */
interface SpreadFeed {
  readonly name: string;
  /** sum of all parts as the file has them, and of those that are not spread */
  readonly whole: number;
  readonly rest: number;
  /** numbers of the spreads */
  readonly spread: readonly number[];
  /** where the other parts stand among the paths, and their values in the file */
  readonly first: number;
  readonly others: readonly number[];
}

/**
 * A part of a composition that is spread keeps its drawn share of the whole: the parts of the feed that are not spread
 * make room for it in the proportions of the file. With parts out of 100 a drawn 0.4 of argon is 0.4 % of that feed. Where
 * every part is spread nothing can make room, and the parts are normalised as any composition is.
 */
export function createDrawnSettings(flowsheet: Flowsheet, spreadPaths: readonly string[]): DrawnSettings {
  const ids = flowsheet.components.map(({ id }) => id);
  const paths = [...spreadPaths];
  const feeds = flowsheet.feeds.flatMap((feed): SpreadFeed[] => {
    const spread = spreadPaths.flatMap((path, k) => (partOf(path, feed, ids) === null ? [] : [k]));
    if (spread.length === 0) return [];
    const own = spread.map((k) => partOf(spreadPaths[k], feed, ids)!);
    const others = ids.flatMap((_, i) => (feed.parts[i] > 0 && !own.includes(i) ? [i] : []));
    const first = paths.length;
    for (const i of others) paths.push(`${feed.name}.composition.${ids[i]}`);
    return [
      {
        name: feed.name,
        whole: feed.parts.reduce((sum, part) => sum + part, 0),
        rest: others.reduce((sum, i) => sum + feed.parts[i], 0),
        spread,
        first,
        others: others.map((i) => feed.parts[i]),
      },
    ];
  });
  return {
    paths,
    fill(drawn, out) {
      for (let k = 0; k < spreadPaths.length; k++) out[k] = drawn[k];
      for (const { name, whole, rest, spread, first, others } of feeds) {
        if (others.length === 0) continue;
        let taken = 0;
        for (const k of spread) taken += drawn[k];
        if (taken >= whole) return `the parts drawn for feed ${name} leave nothing for the rest of it`;
        for (let i = 0; i < others.length; i++) out[first + i] = (others[i] * (whole - taken)) / rest;
      }
      return '';
    },
  };
}

/** Number of the component whose part of this feed's composition a path names. */
function partOf(path: string, feed: Feed, ids: readonly string[]): number | null {
  const lead = `${feed.name}.composition.`;
  if (!path.startsWith(lead)) return null;
  const i = ids.indexOf(path.slice(lead.length));
  return i < 0 ? null : i;
}
