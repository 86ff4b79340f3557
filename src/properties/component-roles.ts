import type { Component } from '../model/component.ts';
import { henryConstant } from './henry.ts';
import { vapourPressureRange } from './vapour-pressure.ts';

/**
 * What a component does when gas and liquid part:
 * - `condensable` shares itself by its vapour pressure,
 * - `dissolved` is a gas that dissolves by Henry's law,
 * - `gas` stays out of the liquid,
 * - `solid` is in neither phase and leaves with the liquid.
 */
export type Role = 'condensable' | 'dissolved' | 'gas' | 'solid';

/**
 * A component is condensable from this critical temperature up [K]. Below it a component is a gas at the
 * temperatures of a loop's condenser (230–330 K and hotter). @source common practice
 */
const CONDENSABLE_FROM_CRITICAL_K = 350;

/**
 * Role of every component of a flowsheet.
 *
 * Condensable is what has a vapour pressure and a critical temperature above 350 K, unless a Henry constant
 * in a less volatile condensable of the same flowsheet is known (hydrogen sulphide beside water): then it
 * dissolves. `condense` names the condensables outright.
 *
 * @param components  in declared order
 * @param dissolvedGases  false keeps every gas out of the liquid
 * @param condense  ids that the user declared condensable, null for the rule above
 */
export function componentRoles(
  components: readonly Component[],
  dissolvedGases: boolean,
  condense: readonly string[] | null,
): Role[] {
  const candidates = components.map((c) => (condense ? condense.includes(c.id) : mayCondense(c)));
  const solvesIn = (gas: Component, gasIsCandidate: boolean) =>
    components.some(
      (solvent, s) =>
        candidates[s] &&
        solvent.id !== gas.id &&
        (!gasIsCandidate || criticalK(solvent) > criticalK(gas)) &&
        henryConstant(solvent.id, gas.id) !== undefined,
    );
  return components.map((c, i) => {
    if (c.solid) return 'solid';
    const candidate = candidates[i];
    if (candidate && (condense || !solvesIn(c, true))) return 'condensable';
    return dissolvedGases && solvesIn(c, candidate) ? 'dissolved' : 'gas';
  });
}

/**
 * Roles under `liquid: eos`: whatever the equation of state knows is in both phases, so that `condensable` and
 * `dissolved` differ in name only, by what condenses on its own at a loop's temperatures. What has no critical
 * data stays gas, and without `dissolvedGases` so does what is not condensable.
 */
export function equationOfStateRoles(
  components: readonly Component[],
  dissolvedGases: boolean,
  condense: readonly string[] | null,
): Role[] {
  return components.map((c) => {
    if (c.solid) return 'solid';
    if (!c.critical) return 'gas';
    if (condense ? condense.includes(c.id) : mayCondense(c)) return 'condensable';
    return dissolvedGases ? 'dissolved' : 'gas';
  });
}

function mayCondense(c: Component): boolean {
  return !c.solid && vapourPressureRange(c) !== null && criticalK(c) > CONDENSABLE_FROM_CRITICAL_K;
}

function criticalK(c: Component): number {
  return c.critical?.temperatureK ?? Number.POSITIVE_INFINITY;
}
