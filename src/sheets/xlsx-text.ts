import { plainText } from './plain.ts';

/** What a cell of a workbook can hold, in UTF-16 units; a longer text makes a spreadsheet call the file damaged. */
const LONGEST_CELL = 32_767;
const CUT = ' ... (cut: a cell holds no more)';

/**
 * Text of the user's as a cell can hold it: one line without control characters, halves of characters made good, cut
 * where it is too long.
 */
export function cellText(text: string): string {
  const plain = plainText(text)
    .replace(/[\ufffe\uffff]/g, '')
    .replace(/[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g, '\ufffd');
  if (plain.length <= LONGEST_CELL) return plain;
  return plain.slice(0, LONGEST_CELL - CUT.length).replace(/[\ud800-\udbff]$/, '') + CUT;
}

/** Text that a spreadsheet would take for a formula, were it typed in. */
export function looksLikeFormula(text: string): boolean {
  return /^[=+\-@\uff1d\uff0b\uff0d\uff20]/.test(text);
}

/** Text for XML; what would read as an escaped character of the format (_x0041_) is escaped itself. */
export function xmlText(text: string): string {
  return text
    .replace(/_(?=x[0-9A-Fa-f]{4}_)/g, '_x005F_')
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;');
}
