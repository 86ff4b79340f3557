import type { Command } from 'commander';
import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { shownWithUnit } from '../sheets/figure-display.ts';
import { figureUnits } from '../sheets/figure-units.ts';
import { formulaDisplay } from '../sheets/formula-display.ts';
import { optimiseText } from '../sheets/optimise.ts';
import { optimiseJson } from '../sheets/optimise-json.ts';
import { optimiseRenderers } from '../sheets/optimise-tables.ts';
import { optimisePage } from '../sheets/study-page/optimise-page.ts';
import { textSheet } from '../sheets/text.ts';
import { balanceAt } from '../study/balance-at.ts';
import { type Optimised, optimise } from '../study/optimise.ts';
import type { Balance } from '../tally/balance.ts';
import { collect, fileCommand, positiveInteger } from './common-options.ts';
import { exitCodes } from './exit-codes.ts';
import { diagnosticsJson, tell } from './messages.ts';
import { openFlowsheet } from './open-flowsheet.ts';
import { rendererOf } from './output-format.ts';
import { aboutSource, Refusal, type Source } from './refusal.ts';
import { balanceOptions, type SolveOptions, withSolveOptions } from './solve.ts';
import { pageOptions } from './study-page.ts';
import { paintFor, print, printJson, say } from './terminal.ts';
import { version } from './version.ts';
import { checkOutputs, writeOutputs } from './write-files.ts';

interface OptimiseCommandOptions extends SolveOptions {
  readonly out?: readonly string[];
  readonly sheet?: boolean;
  readonly starts?: number;
  readonly points?: number;
}

const renderers = new Map<string, (found: Optimised, path: string) => string>([
  ...optimiseRenderers,
  ['.html', (found, path) => optimisePage(found, pageOptions(path))],
]);

const codeOf = {
  found: exitCodes.done,
  'limits-not-met': exitCodes.aimNotReached,
  'not-closed': exitCodes.notClosed,
} as const;

/** `looptally optimise FILE`: the best settings for the objective in the file, or a trade-off front. */
export function optimiseCommand(): Command {
  const command = fileCommand(
    'optimise',
    'Finds the settings that make the objective of the file best within bounds and limits; with two goals, the trade-off.',
    [
      'looptally optimise flowsheets/methanol-optimum.yaml',
      'looptally optimise loop.yaml --sheet --out best.csv',
    ],
  );
  return withSolveOptions(command)
    .option('--starts <number>', 'descents from so many starts; 4 if left out', positiveInteger)
    .option('--points <number>', 'cases of a trade-off between two goals; 9 if left out', positiveInteger)
    .option('--sheet', 'the full sheet of the best case as well')
    .option(
      '--out <name...>',
      'file to write (repeatable): .csv (numbers in full), .md or .html (a page)',
      collect,
    )
    .action(runOptimise);
}

async function runOptimise(file: string, options: OptimiseCommandOptions): Promise<void> {
  const paths = options.out ?? [];
  const outputs = paths.map((path) => ({ path, render: rendererOf(path, renderers, 'optimum') }));
  checkOutputs(paths, file);
  const { flowsheet, source } = await openFlowsheet(file, options);
  const { objective } = flowsheet;
  if (objective === null) throw noObjective(source);
  const { starts, points } = options;
  const found = aboutSource(source, () =>
    optimise(flowsheet, objective, {
      ...balanceOptions(options),
      ...(starts === undefined ? {} : { starts }),
      ...(points === undefined ? {} : { points }),
    }),
  );
  process.exitCode = codeOf[found.outcome];
  const shortfall = shortfallOf(found);
  if (shortfall === null)
    writeOutputs(outputs.map(({ path, render }) => ({ path, content: render(found, path) })));
  const closed = options.sheet === true ? sheetOf(found, options) : null;
  if (options.json) {
    printJson({
      ...(optimiseJson(found) as object),
      ...(closed === null ? {} : { result: closed.result }),
      ...(shortfall === null ? {} : diagnosticsJson([shortfall])),
    });
    return;
  }
  const paint = paintFor(process.stdout);
  print(optimiseText(found, { paint }));
  if (closed !== null)
    print(`\n${textSheet(closed.result, { paint, figureUnits: figureUnits(flowsheet), version })}`);
  if (shortfall !== null) tell([shortfall], source);
  else if (paths.length > 0 && !options.quiet) say(`wrote ${paths.join(', ')}`);
}

/** The best case closed and tallied; null where there is none to be had. */
function sheetOf({ flowsheet, objective, best }: Optimised, options: SolveOptions): Balance | null {
  if (best === null) return null;
  const settings = objective.moves.map(({ path }, i) => ({ path, value: best.settings[i]! }));
  return balanceAt(flowsheet, settings, balanceOptions(options));
}

/** Which limits are in the way and by how much, or why nothing closed; null where all is well. */
function shortfallOf({ outcome, flowsheet, objective, best, reach, failure }: Optimised): Diagnostic | null {
  if (outcome === 'found') return null;
  const severity = 'error';
  if (outcome === 'not-closed') {
    return {
      code: 'objective-open',
      severity,
      where: flowsheet.placeOf('objective.move'),
      what: 'no case within the bounds closes and gives the objective a number.',
      why: failure,
      mend: 'close the file as it stands with looptally balance first, or narrow the bounds to where it closes',
    };
  }
  const alone = reach.filter(({ canBeMet }) => !canBeMet);
  const text = (limit: number, value: number, how: string) => {
    const { text, formula } = objective.limits[limit]!;
    return `${text} (${shownWithUnit(value, formulaDisplay(formula.text, flowsheet))}${how})`;
  };
  const missed = reach.filter(({ limit }) => best !== null && best.case.c[limit]! > 1e-6);
  const inTheWay = alone.length > 0 ? alone : missed;
  return {
    code: 'limits-not-met',
    severity,
    where: flowsheet.placeOf('objective.limits'),
    what:
      alone.length > 0
        ? `no settings within their bounds meet ${alone.map(({ limit, nearest }) => text(limit, nearest, ' at best')).join(' or ')}.`
        : `the limits cannot be met together: ${missed.map(({ limit }) => text(limit, best!.case.figures[limit]!, '')).join(' and ')}.`,
    why:
      alone.length > 0
        ? 'by itself and with all settings free it stays out of reach'
        : 'each can be met by itself; what is told is where they are missed least',
    mend: `let off ${inTheWay.map(({ limit }) => objective.limits[limit]!.text).join(' or ')}, or widen the bounds`,
  };
}

function noObjective(source: Source): Refusal {
  const where = { file: source.name, line: 1, column: 1, length: 1 };
  return new Refusal(
    [
      {
        code: 'no-objective',
        severity: 'error',
        where,
        what: 'the file has no objective.',
        why: 'optimise needs to know what is wanted and what may be moved',
        mend: 'add e.g. objective: {minimise: figures.power_kW.total, move: {purge.fractions.bleed: 1 %..10 %}}',
      },
    ],
    source,
  );
}
