import type { Handle } from '../../model/flowsheet.ts';
import { glances } from './figure-sections.ts';
import { numberOf, placeOf } from './handle-text.ts';
import { type Html, html, nameText, userText } from './html.ts';
import type { PageView } from './view.ts';

/**
 * The settings that can be moved, and the figures to be watched beside them. Hidden until the script of the page has
 * closed the loop by itself: without it nothing would follow.
 *
 * @param named  false where the file names no handles and these were chosen
 */
export function panel(view: PageView, handles: readonly Handle[], named: boolean): Html {
  return html`<aside class="panel" aria-labelledby="panel-head" hidden>
<h2 id="panel-head">Move settings</h2>
<p class="note">${
    named
      ? 'The loop is closed again in this page; nothing is sent anywhere.'
      : 'The file names no handles; these were chosen: condenser temperatures and splitter fractions. Write others under handles: in the file. The loop is closed again in this page; nothing is sent anywhere.'
  }</p>
${handles.length === 0 ? html`<p>This file has no condenser temperature or splitter fraction to move, and names no handles.</p>` : null}
<div class="handles">${handles.map((handle, k) => handleRow(handle, k, view.at.get(handle.path) ?? Number.NaN))}</div>
<div class="glance" data-part="glance">${glanceSection(view)}</div>
<div class="actions">
<button type="button" data-do="reset">Reset all</button>
<button type="button" data-do="link">Copy link</button>
<button type="button" data-do="save">Save as YAML</button>
</div>
<p class="said" role="status" aria-live="polite" data-said></p>
</aside>`;
}

function handleRow(handle: Handle, k: number, value: number): Html {
  const shown = numberOf(handle, value);
  const unit = handle.unit === '' ? 'no unit' : handle.unit;
  return html`<div class="handle" data-handle="${handle.path}">
<div class="handle-head" id="handle-${k}">${nameText(handle.path)}</div>
<div class="handle-row">
<input type="range" min="0" max="${handle.places - 1}" step="1" value="${placeOf(handle, value)}" aria-labelledby="handle-${k}" aria-valuetext="${shown} ${handle.unit}">
<input type="text" autocomplete="off" spellcheck="false" value="${shown}" aria-label="${handle.path}, in ${unit} where no unit is typed" aria-describedby="handle-${k}-fault handle-${k}-moved">
<span class="u">${handle.unit}</span>
</div>
<p class="moved" id="handle-${k}-moved" hidden><mark>moved</mark> <span></span> <button type="button" aria-label="reset ${handle.path}">reset</button></p>
<div class="fault" id="handle-${k}-fault" role="alert"></div>
</div>`;
}

/** The figures beside the handles. */
export function glanceSection(view: PageView): Html {
  return html`<dl>${glances(view).map(
    ({ label, value, unit }) =>
      html`<div><dt>${userText(label)}</dt><dd>${value} <span class="u">${unit}</span></dd></div>`,
  )}</dl>`;
}
