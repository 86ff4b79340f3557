import type { Command } from 'commander';
import { flowsheetJsonSchema } from '../flowsheet/json-schema.ts';
import { command } from './common-options.ts';
import { printJson } from './terminal.ts';

/** `looptally schema`: JSON Schema of the flowsheet file. */
export function schemaCommand(): Command {
  return command(
    'schema',
    'Prints the JSON Schema of the flowsheet file, for editors that check while you type.',
    ['looptally schema > looptally.schema.json'],
  ).action(() => printJson(flowsheetJsonSchema()));
}
