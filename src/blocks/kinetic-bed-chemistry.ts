import { createLnK } from '../chemistry/equilibrium-constant.ts';
import type { RateLaw } from '../chemistry/rate-laws/rate-law.ts';
import { dependentReactions } from '../chemistry/reaction-rows.ts';
import type { Component } from '../model/component.ts';
import type { Reaction } from '../model/reaction.ts';
import type { Mixture } from '../properties/mixture.ts';

/** What of a bed's settings the chemistry reads, at each call, since an aim may move them. */
export interface ChemistrySettings {
  readonly activity?: number | undefined;
  readonly effectiveness?: 'published' | number | undefined;
  readonly conversion_before?: number | undefined;
  readonly equilibrium?: 'flowsheet' | 'authors' | undefined;
}

/** Rates and distances from equilibrium of a gas, for the reactions of the flowsheet that a bed names. */
export interface BedChemistry {
  /** the flowsheet's reactions, in the order of the rates */
  readonly reactions: readonly Reaction[];
  /**
   * Rates of the named reactions at T [K], P [Pa] and amounts (not negative, any unit).
   * @param feed  amounts at the inlet, same unit: what a conversion is counted from
   * @param out  [mol/(m3 s) or mol/(kg s)], as the law counts
   */
  rates(T: number, P: number, amounts: Float64Array, feed: Float64Array, out: Float64Array): void;
  /** Where the gas would be at equilibrium, by the flowsheet's constants; `reaction` by index. */
  standing(reaction: number, T: number, P: number, amounts: Float64Array): Standing;
  /** effectiveness after the last call of `rates` */
  effectiveness(): number;
}

/** How a gas stands to the equilibrium of one reaction; null where the gas lacks something of it. */
export interface Standing {
  /** temperature at which its ln Q would be ln K [K] */
  readonly equilibriumK: number | null;
  /** how far that is, as a reactor counts it: above 0 where the reaction is still on its way to the right [K] */
  readonly approachK: number | null;
}

/** A mole fraction below which nothing is taken any further away, so that no flow turns negative. */
const LAST = 1e-9;
/** A fraction that stands for none, so that it has a logarithm. */
const NOTHING = 1e-30;
/** e^600 is still a number, and no reaction is further from equilibrium */
const FARTHEST = 600;

/**
 * A rate law over the components and reactions of a flowsheet:
 *   rate_l = activity × effectiveness × forward_l (1 − Q_l/K_l),
 * the bracket with the flowsheet's fugacities and constants (or the authors' activities and constants), the
 * forward rate with the authors' activities. A law's reaction is a sum of the named ones; so is its ln(Q/K).
 */
