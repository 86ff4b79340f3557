import type { Flowsheet } from '../model/flowsheet.ts';
import type { Result } from '../model/result.ts';
import { planFlowsheet } from '../tally/plan.ts';
import { caution, dangersOf } from './cautions.ts';
import { unlistedPasses } from './trace.ts';
import { heightOf } from './xlsx-head.ts';
import { heads, looks, number, text, unitHeads } from './xlsx-looks.ts';
import { type Page, put } from './xlsx-model.ts';

/** Assumptions, one a line. */
export function fillAssumptions(page: Page, result: Result): void {
  put(page, heads(['assumption'], 1));
  for (const line of result.assumptions) prose(page, [line]);
}

/** Where the numbers come from: models by block, data by component. */
export function fillSources(page: Page, flowsheet: Flowsheet): void {
  const { components, blocks, shared } = planFlowsheet(flowsheet).sources;
  put(page, heads(['of', 'what', 'source or model'], 3));
  for (const line of shared) prose(page, ['all blocks', 'state', line]);
  for (const { name, kind, models } of blocks) for (const line of models) prose(page, [name, kind, line]);
  for (const { id, data } of components)
    for (const [what, source] of Object.entries(data)) prose(page, [id, what, source]);
}

/** The passes of the solver. */
export function fillTrace(page: Page, { convergence }: Result): void {
  put(page, [...heads(['pass', 'residual'], 0), ...unitHeads(['method', 'worst', 'note'])]);
  for (const { pass, residual, method, worst, note } of convergence.history) {
    const row = put(page, [
      number(pass),
      number(residual, looks.closure),
      text(method, looks.unit),
      text(worst, looks.unit),
      text(note, looks.remark),
    ]);
    page.heights.set(row, heightOf(note, page.widths[4]!));
  }
  const unlisted = unlistedPasses(convergence.history);
  if (unlisted !== '') {
    const row = put(page, [null, null, null, null, text(unlisted, looks.remark)]);
    page.heights.set(row, heightOf(unlisted, page.widths[4]!));
  }
  if (convergence.history.length === 0) put(page, [null, null, text('nothing had to be closed')]);
}

/** Warnings of the blocks and the balances, the dangers of what is in them, and the caution that every sheet ends with. */
export function fillWarnings(page: Page, result: Result): void {
  const { warnings } = result;
  put(page, heads(['where', 'code', 'warning'], 3));
  for (const { where, code, message } of warnings) prose(page, [where, code, message]);
  if (warnings.length === 0) put(page, [text('none')]);
  put(page, []);
  for (const danger of dangersOf(result)) prose(page, ['all of it', 'danger', danger]);
  prose(page, ['all of it', 'caution', caution]);
}

/** A line whose last cell is broken at the width of its column. */
function prose(page: Page, words: readonly string[]): void {
  const row = put(
    page,
    words.map((word, k) => text(word, k === words.length - 1 ? looks.prose : {})),
  );
  page.heights.set(row, heightOf(words.at(-1)!, page.widths[words.length - 1]!));
}
