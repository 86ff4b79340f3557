import { type Command, InvalidArgumentError } from 'commander';
import type { Flowsheet, Formula } from '../model/flowsheet.ts';
import { uncertaintyPage } from '../sheets/study-page/uncertainty-page.ts';
import { uncertaintyText } from '../sheets/uncertainty.ts';
import { uncertaintyCsv } from '../sheets/uncertainty-csv.ts';
import { uncertaintyJson } from '../sheets/uncertainty-json.ts';
import { keyFigureFormulas } from '../study/key-figures.ts';
import type { SamplingMethod } from '../study/sampling.ts';
import { SOBOL_DIMENSIONS } from '../study/sobol-sequence.ts';
import { type Uncertainty, type UncertaintyOptions, uncertainty } from '../study/uncertainty.ts';
import { balance } from '../tally/balance.ts';
import { collect, type FileOptions, fileCommand, oneOf } from './common-options.ts';
import { exitCodes } from './exit-codes.ts';
import { openFlowsheet } from './open-flowsheet.ts';
import { recordedFormulas } from './record-option.ts';
import { aboutSource, type Source, usageRefusal } from './refusal.ts';
import { resultJson, tellShortfall } from './solve.ts';
import { checkPageRows, isPage, pageOptions } from './study-page.ts';
import { paintFor, print, printJson, say } from './terminal.ts';
import { checkOutputs, writeOutputs } from './write-files.ts';

interface UncertaintyCommandOptions extends FileOptions {
  readonly samples: number;
  readonly seed: number;
  readonly method: SamplingMethod;
  readonly shares: 'rank' | 'sobol';
  readonly percentiles: readonly number[];
  readonly record?: readonly string[];
  readonly out?: string;
}

const DEFAULT_PERCENTILES = [5, 10, 50, 90, 95];

/** `looptally uncertainty FILE`: what the spreads of the file make of its figures. */
export function uncertaintyCommand(): Command {
  return fileCommand(
    'uncertainty',
    'Closes the loop for samples of what the file spreads, and prints percentiles of the figures and what causes them. ' +
      'Exit code 3 where a sample did not close: the rest is printed all the same.',
    [
      'looptally uncertainty flowsheets/ammonia-uncertain.yaml',
      'looptally uncertainty flowsheets/ammonia-uncertain.yaml --samples 4096 --seed 7 --record figures.recycle_ratio,streams.S4.y.Ar --out samples.csv',
      'looptally uncertainty flowsheets/ammonia-uncertain.yaml --shares sobol --samples 512 --json',
    ],
  )
    .option(
      '--samples <n>',
      'how many; powers of two are spread most evenly',
      wholeNumber(1, 10_000_000),
      1024,
    )
    .option('--seed <k>', 'one seed gives one result', wholeNumber(0, 2 ** 32 - 1), 1)
    .option('--method <name>', 'how samples are drawn: sobol, latin', oneOf(['sobol', 'latin']), 'sobol')
    .option(
      '--shares <name>',
      'what causes the spread of a figure: rank (from the samples), sobol (indices, by further cases)',
      oneOf(['rank', 'sobol']),
      'rank',
    )
    .option('--percentiles <list>', 'which ones, e.g. 1,50,99', percentileList, DEFAULT_PERCENTILES)
    .option('--record <expr,...>', 'figures to look at (repeatable); the key figures if left out', collect)
    .option('--out <file>', 'write all samples to a table: .csv; or a page with charts: .html')
    .action(runUncertainty);
}

async function runUncertainty(file: string, options: UncertaintyCommandOptions): Promise<void> {
  if (options.out !== undefined) checkOutputs([options.out], file);
  const { flowsheet, source } = await openFlowsheet(file, options);
  checkPlan(flowsheet, options, file);
  const cases = options.samples * (options.shares === 'sobol' ? flowsheet.spreads.length + 2 : 1);
  if (isPage(options.out)) checkPageRows(cases, options.out!);
  const typed = options.record === undefined ? null : recordedFormulas(options.record, flowsheet);
  const record = typed ?? figuresInFile(flowsheet, source, options);
  if (record === null) return;
  const found = uncertainty(flowsheet, { ...studyOptions(options), record, progress: progressOf(options) });
  if (found.failed + found.extraFailed > 0) process.exitCode = exitCodes.notClosed;
  if (options.out !== undefined) writeOutputs([{ path: options.out, content: fileOf(found, options.out) }]);
  if (options.json) printJson(uncertaintyJson(found));
  else print(uncertaintyText(found, { paint: paintFor(process.stdout) }));
  if (options.out !== undefined && !options.quiet) say(`wrote ${options.out}`);
}

