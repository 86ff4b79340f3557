import type { Command } from 'commander';
import type { Flowsheet } from '../model/flowsheet.ts';
import { compareJson, compareText } from '../sheets/compare.ts';
import { compareRenderers } from '../sheets/compare-tables.ts';
import { comparePage } from '../sheets/study-page/compare-page.ts';
import { type Comparison, compare } from '../study/compare.ts';
import { collect, command, type FileOptions, withMaxSize } from './common-options.ts';
import { exitCodes } from './exit-codes.ts';
import { tell } from './messages.ts';
import { flowsheetIn } from './open-flowsheet.ts';
import { rendererOf } from './output-format.ts';
import { readSource } from './read-source.ts';
import { type Source, usageRefusal } from './refusal.ts';
import { balanceOptions, exitCodeOf, type SolveOptions, withSolveOptions } from './solve.ts';
import { pageOptions } from './study-page.ts';
import { paintFor, print, printJson, say } from './terminal.ts';
import { checkOutputs, writeOutputs } from './write-files.ts';

interface CompareOptions extends Omit<SolveOptions, 'case'> {
  readonly case?: readonly string[];
  readonly out?: readonly string[];
}

const renderers = new Map<string, (found: Comparison, path: string) => string>([
  ...compareRenderers,
  ['.html', (found, path) => comparePage(found, pageOptions(path))],
]);

interface Member {
  readonly name: string;
  readonly flowsheet: Flowsheet;
  readonly source: Source;
}

/** `looptally compare FILE [FILE2 ...]`: cases or files side by side, the cause first. */
export function compareCommand(): Command {
  const made = withMaxSize(
    command(
      'compare',
      'Closes cases of a file, or several files, and sets them side by side: settings that differ, then the figures.',
      [
        'looptally new ammonia --out loop.yaml',
        'looptally compare loop.yaml',
        "looptally compare loop.yaml --case 'cold condenser' --out cases.csv --out cases.md",
      ],
    ),
  )
    .argument('<file...>', 'flowsheets; one alone is compared with all its cases')
    .option('--set <path=value>', 'change one setting in all of them (repeatable)', collect, [])
    .option(
      '--case <name>',
      'a case to compare (repeatable); all cases of a single file if left out',
      collect,
    )
    .option(
      '--out <name...>',
      'file to write (repeatable): .csv (numbers in full), .md or .html (a page)',
      collect,
    );
  return withSolveOptions(made).action(runCompare);
}

async function runCompare(files: readonly string[], options: CompareOptions): Promise<void> {
  const outputs = (options.out ?? []).map((path) => ({
    path,
    render: rendererOf(path, renderers, 'comparison'),
  }));
  for (const file of files) checkOutputs(options.out ?? [], file);
  const { case: cases, out: _, ...solving } = options;
  const members = await membersOf(files, cases, solving);
  const found = compare(members, balanceOptions(solving));
  process.exitCode = exitCode(found.columns);
  writeOutputs(outputs.map(({ path, render }) => ({ path, content: render(found, path) })));
  if (options.json) {
    printJson(compareJson(found));
    return;
  }
  if (outputs.length === 0) print(compareText(found, { paint: paintFor(process.stdout) }));
  else if (!options.quiet) say(`wrote ${outputs.map(({ path }) => path).join(', ')}`);
  found.columns.forEach(({ diagnosis }, c) => {
    if (diagnosis !== null) tell([diagnosis], members[c].source);
  });
}

function exitCode(columns: ReturnType<typeof compare>['columns']): number {
  const codes = columns.map(({ result, closed }) => (closed ? exitCodeOf(result!) : exitCodes.notClosed));
  if (codes.includes(exitCodes.notClosed)) return exitCodes.notClosed;
  return codes.includes(exitCodes.aimNotReached) ? exitCodes.aimNotReached : exitCodes.done;
}

async function membersOf(
  files: readonly string[],
  asked: readonly string[] | undefined,
  options: FileOptions,
): Promise<Member[]> {
  const members: Member[] = [];
  for (const file of files) {
    const text = await readSource(file, options.maxSize);
    const { flowsheet, source } = await flowsheetIn(text, options);
    const plain = files.length === 1 ? 'as in the file' : file;
    members.push({ name: plain, flowsheet, source });
    // Of several files each may have cases of its own; a name that none has is refused below.
    const cases = asked ?? (files.length === 1 ? flowsheet.cases : []);
    for (const name of new Set(cases)) {
      if (files.length > 1 && !flowsheet.cases.includes(name)) continue;
      const opened = await flowsheetIn(text, { ...options, quiet: true, case: name });
      members.push({ name: files.length === 1 ? name : `${file}: ${name}`, ...opened });
    }
  }
  const known = members.map(({ flowsheet }) => flowsheet.caseName);
  const missing = asked?.find((name) => !known.includes(name));
  if (missing !== undefined) throw unknownCase(missing, members);
  if (members.length === 1) throw nothingToCompare(files[0]);
  return members;
}

function unknownCase(name: string, members: readonly Member[]) {
  const cases = [...new Set(members.flatMap(({ flowsheet }) => flowsheet.cases))];
  return usageRefusal(
    'unknown-case',
    `None of the files has a case "${name}".`,
    cases.length === 0 ? 'they have no cases' : `their cases are ${cases.join(', ')}`,
    'name one of their cases, or leave --case out',
    name,
  );
}

function nothingToCompare(file: string) {
  return usageRefusal(
    'nothing-to-compare',
    `There is nothing to compare ${file} with.`,
    'one file was given and it has no cases',
    'add a case to the file, or name a second file',
    file,
  );
}
