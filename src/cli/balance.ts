import type { Command } from 'commander';
import { figureUnits } from '../sheets/figure-units.ts';
import { textSheet } from '../sheets/text.ts';
import { fileCommand } from './common-options.ts';
import { resultJson, type SolveOptions, solve, tellShortfall, withSolveOptions } from './solve.ts';
import { paintFor, print, printJson } from './terminal.ts';
import { version } from './version.ts';

interface BalanceCommandOptions extends SolveOptions {
  readonly trace?: boolean;
}

/** `looptally balance FILE`: close the loop and print its sheet. */
export function balanceCommand(): Command {
  const command = fileCommand(
    'balance',
    'Closes the loop and prints its story, stream table, ledger and closure.',
    [
      'looptally new ammonia --out loop.yaml',
      'looptally balance loop.yaml',
      "looptally balance loop.yaml --set 'condenser.temperature=-10 degC' --trace",
    ],
  );
  return withSolveOptions(command).option('--trace', 'show each pass of the solver').action(runBalance);
}

async function runBalance(file: string, options: BalanceCommandOptions): Promise<void> {
  const solved = await solve(file, options);
  if (options.json) {
    printJson(resultJson(solved));
    return;
  }
  print(
    textSheet(solved.result, {
      figureUnits: figureUnits(solved.flowsheet),
      paint: paintFor(process.stdout),
      diagnosis: solved.diagnosis,
      trace: options.trace === true,
      version,
    }),
  );
  tellShortfall(solved);
}
