import { applyConversions } from '../chemistry/conversion.ts';
import { createEquilibriumSolver } from '../chemistry/equilibrium.ts';
import { createLnK } from '../chemistry/equilibrium-constant.ts';
import { holdBackEquilibria } from '../chemistry/held-equilibria.ts';
import type { Component } from '../model/component.ts';
import type { Reaction } from '../model/reaction.ts';
import type { BlockContext, BlockReport } from './block.ts';
import { createReactionSlopes } from './reaction-slopes.ts';

/** How far an equilibrium is reached: by a temperature approach, or as a share of the whole way. */
export interface EquilibriumReach {
  /** temperature approach to equilibrium [K] */
  readonly approach?: number | undefined;
  /** share of the equilibrium extent, 0–1 */
  readonly fraction_of_equilibrium?: number | undefined;
}

/** How one reaction runs in a reactor. */
export interface ReactionSetting extends EquilibriumReach {
  /** share of the key reactant, for a reaction that does not run to equilibrium */
  readonly conversion?: number | undefined;
  /** id of that key reactant */
  readonly of?: string | undefined;
}

/** The chemistry of a reactor or bed: conversions in the order written, then all equilibria at once. */
export interface ReactionRun {
  /** extents of the last `react`, by reaction [mol/s] */
  extents(): Record<string, number>;
  /**
   * @param T,P  of the outlet [K, Pa] @param feed,product  flows [mol/s]; `product` is written, not `feed` itself
   * @throws PassTrouble
   */
  react(T: number, P: number, feed: Float64Array, product: Float64Array): void;
  /**
   * Derivatives of the last `react`, asked with its T and P.
   * @param product  written: rows of the flows, in their columns the feed, then T and P
   * @returns false where there are none
   */
  slopes(T: number, P: number, product: Float64Array): boolean;
  /** What the last `react` is worth saying. @param T  outlet temperature [K] */
  report(T: number): Pick<BlockReport, 'details' | 'warnings' | 'assumptions'>;
}

/**
 * @param settings  by name of the reaction; read at each `react`, so that an aim may move a number
 * @param bed  where it says how far equilibrium is reached, it takes the place of what the reactions say
 */
