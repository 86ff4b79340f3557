import { type Hold, holdsOn, leadFigure } from '../tally/lever-ranking.ts';
import type { Levers } from '../tally/levers.ts';
import { significant } from './numbers.ts';
import { plainText, wrapped } from './plain.ts';

/** So many settings are told of each figure. */
const TOLD = 4;

/** Which settings hold each figure, the figure that the loop is run for first; figures that none moves are left out. */
export function holdsByFigure({ levers, figures, result }: Levers): Record<string, readonly Hold[]> {
  const lead = leadFigure(figures);
  const names = Object.keys(figures).sort((a, b) => Number(b === lead) - Number(a === lead));
  return Object.fromEntries(
    names.flatMap((figure) => {
      const holds = holdsOn(figure, levers, figures, Object.keys(result.blocks));
      return holds.length === 0 ? [] : [[figure, holds]];
    }),
  );
}

/** The strongest settings of each key figure in words, and how they are measured. */
export function holdLines(found: Levers, width: number): string[] {
  const holds = holdsByFigure(found);
  const key = keyFigures(found);
  if (key.length === 0) return [];
  const idle = key.filter(({ figure }) => holds[figure] === undefined).map(({ word }) => word);
  const lines = key.flatMap(({ figure, word }) => {
    const strongest = holds[figure]?.slice(0, TOLD).map(holdText);
    return strongest === undefined ? [] : wrapped(`${word}: ${strongest.join(', ')}`, width, '  ', '    ');
  });
  return [
    ...lines,
    ...(idle.length === 0
      ? []
      : wrapped(`no setting of a block moves: ${idle.join(', ')}`, width, '  ', '    ')),
    ...wrapped(
      'in brackets: per cent of the figure per per cent of the setting, temperatures from 0 K, pressures absolute',
      width,
      '  ',
      '  ',
    ),
  ];
}

/** The figures that an engineer asks this of first, those of them that the loop has. */
function keyFigures({ figures, result }: Levers): readonly { figure: string; word: string }[] {
  const reactant = result.figures.overall_yield?.reactant;
  return [
    { figure: 'overall_yield', word: 'yield' },
    { figure: 'production_t_d', word: 'production' },
    { figure: 'specific_power_kWh_t', word: 'specific power' },
    ...(reactant === undefined
      ? []
      : [{ figure: `purge.lost_fraction.${reactant}`, word: `${plainText(reactant)} lost in the purge` }]),
  ].filter(({ figure }) => figures[figure]);
}

/** e.g. condenser.temperature (-0.219), held together on one line */
function holdText({ setting, elasticity }: Hold): string {
  const sign = elasticity > 0 ? '+' : '';
  return `${plainText(setting)} (${sign}${significant(elasticity, 3)})`.replaceAll(' ', '\u00a0');
}
