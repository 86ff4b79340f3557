import type { Place } from '../model/place.ts';

/** One finding about the user's input; `what`, `why` and `mend` are plain sentences. */
export interface Diagnostic {
  /** a stable name, listed in diagnostics/codes.ts */
  readonly code: string;
  readonly severity: 'error' | 'warning';
  readonly where: Place;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
  /** a second place that matters when two entries disagree */
  readonly also?: Place;
}

/**
 * Thrown where a calculation cannot go on for a reason that lies in the user's input; carries what the user
 * needs to know. Every other thrown Error is a fault of ours.
 */
export class InputError extends Error {
  readonly diagnostics: readonly Diagnostic[];

  constructor(diagnostics: readonly Diagnostic[]) {
    super(diagnostics.map((d) => `${d.code}: ${d.what}`).join('\n'));
    this.name = 'InputError';
    this.diagnostics = diagnostics;
  }
}

/**
 * A block could not be evaluated at the present guess (no phase split, temperature bound, ...). The solver
 * may shorten its step and try again; when it cannot, this becomes the account of why the loop did not close.
 */
export class PassTrouble extends Error {
  /** a stable name, listed in diagnostics/codes.ts */
  readonly code: string;
  /** the block it happened in; filled in by the pass when the block itself does not know its name */
  block: string | null = null;
  /** the setting of that block that asks for too much, where one can be named */
  setting: string | null = null;
  readonly why: string;
  readonly mend: string;

  constructor(code: string, what: string, why: string, mend: string) {
    super(what);
    this.name = 'PassTrouble';
    this.code = code;
    this.why = why;
    this.mend = mend;
  }
}
