import type { EquilibriumCaseResult } from '../chemistry/equilibrium-case.ts';
import { fixed, percent, significant } from './numbers.ts';
import { plainText, wrapped } from './plain.ts';
import { noPaint, type SheetOptions } from './sheet.ts';
import { aligned } from './table.ts';

const WIDTH = 100;

/** What was asked for, as far as the report does not repeat it. */
export interface EquilibriumQuestion {
  readonly feed: Readonly<Record<string, number>>;
  readonly gas: string;
  /** temperature of the inlet where the reactor is adiabatic, else null */
  readonly inletK: number | null;
}

/** Reaction equilibrium as text: the state, the reactions with their constants, the gas before and after. */
export function equilibriumText(
  report: EquilibriumCaseResult,
  question: EquilibriumQuestion,
  options: SheetOptions = {},
): string {
  const paint = options.paint ?? noPaint;
  return [
    paint.head('Reaction equilibrium'),
    `  ${state(report, question)}`,
    '',
    paint.head('Reactions'),
    ...reactionLines(report),
    '',
    paint.head('Gas, amounts in the unit of the feed'),
    ...aligned(gasRows(report, question), { indent: 2 }),
    ...carbonLines(report),
    '',
    paint.head('Assumptions'),
    ...report.assumptions.flatMap((text) => wrapped(plainText(text), WIDTH, '  - ', '    ')),
    '',
  ].join('\n');
}

function state(report: EquilibriumCaseResult, question: EquilibriumQuestion): string {
  const at = `${fixed(report.temperature_K - 273.15, 2, 1e-9)} degC, ${significant(report.pressure_bar)} bar, gas: ${question.gas}`;
  if (question.inletK === null) return at;
  return `${at}; adiabatic from ${fixed(question.inletK - 273.15, 2, 1e-9)} degC`;
}

function reactionLines(report: EquilibriumCaseResult): string[] {
  return report.reactions.flatMap((reaction) => [
    `  ${plainText(reaction.equation)}`,
    `      K ${constantText(reaction.K)}, ln K ${significant(reaction.lnK)}, heat of reaction ${significant(reaction.delta_h_kJ_mol)} kJ/mol, extent ${significant(reaction.extent)}`,
    ...wrapped(`K from ${plainText(reaction.source)}`, WIDTH, '      ', '      '),
  ]);
}

function gasRows(report: EquilibriumCaseResult, question: EquilibriumQuestion): string[][] {
  return [
    ['component', 'in', 'out', 'mol %', 'conversion'],
    ...Object.keys(report.amounts).map((id) => [
      id,
      significant(question.feed[id] ?? 0),
      significant(report.amounts[id]),
      fixed(100 * (report.mole_fraction[id] ?? 0), 3),
      id in report.conversion ? percent(report.conversion[id]) : '',
    ]),
  ];
}

function carbonLines(report: EquilibriumCaseResult): string[] {
  const { carbon_activity: activity } = report;
  if (activity === null) return [];
  const verdict = activity > 1 ? 'above 1, so carbon can form' : 'not above 1, so no carbon is expected';
  return ['', `  carbon activity ${significant(activity, 4)}: ${verdict}`];
}

function constantText(K: number): string {
  return K >= 1e-3 && K < 1e6 ? significant(K) : K.toExponential(3);
}
