import { type Command, CommanderError, Help } from 'commander';
import { nearest } from '../units/nearest.ts';
import { commands } from './commands.ts';
import { exitCodes } from './exit-codes.ts';
import { tellFailure } from './messages.ts';
import { type Refusal, usageRefusal } from './refusal.ts';
import { print, say } from './terminal.ts';
import { version } from './version.ts';

/** Follow a command line; every outcome ends in text on the right stream and in process.exitCode. */
export async function run(words: readonly string[]): Promise<void> {
  try {
    await dispatch(words);
  } catch (error) {
    tellFailure(error, asksForJson(words));
  }
}

async function dispatch(words: readonly string[]): Promise<void> {
  const [first, ...rest] = words;
  if (first === undefined) {
    say(overview());
    process.exitCode = exitCodes.badInput;
  } else if (first === '--help' || first === '-h') {
    print(overview());
  } else if (first === '--version' || first === '-V') {
    print(`${version}\n`);
  } else if (first === 'help') {
    const name = rest[0];
    if (name === undefined) print(overview());
    else (await load(name)).outputHelp();
  } else {
    const command = await load(first);
    await follow(command, rest);
  }
}

async function load(name: string): Promise<Command> {
  const entry = commands.get(name);
  if (entry === undefined) throw unknownCommand(name);
  const command = await entry.load();
  return command.name(`looptally ${name}`).configureOutput({ writeErr: () => {}, writeOut: print });
}

async function follow(command: Command, words: readonly string[]): Promise<void> {
  command.exitOverride().showSuggestionAfterError(false);
  try {
    await command.parseAsync(words, { from: 'user' });
  } catch (error) {
    if (!(error instanceof CommanderError)) throw error;
    if (error.exitCode === 0) return;
    throw misuse(error, command, words);
  }
}

function asksForJson(words: readonly string[]): boolean {
  const end = words.indexOf('--');
  return words.slice(0, end < 0 ? undefined : end).includes('--json');
}

function overview(): string {
  const width = Math.max(...[...commands.keys()].map((name) => name.length));
  return [
    'Looptally closes and tallies the recycles of synthesis loops written as a YAML file.',
    '',
    'Usage: looptally COMMAND FILE [options]',
    '',
    'Commands:',
    ...[...commands].map(([name, { summary }]) => `  ${name.padEnd(width)}  ${summary}`),
    '',
    'looptally COMMAND --help tells the options of a command; looptally --version tells the version.',
    '',
    'Example:',
    '  looptally new ammonia --out loop.yaml',
    '  looptally balance loop.yaml',
    '',
    'Exit codes: 0 done, 1 a fault of Looptally, 2 bad input or usage, 3 did not close, 4 an aim or limit not reached.',
    '',
  ].join('\n');
}

function unknownCommand(name: string): Refusal {
  if (name.startsWith('-')) {
    return usageRefusal(
      'option-before-command',
      `The option ${name} stands where a command is wanted.`,
      'options follow the command they are for',
      'write looptally COMMAND FILE [options]; looptally --help lists the commands',
      name,
    );
  }
  const near = nearest(name, commands.keys());
  const looksLikeFile = /[./\\]/.test(name);
  const why =
    near !== null ? `the nearest command is ${near}` : `the commands are ${[...commands.keys()].join(', ')}`;
  const mend =
    near !== null
      ? `write looptally ${near}`
      : looksLikeFile
        ? `write looptally balance ${name}`
        : 'looptally --help tells what each command does';
  return usageRefusal('unknown-command', `There is no command ${name}.`, why, mend, name);
}

/** What commander found wrong, in our words. */
function misuse(error: CommanderError, command: Command, words: readonly string[]): Refusal {
  const seeHelp = `${command.name()} --help tells the options and shows an example`;
  const quoted = /'([^']*)'/.exec(error.message)?.[1] ?? '';
  switch (error.code) {
    case 'commander.unknownOption': {
      const typed = quoted.split('=', 1)[0] ?? quoted;
      const flags = command.options.flatMap((option) => option.long ?? []);
      const near = nearest(typed, flags);
      return usageRefusal(
        'unknown-option',
        `${command.name()} has no option ${typed}.`,
        near === null
          ? `its options are ${[...flags, '--help'].join(', ')}`
          : `the nearest option is ${near}`,
        near === null ? seeHelp : `write ${near}`,
        typed,
      );
    }
    case 'commander.missingArgument':
      return usageRefusal(
        'missing-argument',
        `${command.name()} needs a ${quoted}.`,
        'nothing was given after the command',
        `write ${command.name()} ${new Help().commandUsage(command).slice(command.name().length).trim()}`,
        words[0] ?? null,
      );
    case 'commander.optionMissingArgument': {
      const flag = /--[a-z-]+/.exec(quoted)?.[0] ?? quoted;
      return usageRefusal(
        'missing-value',
        `The option ${flag} needs a value.`,
        `it is written ${quoted}`,
        seeHelp,
        flag,
      );
    }
    case 'commander.missingMandatoryOptionValue': {
      const flag = /--[a-z-]+/.exec(quoted)?.[0] ?? quoted;
      return usageRefusal(
        'missing-option',
        `${command.name()} needs the option ${flag}.`,
        `it is written ${quoted}`,
        seeHelp,
        words[0] ?? null,
      );
    }
    case 'commander.invalidArgument': {
      const flag = /--[a-z-]+/.exec(quoted)?.[0] ?? quoted;
      const value = /argument '([^']*)' is invalid/.exec(error.message)?.[1] ?? '';
      const why = error.message.replace(/^.*? is invalid\. ?/, '').replace(/\.$/, '');
      return usageRefusal(
        'bad-value',
        `${flag} cannot be ${value === '' ? 'empty' : value}.`,
        why,
        seeHelp,
        flag,
      );
    }
    case 'commander.excessArguments': {
      const takes = command.registeredArguments.length;
      const extra = command.args[takes] ?? '';
      return usageRefusal(
        'too-many-arguments',
        `${command.name()} cannot make sense of ${extra}.`,
        takes === 0
          ? 'this command takes no names'
          : `this command takes ${takes === 1 ? 'one name' : `${takes} names`}; a value with blanks needs quotes`,
        seeHelp,
        extra,
      );
    }
    default:
      return usageRefusal(
        'bad-usage',
        error.message.replace(/^error: /, ''),
        'the command line cannot be read',
        seeHelp,
      );
  }
}
