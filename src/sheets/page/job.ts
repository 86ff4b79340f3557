import type { TitleBlock } from '../drawing/title-block.ts';
import { plainText } from '../plain.ts';
import { closingLine } from '../text.ts';
import type { JobField } from './document.ts';
import { type Html, html, userText } from './html.ts';
import type { PageView } from './view.ts';

/** The fields of the title block after ISO 7200; what only the user can fill in stays blank where it is not given. */
export function jobFields(view: PageView, fields: TitleBlock, version: string): JobField[] {
  const { flowsheet } = view;
  const given = (label: string, value: string | undefined, span: number): JobField => ({
    label,
    value: userText(value ?? ''),
    span,
  });
  const file = flowsheet.file.split(/[/\\]/).at(-1) ?? flowsheet.file;
  return [
    given('legal owner', fields.owner, 6),
    given('identification number', fields.number, 2),
    given('revision', fields.revision, 2),
    given('date of issue', fields.date, 2),
    given('creator', fields.creator, 3),
    given('approval person', fields.approver, 3),
    given('flowsheet file', file, 3),
    { label: 'worked out by', value: `Looptally ${version}`.trim(), span: 3 },
    { label: 'status', value: statusText(view), span: 2, name: 'status' },
    { label: 'case', value: caseText(view, new Map()), span: 4, name: 'case' },
    { label: 'closing', value: closingText(view), span: 6, name: 'closing' },
  ];
}

/** @param moves  settings that were moved in the page, by path: a sheet must tell what it is a sheet of */
export function caseText(
  { flowsheet }: Pick<PageView, 'flowsheet'>,
  moves: ReadonlyMap<string, string>,
): Html {
  const moved = [...moves].map(([path, text]) => `${path} = ${text}`).join(', ');
  return html`${userText(flowsheet.caseName ?? 'as in the file')}${
    moved === '' ? null : html`; <mark>moved</mark> ${userText(moved)}`
  }`;
}

export const notClosedText = html`<strong class="alarm-word">NOT CLOSED</strong>`;

export function statusText({ result }: PageView): Html {
  return result.convergence.converged ? html`for study` : notClosedText;
}

export function closingText({ result, words }: PageView): string {
  return words(plainText(closingLine(result)));
}
