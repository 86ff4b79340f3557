import { type Command, InvalidArgumentError } from 'commander';
import type { Flowsheet } from '../model/flowsheet.ts';
import { createGrid, type Grid, pathsOfPart } from '../study/grid.ts';
import { createReading, type ReadingColumn } from '../study/reading.ts';
import { type PathTable, sweepHeads } from '../study/sweep.ts';
import { limitsToRecord } from '../study/swept-table.ts';
import { collect, fileCommand, positiveInteger } from './common-options.ts';
import { exitCodes } from './exit-codes.ts';
import { openFlowsheet } from './open-flowsheet.ts';
import { createProgress } from './progress.ts';
import { aboutSource, commandLine, type Source, usageRefusal } from './refusal.ts';
import { balanceOptions, withSolveOptions } from './solve.ts';
import { Stopped, stoppable, tellStopped } from './stop-signals.ts';
import { checkPageRows, isPage } from './study-page.ts';
import { closeFirstCase } from './sweep-first-case.ts';
import { planOf, type SweepJob } from './sweep-job.ts';
import { noPageOfPart } from './sweep-page.ts';
import { type AxisWanted, planAxes, typedAxes } from './sweep-plan.ts';
import { makePaths, WorkerLost } from './sweep-pool.ts';
import { printedTable } from './sweep-print.ts';
import { checkDetails, typedRecord, usualRecord } from './sweep-record.ts';
import { workerLost } from './sweep-resume.ts';
import {
  counter,
  type Part,
  type Run,
  rowsOf,
  type SweepOptions,
  sayWarnings,
  summary,
  type Tallied,
} from './sweep-run.ts';
import { toFile } from './sweep-to-file.ts';
import { tableKind, tableKinds } from './table-file.ts';
import { say } from './terminal.ts';
import { checkOutputs } from './write-files.ts';

/** `looptally sweep FILE`: a table of closed cases over a grid of settings. */
export function sweepCommand(): Command {
  const command = fileCommand(
    'sweep',
    'Closes the loop for every combination of some settings and writes a table of what is asked for.',
    [
      'looptally new ammonia --out loop.yaml',
      "looptally sweep loop.yaml --over 'condenser.temperature=-25 degC..10 degC:8'",
      "looptally sweep loop.yaml --over 'purge.fractions.bleed=0.5 %..10 %:12 log' --record figures.recycle_ratio,streams.S2.y.Ar --out table.csv",
    ],
  );
  return withSolveOptions(command)
    .option(
      '--over <path=values>',
      'a setting and its values: a..b:n, a..b:n log, or a list a,b,c (repeatable: a grid, the last one runs fastest); the study of the file if left out',
      collect,
    )
    .option('--record <expressions>', 'figures or formulas, with commas between them (repeatable)', collect)
    .option(
      '--out <file>',
      'write the table to a file: .csv, .ndjson or .parquet; with charts as a page: .html',
    )
    .option('--workers <number>', 'threads that share the work; the table is the same', positiveInteger)
    .option('--resume', 'go on with a sweep that was stopped, however it was')
    .option(
      '--part <k/n>',
      'only this slice of the grid; looptally gather joins the slices. Of a small grid they are uneven: 8 rows or more stay together',
      partOf,
    )
    .option('--yes', 'a grid of more than a million points is meant')
    .action(runSweep);
}

async function runSweep(file: string, options: SweepOptions): Promise<void> {
  const { out, part = WHOLE } = options;
  checkOut(out, file, options);
  const { flowsheet, source } = await openFlowsheet(file, options);
  const axes = await planAxes(
    axesWanted(flowsheet, source, options),
    { source, set: options.set ?? [], case: options.case ?? null },
    options.yes === true,
  );
  const asked = recordWanted(flowsheet, options);
  const limits = isPage(out) ? limitsToRecord(flowsheet, asked) : [];
  const record = [...asked, ...limits.map(({ formula }) => formula.text.trim())];
  const job: SweepJob = {
    text: source.text,
    file: source.name,
    set: options.set ?? [],
    case: options.case ?? null,
    axes,
    record,
    ...balanceOptions(options),
  };
  const grid = createGrid(axes);
  checkPart(part, grid);
  if (isPage(out)) checkPageRows(grid.size, out!);
  const first = closeFirstCase(flowsheet, axes, balanceOptions(options));
  aboutSource(source, () => checkDetails(record, first.scope));
  const [from, to] = pathsOfPart(grid, part.part, part.of);
  const isWhole = part.of === 1;
  const columns = [
    ...axes.map(({ path: name, unit }) => ({ name, unit, swept: true })),
    ...record.map(recorded),
  ];
  const note =
    isWhole && options.over === undefined && options.record === undefined ? flowsheet.study?.note : [];
  const reading = createReading(note ?? [], columns);
  const run = {
    flowsheet,
    added: limits.map(({ text }) => text),
    job,
    grid,
    from,
    to,
    part,
    reading,
    warnings: first.warnings,
    options,
  };
  const tallied = out === undefined ? await toStandardOutput(run) : await toFile({ ...run, out });
  if (tallied !== null) sayWarnings(run);
  if (tallied !== null && tallied.cases === tallied.notClosed) process.exitCode = exitCodes.notClosed;
}

