/**
 * Text of the user's made safe for a terminal or a page: control characters (escape sequences among them)
 * and the marks that turn the direction of writing are taken out, line breaks become spaces.
 */
export function plainText(text: string): string {
  return text
    .replace(/[\t\n\v\f\r\u0085\u2028\u2029]+/gu, ' ')
    .replace(/[\p{Cc}\u200b-\u200f\u202a-\u202e\u2060-\u2069\ufeff\ufff9-\ufffb]/gu, '')
    .trim();
}

/**
 * Text broken at blanks into lines of at most `width` characters; `first` starts the first line, `later` the others.
 * No-break spaces hold words together and come out as blanks.
 */
export function wrapped(text: string, width: number, first = '', later = ''): string[] {
  const lines: string[] = [];
  let line = first;
  let empty = true;
  for (const word of text.split(/ +/)) {
    if (!empty && [...line].length + 1 + [...word].length > width) {
      lines.push(line);
      line = later + word;
    } else {
      line += empty ? word : ` ${word}`;
    }
    empty = false;
  }
  lines.push(line);
  return lines.map((each) => each.replaceAll('\u00a0', ' '));
}
