/** A bracket or quotation mark that is still open. */
export interface OpenMark {
  readonly mark: string;
  readonly position: number;
}

/**
 * The innermost bracket still open, or the quotation mark not closed on its line, before a position where the
 * parser gave up. A scan good enough to blame the right mark in a message; it knows nothing of block scalars.
 */
export function openMark(source: string, upTo: number): OpenMark | null {
  const open: OpenMark[] = [];
  let tokenStart = true;
  for (let i = 0; i < upTo && i < source.length; i++) {
    const c = source[i];
    if (c === '#' && (i === 0 || /\s/.test(source[i - 1]))) {
      i = endOfLine(source, i) - 1;
    } else if ((c === '"' || c === "'") && tokenStart) {
      const end = endOfQuote(source, i);
      if (end === null) return { mark: c, position: i };
      i = end;
      tokenStart = false;
    } else if ((c === '[' || c === '{') && (tokenStart || open.length > 0)) {
      open.push({ mark: c, position: i });
      tokenStart = true;
    } else if (c === ']' || c === '}') {
      open.pop();
      tokenStart = false;
    } else if (c === '\n' || c === '\r' || c === ',') tokenStart = true;
    else if ((c === ':' || c === '-') && /\s/.test(source[i + 1] ?? ' ')) tokenStart = true;
    else if (!/\s/.test(c)) tokenStart = false;
  }
  return open.at(-1) ?? null;
}

/** Index of the closing mark on the same line; null where there is none. */
function endOfQuote(source: string, start: number): number | null {
  const quote = source[start];
  for (let i = start + 1; i < source.length && source[i] !== '\n' && source[i] !== '\r'; i++) {
    if (quote === '"' && source[i] === '\\') i++;
    else if (source[i] === quote) {
      if (quote === "'" && source[i + 1] === "'") i++;
      else return i;
    }
  }
  return null;
}

function endOfLine(source: string, from: number): number {
  let end = from;
  while (end < source.length && source[end] !== '\n' && source[end] !== '\r') end++;
  return end;
}
