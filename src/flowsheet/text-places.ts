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
  const lineEnds: number[] = [];
  for (const match of text.matchAll(/\r\n|\r|\n/g)) {
    lineEnds.push(match.index);
    lineStarts.push(match.index + match[0].length);
  }
  lineEnds.push(text.length);
  // A line may be as long as the file and hold a hundred thousand values: its end is looked for once.
  const writtenEnds = new Map<number, number>();
  const writtenEnd = (line: number): number => {
    let end = writtenEnds.get(line);
    if (end === undefined) {
      end = lineStarts[line] + text.slice(lineStarts[line], lineEnds[line]).trimEnd().length;
      writtenEnds.set(line, end);
    }
    return end;
  };
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
    return {
      file,
      line: line + 1,
      column: from - lineStarts[line] + 1,
      length: Math.max(1, Math.min(end, lineEnds[line]) - from),
    };
  };
  return {
    between,
    at: (offset, length) => between(offset, offset + length),
    toLineEnd: (start) => between(start, writtenEnd(lineOf(start))),
  };
}
