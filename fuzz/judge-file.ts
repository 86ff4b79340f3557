import { writeFileSync } from 'node:fs';
import { readSource } from '../src/cli/read-source.ts';
import { commandLine, Refusal } from '../src/cli/refusal.ts';
import { planAxes, typedAxes } from '../src/cli/sweep-plan.ts';
import { type Diagnostic, InputError } from '../src/diagnostics/diagnostic.ts';
import { formatDiagnostics } from '../src/diagnostics/format.ts';
import { readFlowsheet } from '../src/flowsheet/read.ts';
import type { Flowsheet } from '../src/model/flowsheet.ts';
import type { Result } from '../src/model/result.ts';
import { checkText } from '../src/sheets/check.ts';
import { markdownSheet } from '../src/sheets/markdown.ts';
import { noPaint } from '../src/sheets/sheet.ts';
import { textSheet } from '../src/sheets/text.ts';
import { balance } from '../src/tally/balance.ts';
import { planFlowsheet } from '../src/tally/plan.ts';

/** Passes after which a mutant is given up: its file may ask for a hundred thousand. */
const MOST_PASSES = 25;
const CLOSED = 1e-9;

/** What a file, or what is said about it, came to. @throws Error where the contract is broken */
export async function judgeBytes(bytes: Uint8Array, scratch: string): Promise<string> {
  const file = `${scratch}/mutant.yaml`;
  writeFileSync(file, bytes);
  return refusedOr('', async () => judgeText((await readSource(file)).text));
}

/** @param set  changes as `--set` takes them */
export async function judgeText(text: string, set: readonly string[] = []): Promise<string> {
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'mutant.yaml', set });
  const written = [text, ...set].join('\n');
  checkDiagnostics(diagnostics, written);
  const errors = diagnostics.filter(({ severity }) => severity === 'error');
  if (errors.length > 0 !== (flowsheet === null))
    throw new Error('refused without an error, or accepted with one');
  if (flowsheet === null) return 'refused';
  return refusedOr(written, async () => judgeBalance(flowsheet, written));
}

/** @param over  a setting and its values as `--over` takes them */
export async function judgeOver(text: string, over: string): Promise<string> {
  return refusedOr(`${text}\n${over}`, async () => {
    const source = { name: 'mutant.yaml', text };
    const axes = await planAxes(typedAxes([over], commandLine()), { source, set: [], case: null }, false);
    for (const { values, numbers } of axes) {
      if (values.length === 0 || values.length !== numbers.length) throw new Error('an axis without values');
      if (![...values, ...numbers].every(Number.isFinite))
        throw new Error('an axis with a value that is no number');
    }
    return 'accepted';
  });
}

function judgeBalance(flowsheet: Flowsheet, text: string): string {
  const plan = planFlowsheet(flowsheet);
  checkDiagnostics(plan.diagnostics, text);
  if (plan.diagnostics.some(({ severity }) => severity === 'error')) return 'refused by its plan';
  checkWords(checkText(flowsheet, plan, { paint: noPaint }), text);
  const { result, diagnosis } = balance(flowsheet, { maxPasses: MOST_PASSES, tolerance: CLOSED });
  checkNumbers(result, 'result');
  for (const sheet of [textSheet(result), markdownSheet(result, {})]) checkWords(sheet, text);
  if (diagnosis !== null) checkDiagnostics([diagnosis], text);
  if (result.convergence.converged !== (diagnosis === null))
    throw new Error('closed with a diagnosis, or not without one');
  if (!result.convergence.converged) return 'not closed';
  checkClosure(result);
  return Object.values(result.aims).every(({ reached }) => reached) ? 'closed' : 'aim out of reach';
}

function checkClosure({ closure, ledger }: Result): void {
  const open = Math.max(
    Math.abs(closure.mass),
    ...Object.values(closure.atoms).map(Math.abs),
    ...Object.values(ledger).map((entry) => Math.abs(entry.closure)),
  );
  if (!(open <= CLOSED)) throw new Error(`said to be closed, but ${open.toExponential(1)} is left open`);
}

/** @param written  all that the user wrote: what messages may quote */
async function refusedOr(written: string, judge: () => Promise<string>): Promise<string> {
  try {
    return await judge();
  } catch (error) {
    if (error instanceof Refusal) {
      const { name = '', text = '', also = {} } = error.source ?? {};
      checkDiagnostics(error.diagnostics, written);
      formatDiagnostics(error.diagnostics, { texts: { [name]: text, ...also } });
      return 'refused';
    }
    if (!(error instanceof InputError)) throw error;
    checkDiagnostics(error.diagnostics, written);
    return 'refused';
  }
}

function checkDiagnostics(diagnostics: readonly Diagnostic[], text: string): void {
  for (const { code, where, what, why, mend } of diagnostics) {
    for (const part of [code, where.file, what, why, mend])
      if (!/\S/.test(part)) throw new Error(`${code}: a part is empty`);
    const place = [where.line, where.column, where.length];
    if (!place.every((one) => Number.isInteger(one) && one >= 0))
      throw new Error(`${code}: no place: ${place.join(' ')}`);
    // What the user wrote is quoted, and may be anything.
    for (const word of STRANGE) {
      if ([what, why, mend].some((part) => part.includes(word)) && !text.includes(word)) {
        throw new Error(`${code}: a message says ${word}: ${what} ${why} ${mend}`);
      }
    }
  }
  formatDiagnostics(diagnostics, { texts: { 'mutant.yaml': text } });
}

const STRANGE = ['undefined', '[object', 'NaN', 'Infinity'];

function checkWords(sheet: string, text: string): void {
  // A title may be any words, and stands in the sheet.
  for (const [word] of sheet.matchAll(/\b(?:undefined|NaN)\b|\[object\b/g))
    if (!text.includes(word)) throw new Error(`a sheet says ${word}`);
}

/** JSON has no NaN: it would be a null that nobody meant. */
function checkNumbers(value: unknown, path: string): void {
  if (typeof value === 'number' && !Number.isFinite(value)) throw new Error(`${path} is ${value}`);
  if (typeof value !== 'object' || value === null) return;
  for (const [key, part] of Object.entries(value)) checkNumbers(part, `${path}.${key}`);
}
