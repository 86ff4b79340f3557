import type { Command } from 'commander';
import { nearest } from '../diagnostics/nearest.ts';
import { type NumericSetting, numericSettings } from '../flowsheet/numeric-settings.ts';
import { leversJson, leversText } from '../sheets/levers.ts';
import { levers } from '../tally/levers.ts';
import { collect, fileCommand } from './common-options.ts';
import { diagnosticsJson } from './messages.ts';
import { openFlowsheet } from './open-flowsheet.ts';
import { aboutSource, type UsageFault, usageRefusals } from './refusal.ts';
import { balanceOptions, exitCodeOf, type SolveOptions, tellShortfall, withSolveOptions } from './solve.ts';
import { paintFor, print, printJson } from './terminal.ts';

interface LeversCommandOptions extends SolveOptions {
  readonly over?: readonly string[];
}

/** `looptally levers FILE`: what one unit more of each setting does to the closed loop. */
export function leversCommand(): Command {
  const command = fileCommand(
    'levers',
    'Closes the loop and prints what a small change of each setting does to the key figures, from the linearised loop.',
    [
      'looptally new ammonia --out loop.yaml',
      'looptally levers loop.yaml',
      'looptally levers loop.yaml --over condenser.temperature --over purge --json',
    ],
  );
  return withSolveOptions(command)
    .option(
      '--over <setting>',
      'a setting to look at, or a block or feed with all its settings (repeatable); all if left out',
      collect,
    )
    .action(runLevers);
}

async function runLevers(file: string, options: LeversCommandOptions): Promise<void> {
  const { flowsheet, source } = await openFlowsheet(file, options);
  const all = numericSettings(flowsheet);
  const over = options.over === undefined ? all : chosen(all, options.over);
  const found = aboutSource(source, () => levers(flowsheet, { ...balanceOptions(options), over }));
  const { result, diagnosis } = found;
  process.exitCode = exitCodeOf(result);
  if (options.json) {
    printJson({
      ...(leversJson(found) as object),
      ...(diagnosis === null ? {} : diagnosticsJson([diagnosis])),
    });
    return;
  }
  if (result.convergence.converged) print(leversText(found, { paint: paintFor(process.stdout) }));
  tellShortfall({ flowsheet, source, result, diagnosis });
}

/** The settings that were named, in the order of the file. */
function chosen(all: readonly NumericSetting[], names: readonly string[]): readonly NumericSetting[] {
  const fits = (setting: NumericSetting, name: string) =>
    setting.path === name || setting.path.startsWith(`${name}.`);
  const faults = names
    .filter((name) => !all.some((setting) => fits(setting, name)))
    .map((name) => faultOf(name, all));
  if (faults.length > 0) throw usageRefusals(faults);
  return all.filter((setting) => names.some((name) => fits(setting, name)));
}

function faultOf(name: string, all: readonly NumericSetting[]): UsageFault {
  const paths = all.map(({ path }) => path);
  const near = nearest(name, [...paths, ...new Set(paths.map((path) => path.split('.', 1)[0]!))]);
  return {
    code: 'unknown-setting',
    what: `${name} is no setting of this file that is a number and has a value.`,
    why: near === null ? 'a setting left to its default has no lever' : `the nearest setting is ${near}`,
    mend: near === null ? `write one of ${paths.join(', ')}` : `write --over ${near}`,
    at: name,
  };
}
