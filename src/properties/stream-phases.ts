import type { StreamState } from '../model/stream.ts';
import type { Role } from './component-roles.ts';

/** A phase of less than this share of the fluid is rounding [-]. */
const NO_PHASE = 1e-12;

/** Gas and liquid of a stream, solids left out; arrays in component order. */
export interface StreamPhases {
  readonly solid: Uint8Array;
  /** of the stream itself, solids included [mol/s] */
  readonly flows: Float64Array;
  /** flows of gas and liquid and their sums [mol/s] */
  readonly g: Float64Array;
  readonly l: Float64Array;
  readonly G: number;
  readonly L: number;
  /** gas fractions */
  readonly y: Float64Array;
  /** share of each component that is liquid [-]; solids 1 */
  readonly theta: Float64Array;
}

export interface PhaseReader {
  readonly phases: StreamPhases;
  /** Read a settled stream; false where there is no fluid. */
  read(stream: StreamState): boolean;
}

/** Reads a stream's phases, for its derivatives; `theta` of a component that does not flow is left at 0 beside both. */
export function createPhaseReader(roles: readonly Role[]): PhaseReader {
  const size = roles.length;
  const solid = Uint8Array.from(roles, (role) => (role === 'solid' ? 1 : 0));
  const array = () => new Float64Array(size);
  const phases = { solid, flows: array(), g: array(), l: array(), G: 0, L: 0, y: array(), theta: array() };
  const { flows, g, l, y, theta } = phases;

  return {
    phases,
    read({ flowsMolPerS, liquidMolPerS }) {
      phases.G = 0;
      phases.L = 0;
      flows.set(flowsMolPerS);
      for (let i = 0; i < size; i++) {
        l[i] = solid[i] ? 0 : Math.min(liquidMolPerS[i], flows[i]);
        g[i] = solid[i] ? 0 : flows[i] - l[i];
        phases.G += g[i];
        phases.L += l[i];
      }
      const total = phases.G + phases.L;
      if (total === 0) return false;
      if (phases.L <= NO_PHASE * total) moveAll(l, g);
      else if (phases.G <= NO_PHASE * total) moveAll(g, l);
      for (let i = 0; i < size; i++) {
        y[i] = phases.G > 0 ? g[i] / phases.G : 0;
        const alone = phases.G > 0 ? 0 : 1;
        theta[i] = solid[i] ? 1 : flows[i] > 0 ? l[i] / flows[i] : alone;
      }
      return true;
    },
  };

  function moveAll(from: Float64Array, to: Float64Array): void {
    for (let i = 0; i < size; i++) {
      if (!solid[i]) to[i] = flows[i];
      from[i] = 0;
    }
    const toGas = to === g;
    const total = phases.G + phases.L;
    phases.G = toGas ? total : 0;
    phases.L = toGas ? 0 : total;
  }
}
