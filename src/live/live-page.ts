import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { SET_FILE } from '../flowsheet/changes.ts';
import type { Handle } from '../model/flowsheet.ts';
import type { Result } from '../model/result.ts';
import { numberOf, withUnit } from '../sheets/page/handle-text.ts';
import { handlesOf, type LiveData, standing } from '../sheets/page/live-data.ts';
import { type TradeOff, tradeOffFormulas } from '../study/trade-off.ts';
import { createBackground } from './background.ts';
import { download } from './download.ts';
import { tellAbove } from './lead.ts';
import { localNumbers } from './local-numbers.ts';
import { fragmentOf, movesOf } from './moves.ts';
import { createPanelView } from './panel-view.ts';
import { savedFile } from './saved-file.ts';
import { createSheetView } from './sheet-view.ts';
import { createLiveSolver, type Outcome } from './solver.ts';

/** A setting rests when nothing has moved it for so long [ms]. */
const REST_MS = 160;

/** Read the file of the page again, close its loop, and let its settings be moved. */
export async function bringToLife(data: LiveData): Promise<void> {
  const numbers = localNumbers(navigator.language);
  const solver = createLiveSolver(data);
  const first = await solver.exact(new Map());
  if (first.kind === 'refused') {
    tellAbove(
      'This page cannot close its loop again; the sheet stands as it was written.',
      first.diagnostics,
    );
    return;
  }
  const asInFile = first.flowsheet;
  const handles = handlesOf(asInFile);
  const inFile = standing(asInFile, handles);
  const sheet = createSheetView();

  /** what was moved away from the file, as a file would write it; and the moves of the last state that could be read */
  let moves = new Map<string, string>();
  let sound: ReadonlyMap<string, string> = new Map();
  let at = new Map(inFile);
  let flowsheet = asInFile;
  let result: Result | null = null;
  let tradeOffs: readonly TradeOff[] = [];
  let lastMoved = '';
  let frame = 0;
  let rest = 0;
  let turn = 0;

  const background = createBackground((found) => {
    tradeOffs = found;
    sheet.waitForTradeOffs(false);
    if (result !== null) show(result, 'figures');
  });
  const panel = createPanelView(handles, numbers, {
    slid(handle, number, isDone) {
      move(handle, withUnit(number, handle));
      at.set(handle.path, (number + handle.scale.offset) * handle.scale.factor);
      window.cancelAnimationFrame(frame);
      frame = window.requestAnimationFrame(quickly);
      settle(isDone ? 0 : REST_MS);
    },
    typed(handle, text) {
      move(handle, text);
      settle(0);
    },
    reset(handle) {
      const paths = handle === null ? handles.map(({ path }) => path) : [handle.path];
      for (const path of paths) {
        moves.delete(path);
        panel.fault(path, null);
      }
      settle(0);
    },
    link() {
      const address = `${location.href.split('#')[0]}#${fragmentOf(moves)}`;
      const failed = () =>
        panel.say('The browser did not let it be copied: the link stands in the address bar.');
      if (navigator.clipboard === undefined) failed();
      else
        navigator.clipboard
          .writeText(address)
          .then(() => panel.say('Copied: the link opens this page with these settings.'), failed);
    },
    save() {
      const saved = savedFile(data, moves, handles, at);
      if ('missing' in saved)
        panel.say(`Not saved: ${saved.missing} has no value in the file that could be replaced.`);
      else {
        const name = data.file.replace(/\.ya?ml$/i, '');
        download(`${name}-moved.yaml`, saved.text);
        panel.say(`Saved as ${name}-moved.yaml.`);
      }
    },
  });

  panel.root.hidden = false;
  land(first);
  takeFragment();
  window.addEventListener('hashchange', takeFragment);

  function move(handle: Handle, text: string): void {
    lastMoved = handle.path;
    moves.set(handle.path, text);
    background.stop();
    sheet.waitForTradeOffs(true);
  }

  function show(shown: Result, scope: 'figures' | 'all'): void {
    const view = { result: shown, flowsheet, asInFile, at, tradeOffs };
    sheet.show({ ...view, words: numbers.words, axisText: numbers.axisText }, scope);
  }

  /** One frame of a setting on the move. */
  function quickly(): void {
    const found = solver.quick(at);
    if (found === null) return;
    result = found;
    tellAbove('', []);
    sheet.voidFigures(false);
    show(found, 'figures');
    panel.place(at, inFile);
    sheet.showCase(flowsheet, moves);
  }

  function settle(afterMs: number): void {
    window.clearTimeout(rest);
    rest = window.setTimeout(() => void exactly(), afterMs);
  }

  async function exactly(): Promise<void> {
    const mine = ++turn;
    window.cancelAnimationFrame(frame);
    moves = new Map([...moves].filter(([path, text]) => text !== textInFile(path)));
    const outcome = await solver.exact(moves);
    // A setting may have been moved on meanwhile.
    if (mine !== turn) return;
    if (outcome.kind === 'refused') refuse(outcome.diagnostics);
    else land(outcome);
    const fragment = fragmentOf(moves);
    history.replaceState(null, '', fragment === '' ? location.href.split('#')[0] : `#${fragment}`);
  }

  function textInFile(path: string): string {
    const handle = handles.find((one) => one.path === path)!;
    return withUnit(numberOf(handle, inFile.get(path)!), handle);
  }

  /** A state that could be read: closed, or not and why. */
  function land(outcome: Exclude<Outcome, { kind: 'refused' }>): void {
    flowsheet = outcome.flowsheet;
    at = standing(flowsheet, handles);
    sound = new Map(moves);
    panel.place(at, inFile);
    sheet.showCase(flowsheet, moves);
    const count = moves.size === 1 ? '1 setting is moved.' : `${moves.size} settings are moved.`;
    const isClosed = outcome.kind === 'closed';
    sheet.voidFigures(!isClosed);
    if (isClosed) {
      result = outcome.result;
      tellAbove('', []);
      show(result, 'all');
      const { passes } = result.convergence;
      panel.say(
        `Closed in ${passes} ${passes === 1 ? 'pass' : 'passes'}; ${moves.size === 0 ? 'all as in the file.' : count}`,
      );
      sheet.waitForTradeOffs(true);
      background.start(flowsheet, handles, tradeOffFormulas(result.figures));
    } else {
      background.stop();
      tellAbove('NOT CLOSED with these settings.', [outcome.diagnosis]);
      sheet.notClosed();
      panel.say(`Not closed; ${count}`);
    }
  }

  /** A value that will not do is told of where it was typed, and the sheet stays at the state before. */
  function refuse(diagnostics: readonly Diagnostic[]): void {
    const paths = [...moves.keys()];
    for (const { where, code, what, why, mend } of diagnostics.toReversed()) {
      const path =
        (where.file === SET_FILE ? paths[where.line - 1 - data.set.length] : undefined) ?? lastMoved;
      const further =
        code === 'unknown-unit' ? '; a page knows the units of the trade, the command line knows more' : '';
      panel.fault(path, { what, why: why + further, mend });
      const before = sound.get(path);
      if (before === undefined) moves.delete(path);
      else moves.set(path, before);
    }
    panel.say('Not taken over: the sheet stands at the settings before.');
    sheet.waitForTradeOffs(false);
  }

  /** Settings that a link asks for. A fragment without a value is a link to a section. */
  function takeFragment(): void {
    const asked = movesOf(location.hash.slice(1));
    if (asked.moves.size === 0 || fragmentOf(asked.moves) === fragmentOf(moves)) return;
    const known = [...asked.moves].filter(([path]) => handles.some((handle) => handle.path === path));
    const strangers = [...asked.moves.keys()].filter((path) => !known.some(([one]) => one === path));
    moves = new Map(known);
    lastMoved = known.at(-1)?.[0] ?? '';
    void exactly().then(() => {
      if (strangers.length > 0)
        panel.say(`The link moves ${strangers.join(', ')}, which this page does not have.`);
    });
  }
}
