import type { Flowsheet } from '../model/flowsheet.ts';
import { drawingWords } from '../sheets/drawing/words.ts';
import { caseText, closingText, notClosedText, statusText } from '../sheets/page/job.ts';
import { glanceSection } from '../sheets/page/panel.ts';
import { partsAfter, partsBefore } from '../sheets/page/parts.ts';
import type { PagePart, PageView } from '../sheets/page/view.ts';

/** The sheet in the page: shows views of the loop, part by part. */
export interface SheetView {
  /**
   * @param scope  `figures` leaves alone what does not follow the figures of the loop (sources, settings): what is in sight is
   *   put in at once, the rest when the browser has time
   */
  show(view: PageView, scope: 'figures' | 'all'): void;
  /** the case in the title block, with what was moved in it */
  showCase(flowsheet: Flowsheet, moves: ReadonlyMap<string, string>): void;
  /** strike out what belongs to another state than the one asked for */
  voidFigures(isVoid: boolean): void;
  /** the title block of a state that did not close */
  notClosed(): void;
  /** the trade-offs shown belong to settings that were moved since */
  waitForTradeOffs(isWaiting: boolean): void;
}

export function createSheetView(): SheetView {
  const glance: PagePart = {
    id: 'glance',
    heading: '',
    render: glanceSection,
    figures: true,
  };
  const shown = [glance, ...partsBefore, ...partsAfter].flatMap((part) => {
    const body = document.querySelector<HTMLElement>(`[data-part="${part.id}"]`);
    return body === null ? [] : [{ part, body, markup: '' }];
  });
  const words = new Map(
    [...document.querySelectorAll('[data-word]')].map((text) => [text.getAttribute('data-word')!, text]),
  );
  const job = (name: string) => document.querySelector<HTMLElement>(`[data-job="${name}"]`)!;
  let rest = 0;

  function put(entry: (typeof shown)[number], view: PageView): void {
    // Until they have been worked out here the ones that the page was written with stay.
    if (entry.part.id === 'trade-offs' && view.tradeOffs.length === 0) return;
    const markup = entry.part.render(view)?.markup ?? '<p>None in this state.</p>';
    if (markup === entry.markup) return;
    entry.markup = markup;
    replaceInside(entry.body, markup);
  }

  return {
    show(view, scope) {
      window.clearTimeout(rest);
      const wanted = shown.filter(({ part }) => scope === 'all' || part.figures);
      const now = scope === 'all' ? wanted : wanted.filter(({ body }) => isInSight(body));
      for (const entry of now) put(entry, view);
      if (now.length < wanted.length) {
        rest = window.setTimeout(() => {
          for (const entry of wanted) if (!now.includes(entry)) put(entry, view);
        });
      }
      const drawn = drawingWords(view.result);
      for (const [key, text] of words) {
        if (key.endsWith('-0')) continue;
        const word = view.words(drawn.get(key) ?? '');
        if (text.textContent !== word) text.textContent = word;
      }
      job('status').innerHTML = statusText(view).markup;
      job('closing').textContent = closingText(view);
    },
    showCase(flowsheet, moves) {
      job('case').innerHTML = caseText({ flowsheet }, moves).markup;
    },
    notClosed() {
      job('status').innerHTML = notClosedText.markup;
      job('closing').textContent = '';
    },
    waitForTradeOffs(isWaiting) {
      document.querySelector('[data-part="trade-offs"]')?.classList.toggle('waiting', isWaiting);
    },
    voidFigures(isVoid) {
      for (const { part, body } of shown) if (part.figures) body.classList.toggle('void', isVoid);
      document.querySelector('#diagram .body')?.classList.toggle('void', isVoid);
    },
  };
}

function isInSight(element: HTMLElement): boolean {
  const { top, bottom } = element.getBoundingClientRect();
  return bottom > -100 && top < window.innerHeight + 100;
}

/** New content, with tables scrolled and the focus where they were. */
function replaceInside(body: HTMLElement, markup: string): void {
  const regions = () => [...body.querySelectorAll<HTMLElement>('.scroll')];
  const before = regions();
  const lefts = before.map(({ scrollLeft }) => scrollLeft);
  const focused = before.indexOf(document.activeElement as HTMLElement);
  body.innerHTML = markup;
  const after = regions();
  lefts.forEach((left, k) => {
    if (left > 0 && after[k] !== undefined) after[k].scrollLeft = left;
  });
  if (focused >= 0) after[focused]?.focus({ preventScroll: true });
}
