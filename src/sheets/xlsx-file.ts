import { strToU8, zipSync } from 'fflate';
import { address, type Book, type Cell, columnName, type Page } from './xlsx-model.ts';
import { createStyleTable, type StyleTable } from './xlsx-styles.ts';
import { cellText, looksLikeFormula, xmlText } from './xlsx-text.ts';

const HEAD = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n';
const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const OFFICE = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const PACKAGE = 'http://schemas.openxmlformats.org/package/2006';
const KIND = 'application/vnd.openxmlformats-officedocument.spreadsheetml';
/** The same for every file and every time zone, so that the same book gives the same bytes. */
const FILE_TIME = '1980-01-01T12:00:00';
/** Code of the paper size A3. */
const A3 = 8;

/**
 * The bytes of a workbook: numbers with the value and the formula, text in place, so that no text can become a formula.
 *
 * @source format: ECMA-376, Office Open XML, part 1 (SpreadsheetML) and part 2 (packaging)
 */
export function workbookBytes(book: Book): Uint8Array {
  const styles = createStyleTable();
  const parts: Record<string, string> = {
    '[Content_Types].xml': contentTypes(book),
    '_rels/.rels': relationships([['officeDocument', 'xl/workbook.xml']]),
    'xl/workbook.xml': workbook(book),
    'xl/_rels/workbook.xml.rels': relationships([
      ...book.pages.map((_, k): [string, string] => ['worksheet', `worksheets/sheet${k + 1}.xml`]),
      ['styles', 'styles.xml'],
    ]),
    ...Object.fromEntries(
      book.pages.map((page, k) => [`xl/worksheets/sheet${k + 1}.xml`, worksheet(page, styles)]),
    ),
    'xl/styles.xml': styles.xml(),
  };
  return zipSync(Object.fromEntries(Object.entries(parts).map(([name, text]) => [name, strToU8(text)])), {
    mtime: FILE_TIME,
  });
}

function contentTypes({ pages }: Book): string {
  const part = (name: string, kind: string) =>
    `<Override PartName="/xl/${name}" ContentType="${KIND}.${kind}+xml"/>`;
  return (
    `${HEAD}<Types xmlns="${PACKAGE}/content-types">` +
    `<Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/>` +
    `<Default Extension="xml" ContentType="application/xml"/>` +
    part('workbook.xml', 'sheet.main') +
    pages.map((_, k) => part(`worksheets/sheet${k + 1}.xml`, 'worksheet')).join('') +
    part('styles.xml', 'styles') +
    '</Types>'
  );
}

function relationships(targets: readonly (readonly [type: string, target: string])[]): string {
  const lines = targets.map(
    ([type, target], k) => `<Relationship Id="rId${k + 1}" Type="${OFFICE}/${type}" Target="${target}"/>`,
  );
  return `${HEAD}<Relationships xmlns="${PACKAGE}/relationships">${lines.join('')}</Relationships>`;
}

function workbook({ pages, names }: Book): string {
  const sheets = pages.map((page, k) => `<sheet name="${page.name}" sheetId="${k + 1}" r:id="rId${k + 1}"/>`);
  const titles = pages.map(
    (page, k) => `<definedName name="_xlnm.Print_Titles" localSheetId="${k}">${repeated(page)}</definedName>`,
  );
  const cells = [...names].map(([name, reference]) => {
    const absolute = reference.replace(/([A-Z]+)(\d+)$/, '$$$1$$$2');
    return `<definedName name="${name}">${absolute}</definedName>`;
  });
  return (
    `${HEAD}<workbook xmlns="${MAIN}" xmlns:r="${OFFICE}">` +
    `<sheets>${sheets.join('')}</sheets>` +
    `<definedNames>${[...titles, ...cells].join('')}</definedNames>` +
    '<calcPr calcId="0" fullCalcOnLoad="1"/></workbook>'
  );
}

/** The rows and columns printed on every page. */
function repeated({ name, frozenRows, frozenColumns }: Page): string {
  const rows = `${name}!$1:$${frozenRows}`;
  return frozenColumns === 0 ? rows : `${name}!$A:$${columnName(frozenColumns - 1)},${rows}`;
}

function worksheet(page: Page, styles: StyleTable): string {
  const { widths, rows, merged, heights } = page;
  const last = Math.max(widths.length, ...rows.map((row) => row.length)) - 1;
  const lines = rows.map((row, r) => {
    const height = heights.get(r);
    const tall = height === undefined ? '' : ` ht="${height}" customHeight="1"`;
    return `<row r="${r + 1}"${tall}>${row.map((cell, c) => cellXml(cell, address(r, c), styles)).join('')}</row>`;
  });
  const columns = widths.map(
    (width, c) => `<col min="${c + 1}" max="${c + 1}" width="${width}" customWidth="1"/>`,
  );
  return (
    `${HEAD}<worksheet xmlns="${MAIN}">` +
    '<sheetPr><pageSetUpPr fitToPage="1"/></sheetPr>' +
    `<dimension ref="A1:${address(rows.length - 1, last)}"/>` +
    `<sheetViews><sheetView showGridLines="0" workbookViewId="0">${pane(page)}</sheetView></sheetViews>` +
    `<sheetFormatPr defaultRowHeight="15"/><cols>${columns.join('')}</cols>` +
    `<sheetData>${lines.join('')}</sheetData>` +
    `<mergeCells count="${merged.length}">${merged.map((r) => `<mergeCell ref="${address(r, 0)}:${address(r, last)}"/>`).join('')}</mergeCells>` +
    '<pageMargins left="0.4" right="0.4" top="0.5" bottom="0.6" header="0.3" footer="0.3"/>' +
    `<pageSetup paperSize="${A3}" orientation="landscape" fitToWidth="1" fitToHeight="0"/>` +
    '<headerFooter><oddFooter>&amp;LA study tool, not a design certificate&amp;C&amp;A&amp;RPage &amp;P of &amp;N</oddFooter></headerFooter>' +
    '</worksheet>'
  );
}

function pane({ frozenRows, frozenColumns }: Page): string {
  const across = frozenColumns === 0 ? '' : ` xSplit="${frozenColumns}"`;
  const active = frozenColumns === 0 ? 'bottomLeft' : 'bottomRight';
  const first = address(frozenRows, frozenColumns);
  return `<pane${across} ySplit="${frozenRows}" topLeftCell="${first}" activePane="${active}" state="frozen"/><selection pane="${active}" activeCell="${first}" sqref="${first}"/>`;
}

function cellXml(cell: Cell, at: string, styles: StyleTable): string {
  if (cell === null) return '';
  if ('text' in cell) {
    const text = cellText(cell.text);
    const style = styles.indexOf(cell.style ?? {}, looksLikeFormula(text));
    if (text === '') return `<c r="${at}" s="${style}"/>`;
    return `<c r="${at}" s="${style}" t="inlineStr"><is><t xml:space="preserve">${xmlText(text)}</t></is></c>`;
  }
  const style = styles.indexOf(cell.style ?? {}, false);
  const formula = cell.formula === undefined ? '' : `<f>${xmlText(cell.formula)}</f>`;
  return `<c r="${at}" s="${style}">${formula}<v>${cell.value === 0 ? 0 : cell.value}</v></c>`;
}
