import { escaped } from '../drawing/svg.ts';
import { plainText } from '../plain.ts';

/** Markup that is known to be safe: only this file makes it out of text. */
export class Html {
  readonly markup: string;
  constructor(markup: string) {
    this.markup = markup;
  }
}

/** What may stand in a template: text (escaped), markup, numbers of the page's own, lists of these, or nothing. */
export type Part = Html | string | number | null | readonly Part[];

/**
 * A template whose texts are escaped and whose markup is kept: html`<b>${title}</b>`. Attributes stand in double
 * quotes. The page's policy forbids style attributes; write a class.
 */
export function html(strings: TemplateStringsArray, ...parts: readonly Part[]): Html {
  let markup = strings[0]!;
  parts.forEach((part, k) => {
    markup += markupOf(part) + strings[k + 1]!;
  });
  return new Html(markup);
}

/** Markup from a renderer of our own that has escaped its texts, such as a drawing. */
export function ownMarkup(markup: string): Html {
  return new Html(markup);
}

/** Text as HTML takes it, in content and in attributes; control characters and marks of direction are taken out. */
export function escapeHtml(text: string): string {
  // A blank at either end of a piece of text may be what parts it from its neighbour.
  return escaped(plainText(`|${text}|`).slice(1, -1));
}

/** Text of the user's in a run of its own, so that writing from right to left turns nothing about around it. */
export function userText(text: string): Html {
  return html`<bdi>${text}</bdi>`;
}

/** A name or path that may be broken behind its dots and dashes, and nowhere else if that is enough. */
export function nameText(name: string): Html {
  return html`<bdi>${joined(
    escapeHtml(name)
      .split(/(?<=[._])/)
      .map((piece) => new Html(piece)),
    '<wbr>',
  )}</bdi>`;
}

export function joined(parts: readonly Part[], between = ''): Html {
  return new Html(parts.map(markupOf).join(between));
}

function markupOf(part: Part): string {
  if (part === null) return '';
  if (part instanceof Html) return part.markup;
  if (typeof part === 'string') return escapeHtml(part);
  if (typeof part === 'number') return String(part);
  return part.map(markupOf).join('');
}
