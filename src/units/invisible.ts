/** A character that cannot be seen where it stands. */
export interface Invisible {
  readonly character: string;
  readonly offset: number;
  /** as in U+00A0 (no-break space) */
  readonly name: string;
}

const names: Readonly<Record<string, string>> = {
  '\u0085': 'next line',
  '\u00a0': 'no-break space',
  '\u00ad': 'soft hyphen',
  '\u200b': 'zero-width space',
  '\u2028': 'line separator',
  '\u2029': 'paragraph separator',
  '\u202e': 'right-to-left override',
  '\ufeff': 'byte-order mark',
};

/** The first character of a text that looks like nothing or like a blank and is no plain blank, tab or line end. */
export function invisibleIn(text: string): Invisible | null {
  const found = /[^\S \t\r\n]|[\p{Cc}\p{Cf}\p{Zl}\p{Zp}](?<![\t\r\n])/u.exec(text);
  if (found === null) return null;
  const code = `U+${found[0].codePointAt(0)!.toString(16).toUpperCase().padStart(4, '0')}`;
  const name = names[found[0]];
  return { character: found[0], offset: found.index, name: name === undefined ? code : `${code} (${name})` };
}