export function createReactionRun(
  settings: Readonly<Record<string, ReactionSetting>>,
  { mixture, reactions }: Pick<BlockContext, 'mixture' | 'reactions'>,
  bed: EquilibriumReach = {},
): ReactionRun {
  const { components, gas, idealGas } = mixture;
  const named = Object.keys(settings).map((name) => reactions.find((reaction) => reaction.name === name)!);
  const isEquilibrium = (name: string) => settings[name].conversion === undefined;
  const equilibria = named.filter((reaction) => isEquilibrium(reaction.name));
  const conversions = named.filter((reaction) => !isEquilibrium(reaction.name));
  const constants = equilibria.map((reaction) => createLnK(reaction, idealGas));
  const reachOf = (name: string): EquilibriumReach =>
    bed.approach !== undefined || bed.fraction_of_equilibrium !== undefined ? bed : settings[name];
  const approached = equilibria.map((reaction, r) => ({
    coefficients: reaction.coefficients,
    lnK: constants[r].lnK,
    standardPressurePa: constants[r].standardPressurePa,
    approachK: 0,
  }));
  const solver = createEquilibriumSolver(approached, gas, components);
  const setConversions = conversions.map((reaction) => ({
    name: reaction.name,
    coefficients: reaction.coefficients,
    conversion: 0,
    of: components.findIndex((c) => c.id === settings[reaction.name].of),
  }));
  const heldEquilibria = equilibria.map((reaction) => ({
    name: reaction.name,
    coefficients: reaction.coefficients,
    fraction: 1,
  }));
  const conversionExtents = new Float64Array(conversions.length);
  const equilibriumExtents = new Float64Array(equilibria.length);
  const converted = new Float64Array(mixture.size);
  const slopes = createReactionSlopes(mixture.size, solver, setConversions, heldEquilibria);

  /** Settings can be moved between two passes. */
  function readSettings(): void {
    for (const one of setConversions) one.conversion = settings[one.name].conversion!;
    for (const [r, one] of heldEquilibria.entries()) {
      const reach = reachOf(one.name);
      approached[r].approachK = reach.approach ?? 0;
      one.fraction = reach.fraction_of_equilibrium ?? 1;
    }
  }

  function extents(): Record<string, number> {
    const of = (list: readonly Reaction[], values: Float64Array) =>
      list.map((reaction, r) => [reaction.name, values[r]] as const);
    return Object.fromEntries([...of(conversions, conversionExtents), ...of(equilibria, equilibriumExtents)]);
  }

  return {
    extents,
    react(T, P, feed, product) {
      readSettings();
      let from = feed;
      if (conversions.length > 0) {
        applyConversions(setConversions, components, feed, converted, conversionExtents);
        from = converted;
      }
      if (equilibria.length === 0) {
        product.set(from);
        return;
      }
      solver.solve(T, P, from, product);
      equilibriumExtents.set(solver.extents);
      holdBackEquilibria(heldEquilibria, components, product, equilibriumExtents);
    },
    slopes,
    report(T) {
      const ran = extents();
      const byName = <V>(of: (name: string) => V | undefined) =>
        Object.fromEntries(
          equilibria.flatMap(({ name }) => {
            const value = of(name);
            return value === undefined ? [] : [[name, value] as const];
          }),
        );
      return {
        details: {
          extent_kmol_h: Object.fromEntries(Object.entries(ran).map(([name, value]) => [name, value * 3.6])),
          ln_K: Object.fromEntries(equilibria.map((reaction, r) => [reaction.name, constants[r].lnK(T)])),
          approach_K: byName((name) =>
            reachOf(name).fraction_of_equilibrium === undefined ? (reachOf(name).approach ?? 0) : undefined,
          ),
          fraction_of_equilibrium: byName((name) => reachOf(name).fraction_of_equilibrium),
          selectivity: selectivities(
            [...new Set(setConversions.map((one) => one.of))],
            named,
            ran,
            components,
          ),
        },
        warnings: [...rangeWarnings(T), ...backwardWarnings()],
        assumptions:
          conversions.length > 0 && equilibria.length > 0
            ? ['conversions are taken first, in the order written, then the equilibria all at once']
            : [],
      };
    },
  };

  function rangeWarnings(T: number) {
    return equilibria.flatMap((reaction, r) => {
      const { range } = constants[r];
      if (!range || (T >= range.fromK && T <= range.toK)) return [];
      return [
        {
          code: 'constant-out-of-range',
          message: `the constant of ${reaction.name} is used at ${(T - 273.15).toFixed(0)} degC, outside the ${(range.fromK - 273.15).toFixed(0)} to ${(range.toK - 273.15).toFixed(0)} degC of its source`,
        },
      ];
    });
  }

  /** An approach holds a reaction back on its way to the right; on its way to the left it drives it on. */
  function backwardWarnings() {
    return equilibria.flatMap(({ name }, r) => {
      const approachK = reachOf(name).approach ?? 0;
      if (approachK === 0 || !(equilibriumExtents[r] < 0)) return [];
      return [
        {
          code: 'approach-backwards',
          message: `${name} runs backwards: the gas comes in nearer to equilibrium than the approach of ${approachK} K, which would undo what is there; lower the approach, or write the reaction the way it is to run`,
        },
      ];
    });
  }
}

/**
 * Which share of what all reactions together take of a key reactant each of them takes.
 * @returns by key reactant, then by reaction; {} where nothing is taken
 */
function selectivities(
  keys: readonly number[],
  reactions: readonly Reaction[],
  extents: Readonly<Record<string, number>>,
  components: readonly Component[],
): Record<string, Record<string, number>> {
  return Object.fromEntries(
    keys.flatMap((key) => {
      const taken = reactions.flatMap(({ name, coefficients }) => {
        const amount = -coefficients[key] * extents[name];
        return coefficients[key] < 0 && amount >= 0 ? [[name, amount] as const] : [];
      });
      const total = taken.reduce((sum, [, amount]) => sum + amount, 0);
      if (total === 0) return [];
      return [[components[key].id, Object.fromEntries(taken.map(([name, one]) => [name, one / total]))]];
    }),
  );
}
