import type { Component } from '../model/component.ts';
import type { Feed } from '../model/flowsheet.ts';
import { NORMAL_VOLUME_M3_PER_MOL } from '../properties/constants.ts';

/**
 * Flows of a feed's components [mol/s] from its total flow and composition, or as given one by one.
 *
 * @param out  written, one per component in declared order
 */
export function feedFlows(feed: Feed, components: readonly Component[], out: Float64Array): void {
  const { flow, parts, basis } = feed;
  if (flow === null) {
    out.set(parts);
    return;
  }
  // Moles in proportion to the parts, and the mass of that many moles.
  let moles = 0;
  let mass = 0;
  for (let i = 0; i < out.length; i++) {
    const molarMass = components[i].molarMassKgPerMol;
    out[i] = basis === 'mole' ? parts[i] : parts[i] / molarMass;
    moles += out[i];
    mass += out[i] * molarMass;
  }
  const factor = {
    molar: flow.value / moles,
    mass: flow.value / mass,
    normalVolume: flow.value / NORMAL_VOLUME_M3_PER_MOL / moles,
  }[flow.per];
  for (let i = 0; i < out.length; i++) out[i] *= factor;
}
