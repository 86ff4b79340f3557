import { rmSync } from 'node:fs';
import { type Command, InvalidArgumentError } from 'commander';
import type { Flowsheet } from '../model/flowsheet.ts';
import { createGrid, type Grid, pathsOfPart } from '../study/grid.ts';
import { createReading, type ReadingColumn, type StudyReading } from '../study/reading.ts';
import { sweepHeads } from '../study/sweep.ts';
import { limitsToRecord } from '../study/swept-table.ts';
import { collect, fileCommand, positiveInteger } from './common-options.ts';
import { exitCodes } from './exit-codes.ts';
import { openFlowsheet } from './open-flowsheet.ts';
import { createProgress } from './progress.ts';
import { aboutSource, commandLine, type Source, usageRefusal } from './refusal.ts';
import { balanceOptions, type SolveOptions, withSolveOptions } from './solve.ts';
import { checkPageRows, isPage } from './study-page.ts';
import { planOf, type SweepJob } from './sweep-job.ts';
import { createPageSink, noPageOfPart } from './sweep-page.ts';
import { type AxisWanted, planAxes, typedAxes } from './sweep-plan.ts';
import { makePaths } from './sweep-pool.ts';
import { printedTable } from './sweep-print.ts';
import { checkDetails, typedRecord, usualRecord } from './sweep-record.ts';
import { checkRoom, fingerprintOf, identityOf, openJournal, writeTrouble } from './sweep-resume.ts';
import { tableKind, tableKinds, writeRenamed } from './table-file.ts';
import { print, printJson, say } from './terminal.ts';
import { checkOutputs } from './write-files.ts';

interface SweepOptions extends SolveOptions {
  readonly over?: readonly string[];
  readonly record?: readonly string[];
  readonly out?: string;
  readonly workers?: number;
  readonly resume?: boolean;
  readonly part?: Part;
  readonly yes?: boolean;
}

interface Part {
  readonly part: number;
  readonly of: number;
}

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
  aboutSource(source, () =>
    checkDetails(
      flowsheet,
      record,
      axes.map(({ path, values }) => ({ path, value: values[0]! })),
    ),
  );
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
    options,
  };
  const tallied = out === undefined ? await toStandardOutput(run) : await toFile({ ...run, out });
  process.exitCode = tallied.cases === tallied.notClosed ? exitCodes.notClosed : exitCodes.done;
}

interface Run {
  readonly flowsheet: Flowsheet;
  /** limits whose figures are recorded for a page though nobody asked */
  readonly added: readonly string[];
  readonly job: SweepJob;
  readonly grid: Grid;
  readonly from: number;
  readonly to: number;
  readonly part: Part;
  readonly reading: StudyReading;
  readonly options: SweepOptions;
}

interface Tallied {
  readonly cases: number;
  readonly notClosed: number;
}

async function toStandardOutput({ job, grid, from, to, reading, options }: Run): Promise<Tallied> {
  const table = printedTable(sweepHeads(planOf(job)), job.axes.length, options.json === true);
  const progress = await createProgress(rowsOf(grid, from, to), 0, options.quiet === true || isTerminal());
  const count = counter();
  await makePaths(job, { from, to, workers: options.workers }, (rows) => {
    count.add(rows.converged);
    reading.add(rows);
    table.add(rows);
    progress.tell(count.cases, count.notClosed);
  });
  progress.end();
  table.end({ cases: count.cases, not_converged: count.notClosed, note: reading.lines() });
  if (!options.quiet && count.notClosed > 0) say(summary(count));
  return count;
}

async function toFile(run: Run & { readonly out: string }): Promise<Tallied> {
  const { flowsheet, added, job, grid, from, to, part, reading, options, out } = run;
  const heads = sweepHeads(planOf(job));
  checkRoom(out, rowsOf(grid, from, to), heads.length - 3);
  const identity = identityOf(job, `${part.part}/${part.of}`);
  const journal = openJournal(out, identity, from, options.resume === true);
  const count = counter();
  try {
    for (const { converged } of journal.tables()) count.add(converged);
    const before = count.cases;
    const progress = await createProgress(rowsOf(grid, from, to), before, options.quiet === true);
    await makePaths(job, { from: from + journal.paths, to, workers: options.workers }, (rows) => {
      journal.add(rows);
      count.add(rows.converged);
      progress.tell(count.cases, count.notClosed);
    });
    progress.end();
    await writeRenamed(out, async (write) => {
      const sink = isPage(out)
        ? createPageSink({ flowsheet, added, job, heads, reading, out, write })
        : await tableKinds.get(tableKind(out))!(heads, write);
      for (const rows of journal.tables()) {
        reading.add(rows);
        sink.add(rows);
      }
      sink.end(part.of === 1 ? null : sliceMark(run, fingerprintOf(identity)));
    });
  } catch (error) {
    throw writeTrouble(`${out}.part`, error, true);
  } finally {
    journal.close();
  }
  rmSync(`${out}.part`);
  const note = reading.lines();
  if (options.json) printJson({ table: out, cases: count.cases, not_converged: count.notClosed, note });
  else print(note.map((line) => `${line}\n`).join(''));
  if (!options.quiet && !options.json) say(`${out}: ${summary(count)}${share(run)}`);
  return count;
}

/** What a slice has of the whole; silent for the whole. */
function share(run: Run): string {
  if (run.part.of === 1) return '';
  const { first, last, total } = sliceMark(run, '');
  return `; rows ${first} to ${last} of ${total}`;
}

function sliceMark({ grid, from, to, part }: Run, sweep: string) {
  return {
    part: `${part.part}/${part.of}`,
    first: from * grid.pathRows + 1,
    last: Math.min(to * grid.pathRows, grid.size),
    total: grid.size,
    sweep,
  };
}

function counter() {
  const count = {
    cases: 0,
    notClosed: 0,
    add(converged: Uint8Array) {
      count.cases += converged.length;
      for (const one of converged) if (one === 0) count.notClosed++;
    },
  };
  return count;
}

function summary({ cases, notClosed }: Tallied): string {
  const all = `${cases} ${cases === 1 ? 'case' : 'cases'}`;
  return notClosed === 0 ? all : `${all}, ${notClosed} of them not closed; their notes say why`;
}

function rowsOf({ pathRows, size }: Grid, from: number, to: number): number {
  return Math.min(to * pathRows, size) - from * pathRows;
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
