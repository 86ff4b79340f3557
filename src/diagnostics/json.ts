import type { Diagnostic } from './diagnostic.ts';

/** A diagnostic as `--json` hands it out. */
export interface DiagnosticJson {
  readonly code: string;
  readonly severity: 'error' | 'warning';
  readonly file: string;
  readonly line: number;
  readonly column: number;
  readonly length: number;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
  readonly also: { readonly file: string; readonly line: number; readonly column: number } | null;
}

/** The flat JSON form of a diagnostic; keys appear always. */
export function toJson(diagnostic: Diagnostic): DiagnosticJson {
  const { code, severity, where, what, why, mend, also } = diagnostic;
  const { file, line, column, length } = where;
  const second = also === undefined ? null : { file: also.file, line: also.line, column: also.column };
  return { code, severity, file, line, column, length, what, why, mend, also: second };
}
