import type { Component } from '../../src/model/component.ts';
import { createMixture, type Mixture } from '../../src/properties/mixture.ts';
import { components } from './helpers.ts';

/** The gas constant that the polynomials of the heat capacities are meant for, over today's. */
const NASA_SHARE = 8.31451 / 8.314462618;

/** The gas of the textbooks: ideal, k = cp/cv the same at every temperature. */
export function constantHeatGas(k: number, molarMassKgPerMol: number): Mixture {
  const [nitrogen] = components('N2');
  const gas: Component = {
    ...nitrogen!,
    id: 'X',
    molarMassKgPerMol,
    idealGas: [
      { fromK: 100, toK: 3000, a: [0, 0, k / (k - 1) / NASA_SHARE, 0, 0, 0, 0], b1: 0, b1Atct: null, b2: 0 },
    ],
  };
  return createMixture({ components: [gas], gas: 'ideal', dissolvedGases: false, basis: 'nasa' });
}
