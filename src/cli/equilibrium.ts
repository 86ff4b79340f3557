import type { Command } from 'commander';
import {
  type EquilibriumCase,
  type EquilibriumCaseResult,
  solveEquilibriumCase,
} from '../chemistry/equilibrium-case.ts';
import { parseReaction } from '../chemistry/reaction-text.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Component } from '../model/component.ts';
import type { GasModelName } from '../model/flowsheet.ts';
import type { Reaction } from '../model/reaction.ts';
import { builtInComponent, builtInIds } from '../properties/components.ts';
import { equilibriumText } from '../sheets/equilibrium.ts';
import { type CommonOptions, collect, command, oneOf } from './common-options.ts';
import { exitCodes } from './exit-codes.ts';
import { parseFeed } from './feed-option.ts';
import { quantityOption } from './quantity-option.ts';
import { type UsageFault, usageRefusals } from './refusal.ts';
import { paintFor, print, printJson } from './terminal.ts';

interface EquilibriumOptions extends CommonOptions {
  readonly reaction?: readonly string[];
  readonly temperature: string;
  readonly pressure: string;
  readonly feed: string;
  readonly gas: GasModelName;
  readonly approach: string;
  readonly adiabatic?: boolean;
}

const GAS_MODELS: readonly GasModelName[] = ['ideal', 'srk', 'pr'];

/** `looptally equilibrium REACTION ...`: reaction equilibrium at one temperature and pressure, without a file. */
export function equilibriumCommand(): Command {
  return command('equilibrium', 'Brings a feed to reaction equilibrium at one temperature and pressure.', [
    "looptally equilibrium 'N2 + 3 H2 <=> 2 NH3' --temperature '450 degC' --pressure '300 atm' --feed 'N2=1,H2=3'",
    "looptally equilibrium 'CO + 3 H2 <=> CH4 + H2O' --reaction 'CO + H2O <=> CO2 + H2' --temperature '300 degC' --pressure '30 bar' --feed 'CO=1,H2=4' --adiabatic",
  ])
    .argument('<reaction...>', 'one reaction or several, between built-in components')
    .option('--reaction <equation>', 'one more reaction (repeatable)', collect)
    .requiredOption('--temperature <quantity>', "of the outlet, e.g. '450 degC'")
    .requiredOption('--pressure <quantity>', "e.g. '300 atm'")
    .requiredOption('--feed <amounts>', "moles by component, e.g. 'N2=1,H2=3'")
    .option('--gas <model>', `model of the gas: ${GAS_MODELS.join(', ')}`, oneOf(GAS_MODELS), 'srk')
    .option('--approach <difference>', 'temperature approach to equilibrium', '0 K')
    .option('--adiabatic', 'no heat exchanged; the temperature is that of the inlet')
    .action(runEquilibrium);
}

async function runEquilibrium(equations: readonly string[], options: EquilibriumOptions): Promise<void> {
  const input = await readCase([...equations, ...(options.reaction ?? [])], options);
  const result = solved(input);
  if (options.json) {
    printJson(result);
    return;
  }
  const feed = Object.fromEntries(input.components.map((component, i) => [component.id, input.feed[i]!]));
  const inletK = input.adiabatic ? input.temperatureK : null;
  print(equilibriumText(result, { feed, gas: input.gas, inletK }, { paint: paintFor(process.stdout) }));
}

/** The whole question in SI; every fault of the command line is told at once. */
async function readCase(equations: readonly string[], options: EquilibriumOptions): Promise<EquilibriumCase> {
  const faults: UsageFault[] = [];
  const parsed = equations.map((equation) => readReaction(equation, faults));
  const feed = parseFeed(options.feed, faults);
  const temperatureK = await quantityOption(
    options.temperature,
    'temperature',
    { min: 200, max: 6000 },
    faults,
  );
  const pressurePa = await quantityOption(options.pressure, 'pressure', { above: 0, max: 1e9 }, faults);
  const approachK = await quantityOption(options.approach, 'temperatureDifference', {}, faults);
  if (faults.length > 0) throw usageRefusals(faults);

  const used = new Set([...feed.keys(), ...parsed.flatMap((terms) => [...terms.keys()])]);
  const components = [...used].map((id) => builtInComponent(id)!);
  const reactions = equations.map(
    (equation, k): Reaction => ({
      name: `reaction ${k + 1}`,
      equation,
      coefficients: Float64Array.from(components, (component) => parsed[k]!.get(component.id) ?? 0),
      constant: { kind: 'gibbs' },
    }),
  );
  return {
    components,
    reactions,
    temperatureK,
    pressurePa,
    feed: Float64Array.from(components, (component) => feed.get(component.id) ?? 0),
    gas: options.gas,
    approachK,
    adiabatic: options.adiabatic === true,
  };
}

/** Coefficients by component, of those that take part. */
function readReaction(equation: string, faults: UsageFault[]): Map<string, number> {
  const all: Component[] = builtInIds.map((id) => builtInComponent(id)!);
  const parsed = parseReaction(equation, all);
  if (!parsed.ok) {
    faults.push(...parsed.faults.map((fault) => ({ ...fault, at: equation })));
    return new Map();
  }
  const terms = all.map((component, i): [string, number] => [component.id, parsed.coefficients[i]!]);
  return new Map(terms.filter(([, coefficient]) => coefficient !== 0));
}

function solved(input: EquilibriumCase): EquilibriumCaseResult {
  try {
    return solveEquilibriumCase(input);
  } catch (error) {
    if (!(error instanceof PassTrouble)) throw error;
    const { code, message, why, mend } = error;
    throw usageRefusals([{ code, what: message, why, mend, at: null }], exitCodes.notClosed);
  }
}
