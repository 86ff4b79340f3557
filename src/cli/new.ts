import { existsSync } from 'node:fs';
import type { Command } from 'commander';
import { nearest } from '../units/nearest.ts';
import { type CommonOptions, command } from './common-options.ts';
import { type Refusal, usageRefusal } from './refusal.ts';
import { starters } from './starters.ts';
import { print, printJson, say } from './terminal.ts';
import { checkOutputs, writeOutputs } from './write-files.ts';

interface NewCommandOptions extends CommonOptions {
  readonly out?: string;
  readonly force?: boolean;
}

/** `looptally new NAME`: write a commented starter file. */
export function newCommand(): Command {
  return command('new', 'Writes a commented starter flowsheet that closes as it stands.', [
    'looptally new methanol --out loop.yaml',
    'looptally new ammonia > loop.yaml',
  ])
    .argument('<name>', [...starters].map(([name, { summary }]) => `${name} (${summary})`).join('; '))
    .option('--out <file>', 'file to write; standard output where absent')
    .option('--force', 'overwrite the file if it is there')
    .action(runNew);
}

function runNew(name: string, options: NewCommandOptions): void {
  const starter = starters.get(name);
  if (starter === undefined) throw unknownStarter(name);
  if (options.out !== undefined) {
    checkOutputs([options.out], null);
    if (!options.force && existsSync(options.out)) throw wouldOverwrite(options.out);
    writeOutputs([{ path: options.out, content: starter.text }]);
    if (!options.quiet && !options.json) say(`wrote ${options.out}; now: looptally balance ${options.out}`);
  }
  if (options.json) printJson({ name, file: options.out ?? null, text: starter.text });
  else if (options.out === undefined) print(starter.text);
}

function unknownStarter(name: string): Refusal {
  const names = [...starters.keys()];
  const near = nearest(name, names);
  return usageRefusal(
    'unknown-starter',
    `There is no starter file ${name}.`,
    near === null ? `there are ${names.join(', ')}` : `the nearest is ${near}`,
    `write looptally new ${near ?? names[0]}`,
    name,
  );
}

function wouldOverwrite(path: string): Refusal {
  return usageRefusal(
    'file-exists',
    `${path} is there already.`,
    'a starter file does not overwrite your work',
    'name another file, or add --force',
    path,
  );
}
