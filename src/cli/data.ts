import type { Command } from 'commander';
import { publishedConstantNames, publishedConstants } from '../chemistry/published-constants.ts';
import { catalogueEntry, catalogueList } from '../properties/catalogue.ts';
import { constantsText, dataEntryText, dataListText } from '../sheets/data.ts';
import { constantJson, dataEntryJson, dataListJson } from '../sheets/data-json.ts';
import { nearest } from '../units/nearest.ts';
import { type CommonOptions, command } from './common-options.ts';
import { type Refusal, usageRefusal } from './refusal.ts';
import { print, printJson } from './terminal.ts';

/** `looptally data [NAME]`: the built-in data of a component or a published constant; without a name, the list. */
export function dataCommand(): Command {
  return command(
    'data',
    'Shows the built-in property data of a component with their sources; without a name, the list.',
    ['looptally data', 'looptally data NH3'],
  )
    .argument('[name]', 'a component (NH3) or a published constant')
    .action(runData);
}

function runData(name: string | undefined, options: CommonOptions): void {
  if (name === undefined) {
    const list = catalogueList();
    if (options.json) printJson(dataListJson(list, publishedConstants));
    else print(dataListText(list, publishedConstants));
    return;
  }
  const entry = catalogueEntry(name);
  const constants = publishedConstants.filter((constant) => constant.name === name);
  if (entry !== undefined) {
    if (options.json) printJson(dataEntryJson(entry));
    else print(dataEntryText(entry));
  } else if (constants.length > 0) {
    if (options.json) printJson({ constants: constants.map(constantJson) });
    else print(constantsText(constants));
  } else {
    throw unknownName(name, [...catalogueList().map((line) => line.id), ...publishedConstantNames]);
  }
}

function unknownName(name: string, known: readonly string[]): Refusal {
  const near = nearest(name, known);
  return usageRefusal(
    'unknown-data',
    `There are no data of ${name}.`,
    near === null
      ? 'neither a component nor a published constant has that name'
      : `the nearest name is ${near}`,
    near === null ? 'looptally data lists what there is' : `write looptally data ${near}`,
    name,
  );
}
