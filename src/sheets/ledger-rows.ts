import type { Result } from '../model/result.ts';
import { closureText, decimalsFor, fixed } from './numbers.ts';
import { plainText } from './plain.ts';

/** The ledger in kmol/h: heads, then one row per component with what came in, formed, was consumed and went out. */
export function ledgerRows(result: Result): string[][] {
  const exits = exitTags(result);
  const entries = Object.entries(result.ledger);
  const values = entries.map(([, entry]) => [
    entry.in,
    entry.formed,
    entry.consumed,
    ...exits.map((tag) => entry.out[tag] ?? 0),
  ]);
  const largest = values.flat().reduce((size, value) => Math.max(size, Math.abs(value)), 0);
  const decimals = decimalsFor([largest], 6, 2, 4);
  return [
    ['component', 'in', 'formed', 'consumed', ...exits.map((tag) => `out ${plainText(tag)}`), 'closure'],
    ...entries.map(([id, entry], index) => [
      id,
      ...values[index]!.map((value) => fixed(value, decimals, 1e-14 * largest)),
      closureText(entry.closure),
    ]),
  ];
}

/** Tags of the streams that leave over the battery limit, in the order of the ledger. */
export function exitTags(result: Result): string[] {
  const tags = new Set<string>();
  for (const entry of Object.values(result.ledger)) for (const tag of Object.keys(entry.out)) tags.add(tag);
  return [...tags];
}