export function createBedChemistry(
  law: RateLaw,
  named: readonly Reaction[],
  mixture: Mixture,
  settings: ChemistrySettings,
): BedChemistry {
  const { components, gas, size } = mixture;
  const ids = components.map((c) => c.id);
  const place = Int32Array.from(law.species, (id) => ids.indexOf(id));
  const places = place.length;
  const steps = law.reactions.length;
  const shares = law.reactions.map((own) => lawShares(own.stoichiometry, named, components)!);
  const lawNu = law.reactions.map((own) =>
    Float64Array.from(law.species, (id) => own.stoichiometry[id] ?? 0),
  );
  const constants = named.map((reaction) => createLnK(reaction, mixture.idealGas));
  // Σ ν ln P°: with it ln K is that of fugacities in Pa, whatever pressure its source refers to
  const lnUnits = named.map(({ coefficients }, k) => {
    let moles = 0;
    for (let i = 0; i < size; i++) if (!components[i].solid) moles += coefficients[i];
    return moles * Math.log(constants[k].standardPressurePa);
  });
  const inGas = Uint8Array.from(components, (c) => (c.solid ? 0 : 1));
  const key = law.effectiveness ? ids.indexOf(law.effectiveness.of) : -1;

  const y = new Float64Array(size);
  const lnPhi = new Float64Array(size);
  /** by species of the law: ln y as it is and with its floor, share of the two, ln φ of the law, activity */
  const lnBare = new Float64Array(places);
  const lnFloored = new Float64Array(places);
  const present = new Float64Array(places);
  const lawPhi = new Float64Array(places);
  const a = new Float64Array(places);
  const forward = new Float64Array(steps);
  const authorsLnK = new Float64Array(steps);
  const lnK = new Float64Array(named.length);
  const last = { effectiveness: 1 };

  function rates(T: number, P: number, amounts: Float64Array, feed: Float64Array, out: Float64Array): void {
    fractions(amounts);
    gas.lnPhi(T, P, y, lnPhi);
    if (law.fugacity === 'own') law.lnPhi!(T, P, lawPhi);
    const unit = Math.log(P / law.pressureUnitPa);
    for (let s = 0; s < places; s++) {
      const i = place[s];
      const fraction = Math.max(y[i], NOTHING);
      const floored = withFloor(fraction, law.floors[s]);
      lnBare[s] = Math.log(fraction);
      lnFloored[s] = Math.log(floored);
      present[s] = law.floors[s] > 0 ? y[i] / floored : Math.min(y[i] / LAST, 1);
      if (law.fugacity === 'gas model') lawPhi[s] = lnPhi[i];
      a[s] = floored * Math.exp(lawPhi[s] + unit);
    }
    law.forward(T, a, forward);

    const published = settings.effectiveness === 'published' && law.effectiveness !== null;
    last.effectiveness = published
      ? law.effectiveness!.at(T, P, conversion(amounts, feed))
      : typeof settings.effectiveness === 'number'
        ? settings.effectiveness
        : 1;
    const share = (settings.activity ?? 1) * last.effectiveness;
    const byAuthors = settings.equilibrium === 'authors';
    if (byAuthors) law.lnK(T, authorsLnK);
    else for (let k = 0; k < named.length; k++) lnK[k] = constants[k].lnK(T) + lnUnits[k];
    out.fill(0);
    for (let l = 0; l < steps; l++) {
      const distance = byAuthors
        ? lnQ(l, lawPhi, null, unit) - authorsLnK[l]
        : lnQ(l, lnPhi, place, Math.log(P)) - sumOfNamed(l);
      const net = -share * forward[l] * Math.expm1(Math.min(distance, FARTHEST));
      const left = net * remaining(lawNu[l], net);
      for (let k = 0; k < named.length; k++) out[k] += shares[l][k] * left;
    }
  }

  function fractions(amounts: Float64Array): void {
    let total = 0;
    for (let i = 0; i < size; i++) total += inGas[i] * amounts[i];
    for (let i = 0; i < size; i++) y[i] = total > 0 ? (inGas[i] * amounts[i]) / total : 0;
  }

  /**
   * ln Π a^ν of a reaction of the law. What it takes has its floor, which keeps the rate finite; what it makes has
   * none, so that traces come to the right equilibrium.
   * @param phi  ln φ, by component where `where` is given, else by species of the law
   */
  function lnQ(l: number, phi: Float64Array, where: Int32Array | null, lnPressure: number): number {
    let sum = 0;
    for (let s = 0; s < places; s++) {
      const nu = lawNu[l][s];
      if (nu === 0) continue;
      sum += nu * ((nu < 0 ? lnFloored[s] : lnBare[s]) + phi[where ? where[s] : s] + lnPressure);
    }
    return sum;
  }

  function sumOfNamed(l: number): number {
    let sum = 0;
    for (let k = 0; k < named.length; k++) sum += shares[l][k] * lnK[k];
    return sum;
  }

  /** 1, falling to 0 as the last of something is used up */
  function remaining(nu: Float64Array, net: number): number {
    let least = 1;
    for (let s = 0; s < places; s++) if (nu[s] * net < 0) least = Math.min(least, present[s]);
    return least;
  }

  function conversion(amounts: Float64Array, feed: Float64Array): number {
    const before = settings.conversion_before ?? 0;
    const here = feed[key] > 0 ? 1 - amounts[key] / feed[key] : 0;
    return before + (1 - before) * here;
  }

  return {
    reactions: named,
    rates,
    standing(k, T, P, amounts) {
      fractions(amounts);
      gas.lnPhi(T, P, y, lnPhi);
      const { coefficients } = named[k];
      let value = -lnUnits[k];
      for (let i = 0; i < size; i++) {
        const nu = coefficients[i];
        if (nu !== 0 && inGas[i] === 1) value += nu * (Math.log(y[i] * P) + lnPhi[i]);
      }
      const lnKAt = constants[k].lnK;
      const equilibriumK = temperatureOf(lnKAt, value, T);
      if (equilibriumK === null) return { equilibriumK, approachK: null };
      const falls = lnKAt(T + 0.5) < lnKAt(T - 0.5);
      return { equilibriumK, approachK: falls ? equilibriumK - T : T - equilibriumK };
    },
    effectiveness: () => last.effectiveness,
  };
}

/** y + ε exp(−y/ε): never below ε, and y itself where there is plenty. */
function withFloor(y: number, floor: number): number {
  return floor > 0 ? y + floor * Math.exp(-y / floor) : y;
}

/** Coldest and hottest equilibrium looked for [K]. */
const COLDEST = 200;
const HOTTEST = 3000;

/** T at which ln K has a value, by secants in 1/T, over which ln K is nearly straight; null beyond 200–3000 K. */
function temperatureOf(lnK: (T: number) => number, value: number, start: number): number | null {
  if (!Number.isFinite(value)) return null;
  let T = start;
  let error = lnK(T) - value;
  let next = T + 1;
  for (let step = 0; step < 50; step++) {
    if (!(next > COLDEST && next < HOTTEST)) return null;
    const errorNext = lnK(next) - value;
    const change = (errorNext - error) / (1 / next - 1 / T);
    T = next;
    error = errorNext;
    if (Math.abs(error) < 1e-13 || !(Math.abs(change) > 0)) break;
    // half the temperature or twice it is a step wide enough
    next = 1 / Math.min(Math.max(1 / T - error / change, 0.5 / T), 2 / T);
    if (next === T) break;
  }
  return T;
}

/** Shares of the named reactions that add up to a law's reaction; null where they do not. */
export function lawShares(
  stoichiometry: Readonly<Record<string, number>>,
  named: readonly Reaction[],
  components: readonly Component[],
): readonly number[] | null {
  const ids = components.map((c) => c.id);
  if (Object.keys(stoichiometry).some((id) => !ids.includes(id))) return null;
  const own = Float64Array.from(ids, (id) => stoichiometry[id] ?? 0);
  const rows = [...named.map((reaction) => reaction.coefficients), own];
  const found = dependentReactions(rows).find(({ index }) => index === named.length);
  return found ? found.factors : null;
}
