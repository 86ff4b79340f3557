import type { DiagnosticJson } from '../diagnostics/json.ts';
import { SET_FILE, setFileText } from '../flowsheet/changes.ts';
import { readFlowsheet } from '../flowsheet/read.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import type { FileOptions } from './common-options.ts';
import { diagnosticsJson, tell } from './messages.ts';
import { readSource } from './read-source.ts';
import { Refusal, type Source } from './refusal.ts';

export interface Opened {
  readonly flowsheet: Flowsheet;
  readonly source: Source;
  readonly warnings: readonly DiagnosticJson[];
}

/** Read and check a flowsheet as a command was asked to; warnings are told at once, errors refuse it. */
export async function openFlowsheet(file: string, options: FileOptions): Promise<Opened> {
  return flowsheetIn(await readSource(file, options.maxSize), options);
}

/** The same for a text that has been read already, so that several cases of it can be opened. */
export async function flowsheetIn(text: Source, options: FileOptions): Promise<Opened> {
  const set = options.set ?? [];
  const source = { ...text, also: { [SET_FILE]: setFileText(set) } };
  const { flowsheet, diagnostics } = await readFlowsheet(source.text, {
    file: source.name,
    set,
    case: options.case ?? null,
    ...(options.maxSize === undefined ? {} : { maxBytes: options.maxSize }),
  });
  if (flowsheet === null) throw new Refusal(diagnostics, source);
  if (!options.quiet) tell(diagnostics, source);
  return { flowsheet, source, warnings: diagnosticsJson(diagnostics).diagnostics };
}
