import type { GasModelName, LiquidModelName } from '../../src/model/flowsheet.ts';
import { emptyStream } from '../../src/model/stream.ts';
import { builtInComponent } from '../../src/properties/components.ts';
import { createMixture } from '../../src/properties/mixture.ts';
import { lnVapourPressure } from '../../src/properties/vapour-pressure.ts';
import { solveCase } from '../chemistry/helpers.ts';
import { larsonDodge } from './ammonia-equilibrium.ts';
import { saturatedAmmoniaFraction, saturationGrid } from './ammonia-vapour-liquid.ts';
import { type Deviation, mean, percent, signed, table, worst } from './deviations-statistics.ts';

const KELVIN = 273.15;
const ATM = 101_325;
/** what the measured cells are held to: [from atm, to atm, % of the value] */
const LIMITS = [
  [10, 100, 3],
  [300, 300, 8],
] as const;

interface Cell {
  readonly celsius: number;
  readonly atm: number;
  readonly measured: boolean;
  readonly deviation: Deviation;
}

/** Equilibrium NH3 over 3:1 gas against Larson and Dodge: the grid, the limits, the other models. */
export function ammoniaEquilibrium(): string {
  const cells = equilibriumCells('srk', 'gibbs');
  const { pressuresAtm, rows } = larsonDodge;
  const damaged = rows.length * pressuresAtm.length - cells.length;
  const grid = rows.map(({ celsius }) => [
    `${celsius} degC`,
    ...pressuresAtm.map((atm) => {
      const cell = cells.find((each) => each.celsius === celsius && each.atm === atm);
      if (!cell) return 'left out';
      return signed(cell.deviation.value) + (cell.measured ? ' m' : '');
    }),
  ]);
  const models = [
    ['`srk`', cells],
    ['`pr`', equilibriumCells('pr', 'gibbs')],
    ['`ideal`', equilibriumCells('ideal', 'gibbs')],
    ['`srk`, constant `gillespie-beattie-1930`', equilibriumCells('srk', 'gillespie-beattie-1930')],
  ] as const;
  const summary = models.map(([name, own]) => [
    name,
    ...pressuresAtm.map((atm) => {
      const measured = measuredFrom(own, atm, atm);
      return `${signed(worst(measured).value)} (${mean(measured).toFixed(1)})`;
    }),
  ]);
  const heads = pressuresAtm.map((atm) => `${atm} atm`);
  return [
    '**Ammonia at equilibrium.** Deviation of mol % NH3, in % of the published value, from 3:1 hydrogen and nitrogen, ' +
      '`gas: srk`, K from Gibbs energies. Published: A. T. Larson & R. L. Dodge, J. Am. Chem. Soc. 45 (1923) 2918; ' +
      'A. T. Larson, J. Am. Chem. Soc. 46 (1924) 367 (from memory, as reprinted in handbooks). `m`: measured; the ' +
      `other cells are the authors' extrapolation. ${damaged} cells that break the trend of the table are left out.`,
    table(['', ...heads], grid, [0]),
    limitsLine(cells),
    'The measured cells, worst (mean of the sizes), % of the value:',
    table(['gas', ...heads], summary, [0]),
  ].join('\n\n');
}

/** NH3 over its condensate against the correlation of Larson and Black's data, and plain Raoult beside it. */
export function ammoniaOverCondensate(): string {
  const ours = saturationDeviations(saturatedGas('srk'));
  const raoult = saturationDeviations(raoultFraction);
  const { celsius, megapascal } = saturationGrid;
  const rows = celsius.map((t, row) => [
    `${t} degC`,
    ...megapascal.map((_, column) => {
      const k = row * megapascal.length + column;
      return `${signed(ours[k]!.value)} (${signed(raoult[k]!.value)})`;
    }),
  ]);
  const line = (name: string, all: readonly Deviation[]) => [
    name,
    `${mean(all).toFixed(1)} %`,
    `${signed(worst(all).value)} % at ${worst(all).at}`,
  ];
  return [
    '**Ammonia over its condensate.** Deviation of mol % NH3 in saturated 3:1 gas, in % of the published value, ' +
      '`gas: srk` with dissolved gases; in brackets plain Raoult, Psat/P. Published: the correlation of design ' +
      'handbooks (from memory) of A. T. Larson & C. A. Black, J. Am. Chem. Soc. 47 (1925) 1015, itself good to about ' +
      '10 % and recommended from -25 to 35 degC.',
    table(['', ...megapascal.map((p) => `${10 * p} bar`)], rows, [0]),
    table(
      ['', 'mean', 'worst'],
      [
        line('`gas: srk` (required: mean 6 %, worst 12 %)', ours),
        line('`gas: pr`', saturationDeviations(saturatedGas('pr'))),
        line('`gas: srk`, `liquid: eos`', saturationDeviations(saturatedGas('srk', 'eos'))),
        line('`gas: pr`, `liquid: eos`', saturationDeviations(saturatedGas('pr', 'eos'))),
        line(
          "`gas: ideal`: Raoult with gases dissolved by Henry's law",
          saturationDeviations(saturatedGas('ideal')),
        ),
        line('plain Raoult, Psat/P', raoult),
      ],
      [0, 2],
    ),
  ].join('\n\n');
}

