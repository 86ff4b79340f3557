import type { DiagnosticJson } from '../diagnostics/json.ts';
import { SET_FILE, setFileText } from '../flowsheet/changes.ts';
import { readFlowsheet } from '../flowsheet/read.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import type { FileOptions } from './common-options.ts';
import { diagnosticsJson, tell } from './messages.ts';
import { readSource } from './read-source.ts';
import { Refusal, type Source } from './refusal.ts';

/** Read and check a flowsheet as a command was asked to; warnings are told at once, errors refuse it. */
export async function openFlowsheet(
  file: string,
  options: FileOptions,
): Promise<{
  readonly flowsheet: Flowsheet;
  readonly source: Source;
  readonly warnings: readonly DiagnosticJson[];
}> {
  const set = options.set ?? [];
  const source = { ...(await readSource(file)), also: { [SET_FILE]: setFileText(set) } };
  const { flowsheet, diagnostics } = await readFlowsheet(source.text, {
    file: source.name,
    set,
    case: options.case ?? null,
  });
  if (flowsheet === null) throw new Refusal(diagnostics, source);
  if (!options.quiet) tell(diagnostics, source);
  return { flowsheet, source, warnings: diagnosticsJson(diagnostics).diagnostics };
}
