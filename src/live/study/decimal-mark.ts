/** Decimal mark of the reader's language; a file always has a point. */
const MARK =
  new Intl.NumberFormat(undefined, { numberingSystem: 'latn' })
    .formatToParts(0.5)
    .find(({ type }) => type === 'decimal')?.value ?? '.';

/** A number with the digits that it was written with, and the reader's decimal mark. */
export function localText(written: string): string {
  return written.replace(/(\d)\.(\d)/, `$1${MARK}$2`);
}

/** A number of six digits. */
export function localNumber(value: number): string {
  return localText(String(Number(value.toPrecision(6))));
}

const NUMBER = /^[-+]?\d+\.\d+(e[-+]?\d+)?( %)?$/;

/** Write the numbers of tables and charts as the reader does; everything else stays as it is. */
export function writeLocalNumbers(): void {
  if (MARK === '.') return;
  for (const cell of document.querySelectorAll('td.r, text[data-number]')) {
    const text = cell.textContent;
    if (text !== null && NUMBER.test(text)) cell.textContent = localText(text);
  }
}
