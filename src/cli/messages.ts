import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { formatDiagnostics } from '../diagnostics/format.ts';
import { type DiagnosticJson, toJson } from '../diagnostics/json.ts';
import { exitCodes } from './exit-codes.ts';
import { Refusal, type Source } from './refusal.ts';
import { inColour, printJson, say } from './terminal.ts';

/** Tell diagnostics on standard error, each with the line it is about. */
export function tell(diagnostics: readonly Diagnostic[], source: Source | null): void {
  if (diagnostics.length === 0) return;
  const texts = source === null ? {} : { [source.name]: source.text, ...source.also };
  say(formatDiagnostics(diagnostics, { texts, colour: inColour(process.stderr) }));
}

/** Diagnostics as `--json` hands them out. */
export function diagnosticsJson(diagnostics: readonly Diagnostic[]): { diagnostics: DiagnosticJson[] } {
  return { diagnostics: diagnostics.map(toJson) };
}

/** Tell why a command ended early and set the exit code: the user's input, or a fault of ours. */
export function tellFailure(error: unknown, json: boolean): void {
  if (error instanceof Refusal) {
    process.exitCode = error.exitCode;
    if (json) printJson(diagnosticsJson(error.diagnostics));
    else tell(error.diagnostics, error.source);
    return;
  }
  process.exitCode = exitCodes.fault;
  const message = (error instanceof Error ? error.message : String(error)).replace(/\s+/g, ' ').trim();
  if (json) printJson(diagnosticsJson([faultDiagnostic(message)]));
  else say(`looptally: this is a fault of Looptally: ${message || 'no message'} (${HOW_TO_REPORT})`);
  if (process.env['LOOPTALLY_DEBUG'] === '1' && error instanceof Error) say(error.stack ?? '');
}

const HOW_TO_REPORT =
  'please report this line with the command and the file to the maintainers; LOOPTALLY_DEBUG=1 shows where it happened';

function faultDiagnostic(message: string): Diagnostic {
  return {
    code: 'fault',
    severity: 'error',
    where: { file: 'looptally', line: 1, column: 1, length: 1 },
    what: `this is a fault of Looptally: ${message}`,
    why: 'something happened that its makers did not think of',
    mend: HOW_TO_REPORT,
  };
}
