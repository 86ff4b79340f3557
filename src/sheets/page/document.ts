import { type Html, html, joined, ownMarkup, type Part } from './html.ts';
import { sha256Base64 } from './sha256.ts';
import { pageStyle } from './style.ts';

/** A field of the title block; an empty value is left blank, to be filled in by hand. */
export interface JobField {
  readonly label: string;
  readonly value: Part;
  /** columns of twelve that the field takes */
  readonly span: number;
  /** name by which a script finds the value */
  readonly name?: string;
}

export interface PageSection {
  /** of the section, for links: letters and dashes */
  readonly id: string;
  readonly heading: string;
  readonly html: Html;
  /** where true the section begins on a new sheet of paper */
  readonly newSheet?: boolean;
  /** further classes */
  readonly mark?: string;
}

export interface PageParts {
  readonly title: string;
  /** what the sheet is, over the title: calculation sheet, sweep, ... */
  readonly document: string;
  readonly job: readonly JobField[];
  /** what stands above the numbered sections, e.g. a word that the loop did not close */
  readonly lead?: Html;
  /** settings that can be moved, beside the sheet on a wide screen */
  readonly panel?: Html;
  readonly sections: readonly PageSection[];
  /** CSS after our own */
  readonly style?: string;
  /** JavaScript that brings the page to life */
  readonly script?: string;
  /** what the script needs, found as JSON in #looptally-data */
  readonly data?: unknown;
}

/**
 * One HTML file that needs nothing else: no network, no frame, no style attribute. Its content security policy names
 * the one style and the one script by their hashes; nothing else may run, and nothing may be evaluated from text.
 *
 * @throws Error where the script or the style would end its own element, which is a fault of ours
 */
export function pageDocument(parts: PageParts): string {
  const style = pageStyle + (parts.style ?? '');
  const script = parts.script ?? '';
  if (/<\/script|<!--/i.test(script) || /<\/style/i.test(style))
    throw new Error('a script or style of the page would end its element');
  const policy = [
    `default-src 'none'`,
    `style-src 'sha256-${sha256Base64(style)}'`,
    `script-src ${script === '' ? `'none'` : `'sha256-${sha256Base64(script)}'`}`,
    `img-src data:`,
    `base-uri 'none'`,
    `form-action 'none'`,
  ].join('; ');
  return [
    '<!doctype html>',
    '<html lang="en">',
    '<head>',
    '<meta charset="utf-8">',
    `<meta http-equiv="Content-Security-Policy" content="${policy}">`,
    '<meta name="viewport" content="width=device-width, initial-scale=1">',
    '<meta name="color-scheme" content="light dark">',
    '<meta name="generator" content="Looptally">',
    html`<title>${parts.title}</title>`.markup,
    `<style>${style}</style>`,
    '</head>',
    '<body>',
    '<a class="skip" href="#sheet">To the sheet</a>',
    html`<div class="desk${parts.panel === undefined ? '' : ' with-panel'}">`.markup,
    titleBlock(parts).markup,
    ...(parts.panel === undefined ? [] : [parts.panel.markup]),
    '<main id="sheet" tabindex="-1">',
    ...(parts.lead === undefined ? [] : [parts.lead.markup]),
    joined(parts.sections.map(section)).markup,
    '</main>',
    '</div>',
    ...(parts.data === undefined
      ? []
      : [`<script type="application/json" id="looptally-data">${dataText(parts.data)}</script>`]),
    ...(script === '' ? [] : [`<script>${script}</script>`]),
    '</body>',
    '</html>',
    '',
  ].join('\n');
}

/** The title block after ISO 7200, at the head of the sheet. */
function titleBlock({ title, document, job }: PageParts): Html {
  return html`<header class="title-block"><div class="name"><p class="document">${document}</p><h1><bdi>${title}</bdi></h1></div><dl class="job">${job.map(
    ({ label, value, span, name }) =>
      html`<div class="s${span}"><dt>${label}</dt><dd${name === undefined ? null : html` data-job="${name}"`}>${value}</dd></div>`,
  )}</dl></header>`;
}

function section({ id, heading, html: body, newSheet, mark }: PageSection, index: number): Html {
  const classes = [...(newSheet ? ['new-sheet'] : []), ...(mark === undefined ? [] : [mark])].join(' ');
  return html`<section id="${id}" class="${classes}" aria-labelledby="${id}-head"><h2 id="${id}-head"><span class="no">${index + 1}</span>${heading}</h2><div class="body" data-part="${id}">${body}</div></section>
`;
}

/** JSON in which nothing can be read as markup. */
function dataText(data: unknown): string {
  return JSON.stringify(data)
    .replace(/</g, '\\u003c')
    .replace(/\u2028/g, '\\u2028')
    .replace(/\u2029/g, '\\u2029');
}

/** A drawing or chart with its words for those who do not see it. */
export function figure(svg: string, label: string, caption: Part = null): Html {
  return html`<figure><div class="scroll" role="region" aria-label="${label}" tabindex="0"><div class="picture" role="img" aria-label="${label}">${ownMarkup(svg)}</div></div>${
    caption === null ? null : html`<figcaption>${caption}</figcaption>`
  }</figure>`;
}