function fileOf(found: Uncertainty, path: string): string {
  return isPage(path) ? uncertaintyPage(found, pageOptions(path)) : uncertaintyCsv(found);
}

/** The key figures of the file as it stands; null, with the reason told, where it does not close. */
function figuresInFile(
  flowsheet: Flowsheet,
  source: Source,
  options: UncertaintyCommandOptions,
): readonly Formula[] | null {
  const { result, diagnosis } = aboutSource(source, () => balance(flowsheet));
  if (result.convergence.converged) return keyFigureFormulas(result.figures);
  process.exitCode = exitCodes.notClosed;
  const solved = { flowsheet, source, result, diagnosis };
  if (options.json) printJson(resultJson(solved));
  else tellShortfall(solved);
  return null;
}

/** All that can be told before the first case. */
function checkPlan(flowsheet: Flowsheet, { method, shares }: UncertaintyCommandOptions, file: string): void {
  const { spreads, correlations } = flowsheet;
  if (spreads.length === 0) {
    throw usageRefusal(
      'no-spreads',
      `${file} says nothing of what is uncertain.`,
      'there are no spreads in it',
      'add e.g. spreads: {condenser.temperature: {kind: normal, sd: 2 K}}',
      file,
    );
  }
  if (shares === 'sobol' && correlations.length > 0) {
    throw usageRefusal(
      'shares-of-correlated',
      'Sobol indices share out what independent spreads cause.',
      'with correlations no part of the variance belongs to one spread alone',
      'leave --shares sobol out, or take the correlations out of the file',
      'sobol',
    );
  }
  const dimensions = spreads.length * (shares === 'sobol' ? 2 : 1);
  if (method === 'sobol' && dimensions > SOBOL_DIMENSIONS) {
    throw usageRefusal(
      'too-many-spreads',
      `${spreads.length} spreads are too many for the Sobol sequence.`,
      `it has ${SOBOL_DIMENSIONS} dimensions here${shares === 'sobol' ? ', and --shares sobol takes two for each spread' : ''}`,
      'write --method latin',
      file,
    );
  }
}

function studyOptions(options: UncertaintyCommandOptions): Omit<UncertaintyOptions, 'record'> {
  const { samples, seed, method, shares, percentiles } = options;
  return { samples, seed, method, shares, percentiles };
}

/** A line on standard error now and then; a terminal has it overwritten. */
function progressOf({ quiet }: UncertaintyCommandOptions): NonNullable<UncertaintyOptions['progress']> {
  if (quiet || !process.stderr.isTTY) return () => {};
  return (done, total, failed) => {
    if (done % 100 !== 0 && done !== total) return;
    const line = `${done} of ${total} cases${failed > 0 ? `, ${failed} did not close` : ''}`;
    process.stderr.write(done === total ? `\r${' '.repeat(line.length)}\r` : `\r${line}`);
  };
}

function wholeNumber(least: number, most: number): (text: string) => number {
  return (text) => {
    const value = Number(text);
    if (/^\d+$/.test(text.trim()) && value >= least && value <= most) return value;
    throw new InvalidArgumentError(`it must be a whole number from ${least} to ${most}.`);
  };
}

function percentileList(text: string): readonly number[] {
  const values = text.split(',').map((piece) => (piece.trim() === '' ? Number.NaN : Number(piece)));
  if (values.every((value) => value > 0 && value < 100)) {
    return [...new Set(values)].sort((a, b) => a - b);
  }
  throw new InvalidArgumentError('it must be a list of numbers above 0 and below 100.');
}
