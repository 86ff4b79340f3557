import type { Command } from 'commander';
import { checkText } from '../sheets/check.ts';
import { planFlowsheet } from '../tally/plan.ts';
import { type FileOptions, fileCommand } from './common-options.ts';
import { exitCodes } from './exit-codes.ts';
import { diagnosticsJson, tell } from './messages.ts';
import { openFlowsheet } from './open-flowsheet.ts';
import { aboutSource } from './refusal.ts';
import { paintFor, print, printJson } from './terminal.ts';

/** `looptally check FILE`: read and check the file, and print what would be solved. */
export function checkCommand(): Command {
  return fileCommand(
    'check',
    'Reads and checks a flowsheet and prints what would be solved, without solving it.',
    ['looptally new ammonia --out loop.yaml', 'looptally check loop.yaml'],
  ).action(runCheck);
}

async function runCheck(file: string, options: FileOptions): Promise<void> {
  const { flowsheet, source, warnings } = await openFlowsheet(file, options);
  const plan = aboutSource(source, () => planFlowsheet(flowsheet));
  const refused = plan.diagnostics.some((diagnostic) => diagnostic.severity === 'error');
  if (refused) process.exitCode = exitCodes.badInput;
  if (options.json) {
    printJson({ ...plan, diagnostics: [...warnings, ...diagnosticsJson(plan.diagnostics).diagnostics] });
    return;
  }
  if (!refused) print(checkText(flowsheet, plan, { paint: paintFor(process.stdout) }));
  if (refused || !options.quiet) tell(plan.diagnostics, source);
}
