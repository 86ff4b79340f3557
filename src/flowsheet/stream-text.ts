import type { Fault } from './findings.ts';

/** An end of a stream as written: `condenser.gas`; offset and length inside the text. */
export interface StreamEnd {
  readonly name: string;
  readonly port: string | null;
  readonly offset: number;
  readonly length: number;
}

export interface StreamText {
  readonly from: StreamEnd;
  readonly to: StreamEnd;
}

/** Read `makeup -> mixer` or `condenser.gas -> purge`. */
export function parseStream(text: string): StreamText | { readonly fault: Fault } {
  const arrow = text.indexOf('->');
  if (arrow < 0 || text.indexOf('->', arrow + 2) >= 0) {
    const why = arrow < 0 ? 'there is no arrow -> in it' : 'there is more than one arrow -> in it';
    return { fault: unreadable(text, why) };
  }
  const from = parseEnd(text, 0, arrow);
  const to = parseEnd(text, arrow + 2, text.length);
  if (from === null) return { fault: unreadable(text, 'before the arrow stands no feed or block') };
  if (to === null) return { fault: unreadable(text, 'after the arrow stands no block, and not out') };
  return { from, to };
}

function parseEnd(text: string, start: number, end: number): StreamEnd | null {
  const part = text.slice(start, end);
  const match = /^(\s*)([A-Za-z][A-Za-z0-9_]*)(?:\.([A-Za-z][A-Za-z0-9_]*))?\s*$/.exec(part);
  if (match === null) return null;
  const [, blank, name, port] = match;
  return { name, port: port ?? null, offset: start + blank.length, length: part.trim().length };
}

function unreadable(text: string, why: string): Fault {
  const shown = text.length > 60 ? `${text.slice(0, 60)}...` : text;
  return {
    code: 'bad-stream',
    what: `"${shown}" is no stream.`,
    why,
    mend: 'write it as in condenser.gas -> purge: from -> to, a port after a dot, out for the battery limit',
  };
}