function limitsLine(cells: readonly Cell[]): string {
  const said = LIMITS.map(([from, to, limit]) => {
    const measured = measuredFrom(cells, from, to);
    const most = Math.abs(worst(measured).value);
    const where = from === to ? `at ${to} atm` : `up to ${to} atm`;
    const verdict = most <= limit ? 'reached' : 'NOT reached';
    return `within ${limit} % ${where} (${verdict}: ${most.toFixed(1)} %, mean ${mean(measured).toFixed(1)} %)`;
  });
  return `Required of the measured cells: ${said.join(' and ')}.`;
}

function measuredFrom(cells: readonly Cell[], from: number, to: number): Deviation[] {
  return cells
    .filter(({ measured, atm }) => measured && atm >= from && atm <= to)
    .map(({ deviation }) => deviation);
}

function equilibriumCells(gas: GasModelName, constant: string): Cell[] {
  const equation = 'N2 + 3 H2 <=> 2 NH3';
  const reaction =
    constant === 'gibbs' ? equation : ([equation, { kind: 'published', name: constant }] as const);
  return larsonDodge.rows.flatMap(({ celsius, percent: published, measured }) =>
    larsonDodge.pressuresAtm.flatMap((atm, i) => {
      const value = published[i];
      if (value === null || value === undefined) return [];
      const state = { temperatureK: celsius + KELVIN, pressurePa: atm * ATM, gas };
      const ours = 100 * solveCase([reaction], { N2: 1, H2: 3, NH3: 0 }, state).mole_fraction['NH3']!;
      const deviation = percent(`${celsius} degC, ${atm} atm`, ours, value);
      return [{ celsius, atm, measured: measured[i]!, deviation }];
    }),
  );
}

function saturationDeviations(fraction: (T: number, P: number) => number): Deviation[] {
  return saturationGrid.celsius.flatMap((celsius) =>
    saturationGrid.megapascal.map((megapascal) => {
      const T = celsius + KELVIN;
      const P = 1e6 * megapascal;
      const at = `${celsius} degC, ${10 * megapascal} bar`;
      return percent(at, fraction(T, P), saturatedAmmoniaFraction(T, P));
    }),
  );
}

/** NH3 in the gas over the liquid that a 3:1 gas with plenty of ammonia parts into, through the phase split. */
function saturatedGas(
  gas: GasModelName,
  liquid: LiquidModelName = 'antoine',
): (T: number, P: number) => number {
  const components = ['H2', 'N2', 'NH3'].map((id) => builtInComponent(id)!);
  const mixture = createMixture({ components, gas, liquid, dissolvedGases: true, basis: 'atct' });
  const stream = emptyStream(3);
  return (T, P) => {
    stream.flowsMolPerS.set([3, 1, 4]);
    stream.temperatureK = T;
    stream.pressurePa = P;
    mixture.settle(stream);
    const vapour = stream.flowsMolPerS.map((flow, i) => flow - stream.liquidMolPerS[i]!);
    return vapour[2]! / (vapour[0]! + vapour[1]! + vapour[2]!);
  };
}

function raoultFraction(T: number, P: number): number {
  return Math.exp(lnVapourPressure(builtInComponent('NH3')!, T)) / P;
}
