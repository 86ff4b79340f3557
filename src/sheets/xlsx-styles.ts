import type { Style } from './xlsx-model.ts';
import { xmlText } from './xlsx-text.ts';

/** The table of styles of a workbook: cells carry numbers into it. */
export interface StyleTable {
  /** number of a style; `guarded` keeps text that begins like a formula text when a reader edits its cell */
  indexOf(style: Style, guarded: boolean): number;
  xml(): string;
}

/** Numbers below 164 belong to formats that every spreadsheet has built in. */
const FIRST_FORMAT = 164;

/** Collects the styles that a workbook uses, in the order of their first use. */
export function createStyleTable(): StyleTable {
  const formats = createList();
  const fonts = createList();
  const fills = createList(['<fill><patternFill patternType="none"/></fill>', GREY_FILL]);
  const borders = createList([border()]);
  const cells = createList();
  fonts.indexOf(font({}));
  const indexOf = (style: Style, guarded: boolean) => {
    const format = style.format === undefined ? 0 : FIRST_FORMAT + formats.indexOf(style.format);
    return cells.indexOf(
      `<xf numFmtId="${format}" fontId="${fonts.indexOf(font(style))}" fillId="${fillOf(style)}" ` +
        `borderId="${borders.indexOf(border(style.line))}" xfId="0" applyNumberFormat="1" applyFont="1" ` +
        `applyFill="1" applyBorder="1" applyAlignment="1"${guarded ? ' quotePrefix="1"' : ''}>${alignment(style)}</xf>`,
    );
  };
  const fillOf = ({ fill }: Style) =>
    fill === undefined
      ? 0
      : fills.indexOf(
          `<fill><patternFill patternType="solid"><fgColor rgb="FF${fill}"/><bgColor indexed="64"/></patternFill></fill>`,
        );
  indexOf({}, false);
  return {
    indexOf,
    xml: () =>
      '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n' +
      '<styleSheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">' +
      counted(
        'numFmts',
        formats.items.map(
          (code, k) => `<numFmt numFmtId="${FIRST_FORMAT + k}" formatCode="${xmlText(code)}"/>`,
        ),
      ) +
      counted('fonts', fonts.items) +
      counted('fills', fills.items) +
      counted('borders', borders.items) +
      '<cellStyleXfs count="1"><xf numFmtId="0" fontId="0" fillId="0" borderId="0"/></cellStyleXfs>' +
      counted('cellXfs', cells.items) +
      '<cellStyles count="1"><cellStyle name="Normal" xfId="0" builtinId="0"/></cellStyles>' +
      '</styleSheet>',
  };
}

const GREY_FILL = '<fill><patternFill patternType="gray125"/></fill>';

function font({ bold, italic, size = 11, colour }: Style): string {
  return (
    `<font>${bold ? '<b/>' : ''}${italic ? '<i/>' : ''}<sz val="${size}"/>` +
    `${colour === undefined ? '' : `<color rgb="FF${colour}"/>`}<name val="Calibri"/><family val="2"/></font>`
  );
}

function border(line?: Style['line']): string {
  const side = (name: string, here: boolean) =>
    here ? `<${name} style="thin"><color auto="1"/></${name}>` : `<${name}/>`;
  return `<border><left/><right/>${side('top', line === 'above')}${side('bottom', line === 'below')}<diagonal/></border>`;
}

function alignment({ side, indent, wrap }: Style): string {
  const across = indent ? ' horizontal="left" indent="1"' : side === undefined ? '' : ` horizontal="${side}"`;
  return `<alignment${across} vertical="top"${wrap ? ' wrapText="1"' : ''}/>`;
}

function counted(name: string, items: readonly string[]): string {
  return items.length === 0 ? '' : `<${name} count="${items.length}">${items.join('')}</${name}>`;
}

/** Distinct items in the order of their first use. */
function createList(first: readonly string[] = []) {
  const items = [...first];
  const numbers = new Map(items.map((item, k) => [item, k]));
  return {
    items,
    indexOf(item: string): number {
      const known = numbers.get(item);
      if (known !== undefined) return known;
      numbers.set(item, items.length);
      return items.push(item) - 1;
    },
  };
}
