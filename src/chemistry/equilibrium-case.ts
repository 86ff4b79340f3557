import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Component } from '../model/component.ts';
import type { GasModelName } from '../model/flowsheet.ts';
import type { Reaction } from '../model/reaction.ts';
import type { GasModel } from '../properties/gas-model.ts';
import { createGasModel } from '../properties/gas-models.ts';
import type { IdealGas } from '../properties/ideal-gas.ts';
import { createIdealGas, enthalpyBasisFor } from '../properties/ideal-gas.ts';
import { lnVapourPressure, vapourPressureRange } from '../properties/vapour-pressure.ts';
import { lnKAtApproach } from './approach.ts';
import type { CarbonActivity } from './carbon-activity.ts';
import { createCarbonActivity } from './carbon-activity.ts';
import type { EquilibriumSolver } from './equilibrium.ts';
import { createEquilibriumSolver } from './equilibrium.ts';
import { createLnK, createReactionEnthalpy } from './equilibrium-constant.ts';
import { dependentReactions } from './reaction-rows.ts';

/** One reaction set at one temperature and pressure, without a flowsheet. */
export interface EquilibriumCase {
  readonly components: readonly Component[];
  readonly reactions: readonly Reaction[];
  /** of the outlet; with `adiabatic` that of the inlet [K] */
  readonly temperatureK: number;
  readonly pressurePa: number;
  /** amounts in component order, any unit */
  readonly feed: Float64Array;
  readonly gas: GasModelName;
  /** temperature approach of every reaction [K] */
  readonly approachK: number;
  readonly adiabatic: boolean;
}

/** What `looptally equilibrium --json` hands back; amounts and extents in the unit of the feed. */
export interface EquilibriumCaseResult {
  readonly reactions: readonly {
    readonly equation: string;
    readonly K: number;
    readonly lnK: number;
    readonly delta_h_kJ_mol: number;
    readonly extent: number;
    readonly source: string;
  }[];
  readonly temperature_K: number;
  readonly pressure_bar: number;
  /** of the gas; 0 for solids */
  readonly mole_fraction: Readonly<Record<string, number>>;
  readonly amounts: Readonly<Record<string, number>>;
  /** (in − out)/in of every component that the reactions consume */
  readonly conversion: Readonly<Record<string, number>>;
  /** the largest of the three below; null for a gas that cannot tell */
  readonly carbon_activity: number | null;
  readonly carbon_activities: Omit<CarbonActivity, 'largest'>;
  readonly iterations: number;
  readonly assumptions: readonly string[];
}

/** Coldest and hottest outlet looked at for an adiabatic case [K]. */
const coldest = 150;
const hottest = 3000;

/**
 * Bring a feed to equilibrium at a temperature, or adiabatically: then the outlet temperature is the one at
 * which the enthalpy of the product (ideal gas plus departure of the gas) equals that of the feed.
 *
 * @throws PassTrouble when the equilibrium does not settle or no outlet temperature exists in 150–3000 K
 */
export function solveEquilibriumCase(input: EquilibriumCase): EquilibriumCaseResult {
  const { components, reactions, pressurePa: P, feed } = input;
  const basis = enthalpyBasisFor(components, reactions);
  const idealGas = createIdealGas(components, basis);
  const gas = createGasModel(input.gas, components);
  const constants = reactions.map((r) => createLnK(r, idealGas));
  const equilibrium = reactions.map((r, k) => ({
    coefficients: r.coefficients,
    lnK: constants[k].lnK,
    standardPressurePa: constants[k].standardPressurePa,
    approachK: input.approachK,
  }));
  const solver = createEquilibriumSolver(equilibrium, gas, components);
  const product = new Float64Array(components.length);
  const enthalpy = createEnthalpy(components, idealGas, gas);
  const { T, iterations } = input.adiabatic
    ? adiabaticOutlet(input, solver, enthalpy, product)
    : { T: input.temperatureK, iterations: solver.solve(input.temperatureK, P, feed, product) };

  const { largest, ...carbon } = createCarbonActivity(components, gas, basis)(T, P, product);
  const gasTotal = components.reduce((sum, c, i) => (c.solid ? sum : sum + product[i]), 0);
  const byId = (value: (i: number) => number): Record<string, number> =>
    Object.fromEntries(components.map((c, i) => [c.id, value(i)]));
  return {
    reactions: reactions.map((r, k) => {
      const lnK = lnKAtApproach(equilibrium[k], T);
      return {
        equation: r.equation,
        K: Math.exp(lnK),
        lnK,
        delta_h_kJ_mol: createReactionEnthalpy(r.coefficients, idealGas)(T) / 1000,
        extent: solver.extents[k],
        source: constants[k].source,
      };
    }),
    temperature_K: T,
    pressure_bar: P / 1e5,
    mole_fraction: byId((i) => (components[i].solid || gasTotal <= 0 ? 0 : product[i] / gasTotal)),
    amounts: byId((i) => product[i]),
    conversion: Object.fromEntries(
      components.flatMap((c, i) => (product[i] < feed[i] ? [[c.id, (feed[i] - product[i]) / feed[i]]] : [])),
    ),
    carbon_activity: largest,
    carbon_activities: carbon,
    iterations,
    assumptions: [...assumptionsOf(input, basis, T, constants), ...condensing(input, T, product, gasTotal)],
  };
}

type Enthalpy = (T: number, P: number, amounts: Float64Array) => number;

