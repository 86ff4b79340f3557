import type { Handle } from '../model/flowsheet.ts';
import { numberAt, numberOf, placeOf, withUnit } from '../sheets/page/handle-text.ts';
import { html } from '../sheets/page/html.ts';
import type { LocalNumbers } from './local-numbers.ts';
import { typedText } from './local-numbers.ts';

/** The four parts of a message without its place. */
export interface Trouble {
  readonly what: string;
  readonly why: string;
  readonly mend: string;
}

/** What the panel tells of. */
export interface PanelEvents {
  /** a slider is on the move or was let go */
  slid(handle: Handle, number: number, isDone: boolean): void;
  /** a value was typed, as a file writes it */
  typed(handle: Handle, text: string): void;
  reset(handle: Handle | null): void;
  link(): void;
  save(): void;
}

export interface PanelView {
  readonly root: HTMLElement;
  /** put sliders and fields where the settings stand [SI], and mark those that were moved away from the file */
  place(at: ReadonlyMap<string, number>, inFile: ReadonlyMap<string, number>): void;
  fault(path: string, trouble: Trouble | null): void;
  say(text: string): void;
}

/** Sliders, fields and buttons of the panel. */
export function createPanelView(
  handles: readonly Handle[],
  numbers: LocalNumbers,
  events: PanelEvents,
): PanelView {
  const root = document.querySelector<HTMLElement>('.panel')!;
  const said = root.querySelector<HTMLElement>('[data-said]')!;
  const rows = new Map(
    handles.map((handle) => {
      const row = [...root.querySelectorAll<HTMLElement>('[data-handle]')].find(
        (one) => one.dataset['handle'] === handle.path,
      )!;
      const slider = row.querySelector<HTMLInputElement>('input[type=range]')!;
      const field = row.querySelector<HTMLInputElement>('input[type=text]')!;
      const moved = row.querySelector<HTMLElement>('.moved')!;
      const fault = row.querySelector<HTMLElement>('.fault')!;
      return [handle.path, { handle, slider, field, moved, fault }] as const;
    }),
  );

  function fault(path: string, trouble: Trouble | null): void {
    const row = rows.get(path);
    if (row === undefined) return;
    row.field.setAttribute('aria-invalid', String(trouble !== null));
    row.fault.innerHTML =
      trouble === null
        ? ''
        : html`<p class="what">${trouble.what}</p><p>why: ${trouble.why}</p><p>mend: ${trouble.mend}</p>`
            .markup;
  }

  for (const { handle, slider, field, moved } of rows.values()) {
    const slide = (isDone: boolean) => {
      const number = numberAt(handle, Number(slider.value));
      field.value = fieldText(number, numbers);
      slider.setAttribute('aria-valuetext', withUnit(number, handle));
      fault(handle.path, null);
      events.slid(handle, number, isDone);
    };
    slider.addEventListener('input', () => slide(false));
    slider.addEventListener('change', () => slide(true));
    field.addEventListener('input', () => {
      field.dataset['typing'] = 'yes';
    });
    field.addEventListener('blur', () => {
      delete field.dataset['typing'];
    });
    field.addEventListener('change', () => {
      delete field.dataset['typing'];
      const text = typedText(field.value, handle.unit, numbers);
      if (text === null) fault(handle.path, twoMeanings(field.value, numbers));
      else events.typed(handle, text);
    });
    field.addEventListener('keydown', (event) => {
      if (event.key !== 'Escape') return;
      delete field.dataset['typing'];
      fault(handle.path, null);
      events.reset(handle);
    });
    moved.querySelector('button')!.addEventListener('click', () => {
      events.reset(handle);
      field.focus();
    });
  }
  const buttons: Readonly<Record<string, () => void>> = {
    reset: () => events.reset(null),
    link: () => events.link(),
    save: () => events.save(),
  };
  for (const button of root.querySelectorAll<HTMLButtonElement>('[data-do]'))
    button.addEventListener('click', buttons[button.dataset['do']!]!);

  return {
    root,
    place(at, inFile) {
      for (const [path, { handle, slider, field, moved }] of rows) {
        const value = at.get(path);
        const own = inFile.get(path);
        if (value === undefined || own === undefined) continue;
        const number = numberOf(handle, value);
        slider.value = String(placeOf(handle, value));
        slider.setAttribute('aria-valuetext', withUnit(number, handle));
        // A closing that ends while somebody types must not take the words out of the field.
        const isTyping = field === document.activeElement && field.dataset['typing'] === 'yes';
        if (!isTyping && field.getAttribute('aria-invalid') !== 'true')
          field.value = fieldText(number, numbers);
        const isMoved = number !== numberOf(handle, own);
        moved.hidden = !isMoved;
        moved.querySelector('span')!.textContent =
          `in the file ${numbers.words(withUnit(numberOf(handle, own), handle))}`;
      }
    },
    fault,
    say(text) {
      said.textContent = text;
    },
  };
}

/** With the decimal mark of the reader, and without marks between thousands: what is shown can be typed. */
function fieldText(number: number, { decimal }: LocalNumbers): string {
  return String(number).replace('.', decimal);
}

function twoMeanings(typed: string, { group, decimal }: LocalNumbers): Trouble {
  return {
    what: `${typed.trim()} may mean two numbers.`,
    why: `"${group}" stands between thousands here and may be a decimal mark elsewhere`,
    mend: `leave it out for thousands, or write decimals with "${decimal}"`,
  };
}
