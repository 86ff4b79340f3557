/**
 * Widths of the printable ASCII characters from the blank on, in thousandths of the size of the letters: those of
 * Helvetica and its metric twins.
 *
 * @source Adobe Font Metrics of the Helvetica family, from memory
 */
const WIDTHS = [
  278, 278, 355, 556, 556, 889, 667, 191, 333, 333, 389, 584, 278, 333, 278, 278, 556, 556, 556, 556, 556,
  556, 556, 556, 556, 556, 278, 278, 584, 584, 584, 556, 1015, 667, 667, 722, 722, 667, 611, 778, 722, 278,
  500, 667, 556, 833, 722, 778, 667, 778, 722, 667, 611, 722, 667, 944, 667, 667, 611, 278, 278, 278, 469,
  556, 333, 556, 556, 500, 556, 556, 278, 556, 556, 222, 222, 500, 222, 833, 556, 556, 556, 556, 333, 500,
  278, 556, 500, 722, 500, 500, 500, 334, 260, 334, 584,
];
/** What we write ourselves beyond ASCII. */
const OTHERS: Readonly<Record<string, number>> = {
  '°': 400,
  '…': 1000,
  '·': 278,
  '−': 584,
  é: 556,
  '–': 556,
};
const UNKNOWN = 1100;
/** Room for a reader's machine that has none of the named faces and takes a wider one. */
const REGULAR = 1.16;
const BOLD = 1.27;

/** Width of a text, in the unit of `size`, and not less on any usual machine. */
export function textWidth(text: string, size: number, bold = false): number {
  let thousandths = 0;
  for (const character of text) thousandths += widthOf(character) ?? UNKNOWN;
  return (thousandths / 1000) * size * (bold ? BOLD : REGULAR);
}

/** Is every width known? Where one is not, a drawing must hold the text to its estimate. */
export function isMeasured(text: string): boolean {
  return [...text].every((character) => widthOf(character) !== undefined);
}

/** The text itself, or as much of it as fits and an ellipsis. */
export function clipped(text: string, width: number, size: number, bold = false): string {
  // Whatever its letters, more than a few hundred fit nowhere.
  const characters = [...text.slice(0, 2000)];
  if (characters.length === [...text.slice(0, 2001)].length && textWidth(text, size, bold) <= width)
    return text;
  let kept = '';
  for (const character of characters) {
    if (textWidth(`${kept}${character}…`, size, bold) > width) break;
    kept += character;
  }
  return `${kept.trimEnd()}…`;
}

function widthOf(character: string): number | undefined {
  const code = character.codePointAt(0)! - 32;
  return code >= 0 && code < WIDTHS.length ? WIDTHS[code] : OTHERS[character];
}