/** @returns null where it was stopped */
async function toStandardOutput({ job, grid, from, to, reading, options }: Run): Promise<Tallied | null> {
  const table = printedTable(sweepHeads(planOf(job)), job.axes.length, options.json === true);
  const progress = await createProgress(rowsOf(grid, from, to), 0, options.quiet === true || isTerminal());
  const count = counter();
  const take = (rows: PathTable) => {
    count.add(rows.converged);
    reading.add(rows);
    table.add(rows);
    progress.tell(count.cases, count.notClosed);
  };
  try {
    await stoppable((signal) => makePaths(job, { from, to, workers: options.workers, signal }, take));
  } catch (error) {
    if (error instanceof Stopped) {
      tellStopped(error, 'the table above is not whole; with --out NAME.csv what is done is kept');
      return null;
    }
    if (error instanceof WorkerLost)
      throw workerLost(error, '', 'repeat the command with fewer --workers, or with --out');
    throw error;
  } finally {
    progress.end();
  }
  table.end({ cases: count.cases, not_converged: count.notClosed, note: reading.lines() });
  if (!options.quiet && count.notClosed > 0) say(summary(count));
  return count;
}

function axesWanted(flowsheet: Flowsheet, source: Source, { over }: SweepOptions): AxisWanted[] {
  if (over !== undefined) return typedAxes(over, commandLine());
  const study = flowsheet.study?.over ?? [];
  if (study.length === 0) {
    throw usageRefusal(
      'missing-option',
      'looptally sweep needs the settings to go over.',
      'neither --over nor a study in the file names one',
      "write e.g. --over 'condenser.temperature=-25 degC..10 degC:8'",
    );
  }
  return study.map(({ path, text, placeInside }) => ({
    path,
    text,
    source,
    fault: ({ code, what, why, mend }, offset = 0, length = text.length) => {
      return { code, severity: 'error', where: placeInside(offset, length), what, why, mend };
    },
  }));
}

function recordWanted(flowsheet: Flowsheet, { record }: SweepOptions): string[] {
  if (record !== undefined) return typedRecord(record, flowsheet);
  const study = flowsheet.study?.record ?? [];
  return study.length > 0 ? study.map(({ text }) => text.trim()) : usualRecord(flowsheet);
}

function recorded(name: string): ReadingColumn {
  return { name, unit: '', swept: false };
}

const WHOLE: Part = { part: 1, of: 1 };

function partOf(text: string): Part {
  const match = /^\s*(\d+)\s*\/\s*(\d+)\s*$/.exec(text);
  const [part, of] = [Number(match?.[1]), Number(match?.[2])];
  if (!(part >= 1 && part <= of && Number.isSafeInteger(of))) {
    throw new InvalidArgumentError('it must be k/n, k from 1 to n, e.g. 2/8.');
  }
  return { part, of };
}

function checkPart({ part, of }: Part, { paths, size, pathRows }: Grid): void {
  if (of <= paths) return;
  throw usageRefusal(
    'bad-part',
    `A grid of ${size} ${size === 1 ? 'point' : 'points'} has no ${of} slices.`,
    `${pathRows} points after one another start from their neighbours and stay together`,
    paths === 1 ? 'leave --part out' : `ask for ${paths} slices at most`,
    `${part}/${of}`,
  );
}

function checkOut(out: string | undefined, file: string, { resume, part }: SweepOptions): void {
  if (out !== undefined) {
    checkOutputs([out], file);
    if (isPage(out) && part !== undefined) throw noPageOfPart(out);
    if (isPage(out) || tableKinds.has(tableKind(out))) return;
    throw usageRefusal(
      'bad-output',
      `${out} has no ending that tells what to write.`,
      `a table is written as ${[...tableKinds.keys()].join(', ')}, a page as .html`,
      'write e.g. --out table.csv',
      out,
    );
  }
  const needs = resume ? '--resume' : part !== undefined ? '--part' : null;
  if (needs === null) return;
  throw usageRefusal(
    'missing-option',
    `${needs} needs the option --out.`,
    'what is on standard output cannot be gone on with, nor joined',
    'write e.g. --out table.csv',
    needs,
  );
}

/** A bar between the rows of a table on the same terminal would only be in the way. */
function isTerminal(): boolean {
  return process.stdout.isTTY === true && process.stderr.isTTY === true;
}
