import { Html, html, joined, nameText, type Part, userText } from './html.ts';

/** A cell of a table: text stands to the left, a number to the right. */
export interface Cell {
  readonly content: Part;
  readonly kind: 'text' | 'number' | 'head' | 'unit';
  /** a cell over several columns */
  readonly span?: number;
  /** further classes */
  readonly mark?: string;
}

/** How a number that was written with a point is shown: in a browser, in the format of its language. */
export type NumberWords = (text: string) => string;

/** As in files: a decimal point, no marks between thousands. */
export const asInFiles: NumberWords = (text) => text;

export function textCell(content: string | Html): Cell {
  return { content: content instanceof Html ? content : userText(content), kind: 'text' };
}

/** A number that has been written with a point, e.g. by `significant` of sheets/numbers. */
export function numberCell(written: string, words: NumberWords = asInFiles): Cell {
  return { content: words(written), kind: 'number' };
}

export function unitCell(unit: string): Cell {
  return { content: unit, kind: 'unit' };
}

/** The head of a row. */
export function headCell(content: string | Html): Cell {
  return { content: content instanceof Html ? content : nameText(content), kind: 'head' };
}

export interface TableParts {
  /** read out by a screen reader, shown where `showCaption` is set */
  readonly caption: string;
  readonly showCaption?: boolean;
  /** heads of the columns; a head that begins with a number kind stands to the right */
  readonly heads: readonly { readonly text: string | Html; readonly right?: boolean }[];
  readonly rows: readonly (readonly Cell[])[];
  readonly foot?: readonly (readonly Cell[])[];
  readonly mark?: string;
}

/** A table in a frame of its own that scrolls where the screen is narrow, so that the page never does. */
export function table({ caption, showCaption = false, heads, rows, foot, mark = '' }: TableParts): Html {
  const head =
    heads.length === 0
      ? null
      : html`<thead><tr>${heads.map(
          ({ text, right }) => html`<th scope="col"${right ? RIGHT : null}>${text}</th>`,
        )}</tr></thead>`;
  return html`<div class="scroll" role="region" aria-label="${caption}" tabindex="0"><table class="${mark}"><caption${
    showCaption ? null : HIDDEN
  }>${caption}</caption>${head}<tbody>${lines(rows)}</tbody>${
    foot === undefined ? null : html`<tfoot>${lines(foot)}</tfoot>`
  }</table></div>`;
}

function lines(rows: readonly (readonly Cell[])[]): Html {
  return joined(rows.map((row) => html`<tr>${row.map(cellMarkup)}</tr>`));
}

const RIGHT = new Html(' class="r"');
const HIDDEN = new Html(' class="unseen"');

function cellMarkup({ content, kind, span, mark }: Cell): Html {
  const classes = [kind === 'number' ? 'r' : kind === 'unit' ? 'u' : '', mark ?? ''].filter((c) => c !== '');
  const attributes = [
    ...(classes.length === 0 ? [] : [html` class="${classes.join(' ')}"`]),
    ...(span === undefined ? [] : [html` colspan="${span}"`]),
  ];
  return kind === 'head'
    ? html`<th scope="row"${attributes}>${content}</th>`
    : html`<td${attributes}>${content}</td>`;
}

/** Statements of a name and what is to be said of it. */
export function definitions(rows: readonly (readonly [term: Part, text: Part])[]): Html {
  return html`<dl>${rows.map(([term, text]) => html`<div><dt>${term}</dt><dd>${text}</dd></div>`)}</dl>`;
}

/** Sentences one below the other. */
export function bulletList(items: readonly Part[], mark = ''): Html {
  return html`<ul class="${mark}">${items.map((item) => html`<li>${item}</li>`)}</ul>`;
}
