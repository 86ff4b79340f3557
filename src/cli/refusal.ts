import { type Diagnostic, InputError } from '../diagnostics/diagnostic.ts';
import { exitCodes } from './exit-codes.ts';

/** The text of a flowsheet and the name it goes by in messages. */
export interface Source {
  readonly name: string;
  readonly text: string;
  /** further texts that findings may point into, by their pseudo file name: what --set said */
  readonly also?: Readonly<Record<string, string>>;
}

/** The user's input cannot be worked with. Carries the text it was about, so that messages can quote its lines. */
export class Refusal extends Error {
  readonly diagnostics: readonly Diagnostic[];
  readonly source: Source | null;
  readonly exitCode: number;

  constructor(
    diagnostics: readonly Diagnostic[],
    source: Source | null = null,
    exitCode: number = exitCodes.badInput,
  ) {
    super(diagnostics.map((diagnostic) => diagnostic.what).join('\n'));
    this.name = 'Refusal';
    this.diagnostics = diagnostics;
    this.source = source;
    this.exitCode = exitCode;
  }
}

/** What is wrong with an argument of the command line; `offset` and `length` narrow it down inside the argument. */
export interface UsageFault {
  readonly code: string;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
  /** the argument as the user typed it, null for the command line as a whole */
  readonly at: string | null;
  readonly offset?: number;
  readonly length?: number;
}

/** A command line that cannot be followed; `at` is the argument in question as the user typed it. */
export function usageRefusal(
  code: string,
  what: string,
  why: string,
  mend: string,
  at: string | null = null,
): Refusal {
  return usageRefusals([{ code, what, why, mend, at }]);
}

/** The same for several faults at once. */
export function usageRefusals(faults: readonly UsageFault[], exitCode: number = exitCodes.badInput): Refusal {
  return new Refusal(faults.map(usageDiagnostic), commandLine(), exitCode);
}

/** What is wrong with an argument, as a finding in the text of the command line. */
export function usageDiagnostic(fault: UsageFault): Diagnostic {
  const { code, what, why, mend, at, offset = 0, length } = fault;
  const place = placeOnCommandLine(at);
  const where = { ...place, column: place.column + offset, length: length ?? place.length };
  return { code, severity: 'error', where, what, why, mend };
}

/** Run a calculation on a flowsheet; what it says about the user's input is told with the lines of the file. */
export function aboutSource<T>(source: Source, calculate: () => T): T {
  try {
    return calculate();
  } catch (error) {
    if (error instanceof InputError) throw new Refusal(error.diagnostics, source);
    throw error;
  }
}

const COMMAND_LINE = 'command line';

/** The command line as it was typed, for messages to point into. */
export function commandLine(): Source {
  return { name: COMMAND_LINE, text: wordsTyped().map(shown).join(' ') };
}

/** An argument stands alone or behind `--option=`. */
function placeOnCommandLine(at: string | null): Diagnostic['where'] {
  const words = wordsTyped();
  const fits = (word: string) => word === at || word.startsWith(`${at}=`) || word.endsWith(`=${at}`);
  const exact = words.indexOf(at ?? '', 1);
  const index = exact > 0 ? exact : words.findIndex((word, i) => i > 0 && fits(word));
  if (at === null || at === '' || index < 0) {
    return { file: COMMAND_LINE, line: 1, column: 1, length: 'looptally'.length };
  }
  const before = words.slice(0, index).reduce((sum, word) => sum + shown(word).length + 1, 1);
  const word = words[index]!;
  const quote = shown(word) === word ? 0 : 1;
  const inside = word.startsWith(at) ? 0 : word.length - at.length;
  return { file: COMMAND_LINE, line: 1, column: before + quote + inside, length: at.length };
}

function wordsTyped(): string[] {
  return ['looptally', ...process.argv.slice(2)];
}

/** A word as it must have been typed: with quotes where a shell needs them. */
function shown(word: string): string {
  return /[\s"'<>|&;$*?()#]/.test(word) || word === '' ? `'${word}'` : word;
}
