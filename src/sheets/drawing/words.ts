import type { Result } from '../../model/result.ts';
import { mainly } from './battery-tag.ts';
import { flagRows, pressureDecimals } from './flags.ts';
import { networkOf } from './network.ts';
import { blockWords } from './node-boxes.ts';

/** Key of a line of the k-th flag; the first line is the tag. */
export function flagWord(k: number): (line: number) => string {
  return (line) => `flag-${k}-${line}`;
}

/** Key of a line beside the k-th node; the first line is the name. */
export function nodeWord(k: number): (line: number) => string {
  return (line) => `node-${k}-${line}`;
}

/** The words of a drawing that follow the numbers, by their keys: what a page puts in where a loop is closed again. */
export function drawingWords(result: Result): Map<string, string> {
  const { nodes, lanes, streams } = networkOf(result);
  const words = new Map<string, string>();
  const decimals = pressureDecimals(streams.map(({ state }) => state.pressure_bar));
  streams.forEach(({ state }, k) => {
    flagRows(state, decimals).forEach((row, line) => {
      words.set(flagWord(k)(line + 1), row);
    });
  });
  nodes.forEach(({ name, block, id }, k) => {
    const stream = streams.find(({ from, to }) => lanes[from]!.node === id || lanes[to]!.node === id);
    const lines =
      block === null ? ['', ...(stream === undefined ? [] : [mainly(stream)])] : blockWords(name, block);
    lines.slice(1).forEach((line, l) => {
      words.set(nodeWord(k)(l + 1), line);
    });
  });
  return words;
}
