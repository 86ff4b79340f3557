import { builtInIds } from '../properties/components.ts';
import { nearest } from '../units/nearest.ts';
import { splitQuantity } from '../units/quantity.ts';
import type { UsageFault } from './refusal.ts';

/** `N2=1,H2=3` as moles by component; what is wrong with it is added to `faults`. */
export function parseFeed(text: string, faults: UsageFault[]): Map<string, number> {
  const feed = new Map<string, number>();
  const before = faults.length;
  let offset = 0;
  for (const part of text.split(',')) {
    const place = {
      at: text,
      offset: offset + part.length - part.trimStart().length,
      length: part.trim().length,
    };
    offset += part.length + 1;
    const fault = readPart(part.trim(), feed);
    if (fault !== null) faults.push({ ...fault, ...place });
  }
  const total = [...feed.values()].reduce((sum, amount) => sum + amount, 0);
  if (faults.length === before && total <= 0) {
    faults.push({
      code: 'empty-feed',
      what: 'The feed is empty.',
      why: 'all its amounts are 0',
      mend: EXAMPLE,
      at: text,
    });
  }
  return feed;
}

const EXAMPLE = "write it like --feed 'N2=1,H2=3'";

function readPart(part: string, feed: Map<string, number>): Omit<UsageFault, 'at'> | null {
  const [, id, number] = /^([^=\s]+)\s*=\s*(.+)$/.exec(part) ?? [];
  if (id === undefined || number === undefined) {
    const shown = part === '' ? 'An amount of the feed is empty.' : `The feed cannot be read at ${part}.`;
    return {
      code: 'bad-feed',
      what: shown,
      why: 'each amount is a component, = and a number',
      mend: EXAMPLE,
    };
  }
  const read = splitQuantity(number);
  const amount = read?.unit === '' ? read.number : Number.NaN;
  if (!(amount >= 0)) {
    return {
      code: 'bad-feed',
      what: `The amount of ${id} cannot be ${number}.`,
      why: 'amounts are numbers of moles, 0 or more, without a unit',
      mend: EXAMPLE,
    };
  }
  if (!builtInIds.includes(id)) {
    const near = nearest(id, builtInIds);
    return {
      code: 'unknown-component',
      what: `There is no component ${id}.`,
      why:
        near === null
          ? 'looptally data lists the built-in components'
          : `the nearest known component is ${near}`,
      mend: near === null ? 'name a built-in component' : `write ${near}`,
    };
  }
  if (feed.has(id)) {
    return {
      code: 'bad-feed',
      what: `${id} is fed twice.`,
      why: 'one amount for each component',
      mend: 'add the two up',
    };
  }
  feed.set(id, amount);
  return null;
}
