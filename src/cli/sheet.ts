import { extname } from 'node:path';
import type { Command } from 'commander';
import { type CsvTableName, csvTables } from '../sheets/csv.ts';
import { figureUnits } from '../sheets/figure-units.ts';
import { renderers } from '../sheets/renderers.ts';
import { collect, fileCommand, oneOf } from './common-options.ts';
import { liveScript } from './live-script.ts';
import { type Refusal, usageRefusal } from './refusal.ts';
import { resultJson, type SolveOptions, solve, tellShortfall, withSolveOptions } from './solve.ts';
import { printJson, say } from './terminal.ts';
import { version } from './version.ts';
import { checkOutputs, type Output, writeOutputs } from './write-files.ts';

interface SheetCommandOptions extends SolveOptions {
  readonly out?: readonly string[];
  readonly table?: CsvTableName;
}

/** `looptally sheet FILE --out NAME ...`: close the loop and write its sheet, in one format or several. */
export function sheetCommand(): Command {
  const tables = Object.keys(csvTables);
  const command = fileCommand('sheet', 'Closes the loop and writes its sheet to one or several files.', [
    'looptally new ammonia --out loop.yaml',
    'looptally sheet loop.yaml --out loop.xlsx --out loop.md',
    'looptally sheet loop.yaml --out ledger.csv --table ledger',
    'looptally sheet loop.yaml --out loop.svg',
    'looptally sheet loop.yaml --out loop.html',
  ]);
  return withSolveOptions(command)
    .option(
      '--out <name...>',
      `file to write (repeatable); its ending says the format: ${formats()}`,
      collect,
    )
    .option('--table <name>', `what a .csv holds: ${tables.join(', ')}`, oneOf(tables), 'streams')
    .action(runSheet);
}

async function runSheet(file: string, options: SheetCommandOptions): Promise<void> {
  const paths = options.out ?? [];
  if (paths.length === 0) throw nowhereToWrite();
  const chosen = paths.map((path) => ({ path, renderer: rendererFor(path) }));
  checkOutputs(paths, file);
  const isPage = ({ path }: { readonly path: string }) => extname(path).toLowerCase() === '.html';
  const pages = chosen.some(isPage);
  const solved = await solve(file, options, pages || options.json === true);
  if (!solved.result.convergence.converged) {
    // What does not close is no sheet: a file without that word on it would pass for an answer.
    if (options.json) printJson(resultJson(solved));
    else {
      if (!options.quiet) say(`nothing was written: ${file} did not close`);
      tellShortfall(solved);
    }
    return;
  }
  const { flowsheet, result, source } = solved;
  const product = flowsheet.ledger.product?.stream;
  const sheetOptions = {
    flowsheet,
    version,
    figureUnits: figureUnits(flowsheet),
    drawing: { notes: flowsheet.notes, ...(product === undefined ? {} : { product }) },
    ...(options.table === undefined ? {} : { table: options.table }),
    ...(pages ? { live: { script: liveScript(), text: source.text, set: options.set ?? [] } } : {}),
  };
  const outputs: Output[] = [];
  for (const { path, renderer } of chosen)
    outputs.push({ path, content: await renderer.render(result, sheetOptions) });
  writeOutputs(outputs);
  if (options.json) {
    printJson(resultJson(solved));
    return;
  }
  if (!options.quiet) say(`wrote ${paths.join(', ')}`);
  tellShortfall(solved);
}

function rendererFor(path: string) {
  const renderer = renderers.get(extname(path).toLowerCase());
  if (renderer === undefined) throw unknownFormat(path);
  return renderer;
}

function formats(): string {
  return [...renderers].map(([extension, { summary }]) => `${extension} (${summary})`).join(', ');
}

function unknownFormat(path: string): Refusal {
  const extension = extname(path);
  return usageRefusal(
    'unknown-format',
    extension === '' ? `${path} does not say its format.` : `There is no sheet of the format ${extension}.`,
    `the ending of the name says the format; there are ${listed([...renderers.keys()])}`,
    `write --out ${path.slice(0, path.length - extension.length)}.md`,
    path,
  );
}

function listed(names: readonly string[]): string {
  return `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}

function nowhereToWrite(): Refusal {
  return usageRefusal(
    'missing-output',
    'looptally sheet needs to know what to write.',
    'no --out was given',
    'write --out loop.md, or looptally balance for the sheet on the terminal',
    'sheet',
  );
}
