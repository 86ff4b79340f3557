import type { Place } from '../model/place.ts';

/** Turns offsets of a text into places; lines end with LF, CR or CRLF. */
export interface Placer {
  at(offset: number, length: number): Place;
  /** a place ends where its line ends */
  between(start: number, end: number): Place;
  toLineEnd(start: number): Place;
}

export function createPlacer(text: string, file: string): Placer {
  const lineStarts = [0];
  for (const match of text.matchAll(/\r\n|\r|\n/g)) lineStarts.push(match.index + match[0].length);
  const lineOf = (offset: number): number => {
    let [low, high] = [0, lineStarts.length - 1];
    while (low < high) {
      const middle = Math.ceil((low + high) / 2);
      if (lineStarts[middle] <= offset) low = middle;
      else high = middle - 1;
    }
    return low;
  };
  const between = (start: number, end: number): Place => {
    const from = Math.min(Math.max(start, 0), text.length);
    const line = lineOf(from);
    const lineEnd = endOfLine(text, from);
    return {
      file,
      line: line + 1,
      column: from - lineStarts[line] + 1,
      length: Math.max(1, Math.min(end, lineEnd) - from),
    };
  };
  return {
    between,
    at: (offset, length) => between(offset, offset + length),
    toLineEnd: (start) => between(start, start + text.slice(start, endOfLine(text, start)).trimEnd().length),
  };
}

function endOfLine(text: string, from: number): number {
  const found = text.slice(from).search(/[\r\n]/);
  return found < 0 ? text.length : from + found;
}
