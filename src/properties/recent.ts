/** Something worked out at two numbers, e.g. a temperature and a pressure. */
export interface Kept {
  first: number;
  second: number;
  /** it was come back to after another */
  spared: boolean;
}

/**
 * The last few of what is worked out at two numbers. A pass round a loop comes back to the same few states, with those
 * of a search between them: what was come back to is spared once when room is made (the clock rule).
 *
 * @param most  how many are kept
 * @param room  makes an empty one, as long as there are fewer
 * @param fill  works one out; `first` and `second` are set
 * @returns a function of the two numbers; what it gives is overwritten some calls later
 */
export function keepRecent<Entry extends Kept>(
  most: number,
  room: () => Entry,
  fill: (entry: Entry) => void,
): (first: number, second: number) => Entry {
  const kept: Entry[] = [];
  let latest: Entry | null = null;
  let hand = 0;

  function next(): Entry {
    if (kept.length < most) {
      const entry = room();
      kept.push(entry);
      return entry;
    }
    while (kept[hand].spared) {
      kept[hand].spared = false;
      hand = (hand + 1) % most;
    }
    const entry = kept[hand];
    hand = (hand + 1) % most;
    return entry;
  }

  return (first, second) => {
    if (latest !== null && latest.first === first && latest.second === second) return latest;
    for (let k = 0; k < kept.length; k++) {
      if (kept[k].first !== first || kept[k].second !== second) continue;
      latest = kept[k];
      latest.spared = true;
      return latest;
    }
    latest = next();
    latest.first = first;
    latest.second = second;
    fill(latest);
    return latest;
  };
}
