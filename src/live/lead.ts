import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { html, userText } from '../sheets/page/html.ts';

/** Say above the sheet what is wrong with it, in the four parts of a message; nothing where all is well. */
export function tellAbove(head: string, diagnostics: readonly Diagnostic[]): void {
  const lead = document.querySelector('#lead')!;
  lead.innerHTML =
    head === ''
      ? ''
      : html`<div class="alarm" role="alert"><p><strong>${head}</strong></p>${diagnostics.map(
          ({ where, code, what, why, mend }) =>
            html`<p>${userText(what)} <span class="u">[${code}, ${where.file}:${where.line}]</span><br>why: ${userText(why)}<br>mend: ${userText(mend)}</p>`,
        )}</div>`.markup;
}
