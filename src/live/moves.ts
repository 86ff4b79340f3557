/** Settings that were moved in the page: the value as it would be written in the file, by the path of the setting. */
export type Moves = ReadonlyMap<string, string>;

/** Moves as the fragment of a link, in their order; empty where there are none. */
export function fragmentOf(moves: Moves): string {
  return [...moves]
    .map(([path, text]) => `${encodeURIComponent(path)}=${encodeURIComponent(text)}`)
    .join('&');
}

/**
 * The moves that a fragment asks for, without its #. What is no `path=value`, or cannot be decoded, is left out and
 * handed back to be told.
 */
export function movesOf(fragment: string): { readonly moves: Moves; readonly strangers: readonly string[] } {
  const moves = new Map<string, string>();
  const strangers: string[] = [];
  for (const piece of fragment.split('&')) {
    if (piece === '') continue;
    const at = piece.indexOf('=');
    const path = at < 0 ? null : decoded(piece.slice(0, at));
    const text = at < 0 ? null : decoded(piece.slice(at + 1));
    if (path === null || text === null || path === '' || text.trim() === '') strangers.push(piece);
    else moves.set(path, text.trim());
  }
  return { moves, strangers };
}

/** The moves as `--set` takes them. */
export function setTexts(moves: Moves): string[] {
  return [...moves].map(([path, text]) => `${path}=${text}`);
}

function decoded(text: string): string | null {
  try {
    return decodeURIComponent(text);
  } catch {
    return null;
  }
}
