import type { Command } from 'commander';
import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import type { Flowsheet, MethodName } from '../model/flowsheet.ts';
import type { Result } from '../model/result.ts';
import { type BalanceOptions, balance } from '../tally/balance.ts';
import { type FileOptions, oneOf, positiveInteger, smallNumber } from './common-options.ts';
import { exitCodes } from './exit-codes.ts';
import { diagnosticsJson, tell } from './messages.ts';
import { openFlowsheet } from './open-flowsheet.ts';
import { aboutSource, type Source } from './refusal.ts';

export interface SolveOptions extends FileOptions {
  readonly method?: MethodName;
  readonly tolerance?: number;
  readonly maxPasses?: number;
}

export interface Solved {
  readonly flowsheet: Flowsheet;
  readonly source: Source;
  readonly result: Result;
  readonly diagnosis: Diagnostic | null;
}

const METHODS: readonly MethodName[] = [
  'auto',
  'direct',
  'wegstein',
  'eigenvalue',
  'anderson',
  'broyden',
  'newton',
];

/** The options of every command that closes a loop. */
export function withSolveOptions(command: Command): Command {
  return command
    .option('--method <name>', `how to close the loop: ${METHODS.join(', ')}`, oneOf(METHODS))
    .option('--tolerance <number>', 'relative residual at which the loop counts as closed', smallNumber)
    .option('--max-passes <number>', 'give up after so many passes', positiveInteger);
}

/**
 * Read a flowsheet, close it and set the exit code.
 *
 * @param curves  true where the curves of the blocks are wanted besides their numbers
 */
export async function solve(
  file: string,
  options: SolveOptions,
  curves = options.json === true,
): Promise<Solved> {
  const { flowsheet, source } = await openFlowsheet(file, options);
  const { result, diagnosis } = aboutSource(source, () =>
    balance(flowsheet, { ...balanceOptions(options), curves }),
  );
  process.exitCode = exitCodeOf(result);
  return { flowsheet, source, result, diagnosis };
}

/** Tell why a loop did not close and which aims stayed out of reach; silent where all went well. */
export function tellShortfall({ result, diagnosis, source }: Solved): void {
  if (diagnosis !== null) tell([diagnosis], source);
  else if (!result.convergence.converged) throw new Error('the loop did not close and no reason was given');
}

/** The result as `--json` hands it out; where the loop did not close, the reason goes with it. */
export function resultJson({ result, diagnosis }: Solved): unknown {
  return diagnosis === null ? result : { ...result, ...diagnosticsJson([diagnosis]) };
}

/** The exit code that says how closing went. */
export function exitCodeOf(result: Result): number {
  if (!result.convergence.converged) return exitCodes.notClosed;
  return Object.values(result.aims).every((aim) => aim.reached) ? exitCodes.done : exitCodes.aimNotReached;
}

/** What the options of the command line overrule. */
export function balanceOptions({ method, tolerance, maxPasses }: SolveOptions): BalanceOptions {
  return {
    ...(method === undefined ? {} : { method }),
    ...(tolerance === undefined ? {} : { tolerance }),
    ...(maxPasses === undefined ? {} : { maxPasses }),
  };
}
