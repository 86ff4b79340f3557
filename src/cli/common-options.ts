import { Command, InvalidArgumentError } from 'commander';
import { limits, sizeText } from '../flowsheet/limits.ts';

export interface CommonOptions {
  readonly json?: boolean;
  readonly quiet?: boolean;
}

export interface FileOptions extends CommonOptions {
  readonly set?: readonly string[];
  readonly case?: string;
  readonly maxSize?: number;
}

/** A command with the options that all commands have and an example that works. */
export function command(name: string, summary: string, examples: readonly string[]): Command {
  return new Command(name)
    .description(summary)
    .option('--json', 'print the result as JSON on standard output, and nothing else')
    .option('--quiet', 'no warnings and no progress on standard error')
    .helpOption('-h, --help', 'show this text')
    .addHelpText(
      'after',
      `\n${examples.length === 1 ? 'Example' : 'Examples'}:\n${examples.map((line) => `  ${line}\n`).join('')}`,
    );
}

/** A command that works on a flowsheet file. */
export function fileCommand(name: string, summary: string, examples: readonly string[]): Command {
  return withMaxSize(command(name, summary, examples))
    .argument('<file>', 'the flowsheet, a YAML file; - reads standard input')
    .option(
      '--set <path=value>',
      'change one setting, e.g. condenser.temperature=-10 degC (repeatable)',
      collect,
      [],
    )
    .option('--case <name>', 'apply one of the cases of the file');
}

/** The option of every command that reads flowsheets. */
export function withMaxSize(command: Command): Command {
  return command.option(
    '--max-size <size>',
    `largest file that is read, e.g. '4 MiB' (${sizeText(limits.bytes)} if left out)`,
    fileSize,
  );
}

function fileSize(text: string): number {
  const [, number, unit] = /^\s*(\d+(?:\.\d+)?)\s*([A-Za-z]*)\s*$/.exec(text) ?? [];
  const factor = sizes.get((unit ?? '').toLowerCase());
  if (number === undefined || factor === undefined) {
    throw new InvalidArgumentError("it must be a size such as '4 MiB', '500 kB' or a number of bytes.");
  }
  const bytes = Math.round(Number(number) * factor);
  if (!(bytes >= 1 && bytes <= limits.mostBytes)) {
    throw new InvalidArgumentError(`it must be at least 1 byte and at most ${sizeText(limits.mostBytes)}.`);
  }
  return bytes;
}

const sizes: ReadonlyMap<string, number> = new Map([
  ['', 1],
  ['b', 1],
  ['kb', 1e3],
  ['mb', 1e6],
  ['gb', 1e9],
  ['kib', 1024],
  ['mib', 1024 ** 2],
  ['gib', 1024 ** 3],
]);

/** Gather the values of an option that may be repeated. */
export function collect(value: string, before: readonly string[] = []): readonly string[] {
  return [...before, value];
}

export function smallNumber(text: string): number {
  const value = Number(text);
  if (text.trim() === '' || !(value > 0 && value < 1)) {
    throw new InvalidArgumentError('it must be a number above 0 and below 1.');
  }
  return value;
}

export function positiveInteger(text: string): number {
  const value = Number(text);
  if (text.trim() === '' || !Number.isSafeInteger(value) || value <= 0) {
    throw new InvalidArgumentError('it must be a whole number above 0.');
  }
  return value;
}

/** One of a list of words. */
export function oneOf(words: readonly string[]): (text: string) => string {
  return (text) => {
    if (!words.includes(text)) throw new InvalidArgumentError(`it must be one of ${words.join(', ')}.`);
    return text;
  };
}