/** H of a gas with solids [J per unit of the amounts in mol]. */
function createEnthalpy(components: readonly Component[], idealGas: IdealGas, gas: GasModel): Enthalpy {
  const size = components.length;
  const h = new Float64Array(size);
  const y = new Float64Array(size);
  return (T, P, amounts) => {
    idealGas.enthalpies(T, h);
    let total = 0;
    let sum = 0;
    for (let i = 0; i < size; i++) {
      if (amounts[i] === 0) continue;
      sum += amounts[i] * h[i];
      if (!components[i].solid) total += amounts[i];
    }
    if (total <= 0) return sum;
    for (let i = 0; i < size; i++) y[i] = components[i].solid ? 0 : amounts[i] / total;
    return sum + total * gas.enthalpyDeparture(T, P, y);
  };
}

/**
 * The outlet temperature by the bracketed method of Illinois: H(T, equilibrium at T) rises with T, because
 * equilibrium shifts against heating.
 * @source M. Dowell & P. Jarratt, BIT 11 (1971) 168-174
 */
function adiabaticOutlet(
  input: EquilibriumCase,
  solver: EquilibriumSolver,
  enthalpy: Enthalpy,
  product: Float64Array,
): { T: number; iterations: number } {
  const { temperatureK, pressurePa: P, feed } = input;
  const wanted = enthalpy(temperatureK, P, feed);
  let iterations = 0;
  const miss = (T: number): number => {
    iterations += solver.solve(T, P, feed, product);
    return enthalpy(T, P, product) - wanted;
  };
  // what 300 K of heating would be: the scale that 1e-10 refers to
  const scale = Math.max(1e-300, Math.abs(enthalpy(temperatureK + 300, P, feed) - wanted));
  let low = temperatureK;
  let high = temperatureK;
  let atLow = miss(low);
  let atHigh = atLow;
  if (atLow === 0) return { T: temperatureK, iterations };
  for (let width = 25; atLow > 0; width *= 2) {
    if (low <= coldest) throw noOutlet(temperatureK, `colder than ${coldest} K`);
    [high, atHigh] = [low, atLow];
    low = Math.max(coldest, low - width);
    atLow = miss(low);
  }
  for (let width = 25; atHigh < 0; width *= 2) {
    if (high >= hottest) throw noOutlet(temperatureK, `hotter than ${hottest} K`);
    [low, atLow] = [high, atHigh];
    high = Math.min(hottest, high + width);
    atHigh = miss(high);
  }
  let T = high;
  let side = 0;
  for (let pass = 0; pass < 200; pass++) {
    const inner = (low * atHigh - high * atLow) / (atHigh - atLow);
    T = inner > low && inner < high && pass < 100 ? inner : 0.5 * (low + high);
    const at = miss(T);
    if (Math.abs(at) <= 1e-11 * scale || high - low < 1e-13 * T) break;
    if (at > 0) {
      high = T;
      atHigh = at;
      if (side === 1) atLow /= 2;
      side = 1;
    } else {
      low = T;
      atLow = at;
      if (side === -1) atHigh /= 2;
      side = -1;
    }
  }
  return { T, iterations };
}

function noOutlet(inletK: number, where: string): PassTrouble {
  return new PassTrouble(
    'adiabatic-outlet',
    `The adiabatic outlet of a feed at ${inletK.toFixed(2)} K would be ${where}.`,
    'no outlet temperature in between closes the enthalpy balance',
    'check the inlet temperature and the feed, or give the outlet temperature instead',
  );
}

/** What would condense at the outlet, by its own vapour pressure: the answer is that of a gas all the same. */
function condensing(input: EquilibriumCase, T: number, product: Float64Array, gasTotal: number): string[] {
  return input.components.flatMap((c, i) => {
    const range = vapourPressureRange(c);
    if (!range || c.solid || T >= range.toK || gasTotal <= 0) return [];
    const partialPa = (product[i] / gasTotal) * input.pressurePa;
    const vapourPa = Math.exp(lnVapourPressure(c, T));
    if (partialPa <= vapourPa) return [];
    return [
      `CAUTION: ${c.id} would condense: its partial pressure of ${(partialPa / 1e5).toPrecision(3)} bar is above its vapour pressure of ${(vapourPa / 1e5).toPrecision(3)} bar, and the figures are those of a gas that does not exist there.`,
    ];
  });
}

function assumptionsOf(
  input: EquilibriumCase,
  basis: 'atct' | 'nasa',
  T: number,
  constants: readonly { source: string; range: { fromK: number; toK: number } | null }[],
): string[] {
  const models = { ideal: 'an ideal gas', srk: 'Soave-Redlich-Kwong', pr: 'Peng-Robinson' };
  const said = [
    `The gas is ${input.gas === 'ideal' ? models.ideal : `described by ${models[input.gas]}`}; taken as a gas throughout.`,
    basis === 'atct'
      ? 'Formation enthalpies are those of the Active Thermochemical Tables where they have them.'
      : 'Formation enthalpies are those of the NASA tables.',
  ];
  if (input.approachK !== 0) {
    said.push(`K is taken ${input.approachK} K away from the temperature, to the side where it is smaller.`);
  }
  if (input.adiabatic) said.push('No heat is exchanged; the temperature given is that of the inlet.');
  constants.forEach((c, k) => {
    if (c.range === null || (T >= c.range.fromK && T <= c.range.toK)) return;
    said.push(
      `The constant of ${input.reactions[k].equation} is used outside its range ${c.range.fromK}-${c.range.toK} K (${c.source}).`,
    );
  });
  for (const { index } of dependentReactions(input.reactions.map((r) => r.coefficients))) {
    said.push(`${input.reactions[index].equation} follows from the other reactions and is left out.`);
  }
  return said;
}
