import type { Component } from '../../src/model/component.ts';
import type { GasModelName, LiquidModelName } from '../../src/model/flowsheet.ts';
import { emptyStream, type StreamState } from '../../src/model/stream.ts';
import { builtInComponent } from '../../src/properties/components.ts';
import { createMixture, type Mixture } from '../../src/properties/mixture.ts';

export function componentsOf(...ids: string[]): Component[] {
  return ids.map((id) => {
    const found = builtInComponent(id);
    if (!found) throw new Error(`no component ${id}`);
    return found;
  });
}

export function mixtureOf(
  ids: readonly string[],
  options: {
    gas?: GasModelName;
    liquid?: LiquidModelName;
    dissolvedGases?: boolean;
    condense?: readonly string[];
  } = {},
): Mixture {
  return createMixture({
    components: componentsOf(...ids),
    gas: options.gas ?? 'srk',
    liquid: options.liquid ?? 'antoine',
    dissolvedGases: options.dissolvedGases ?? true,
    basis: 'atct',
    condense: options.condense ?? null,
  });
}

/** A settled stream; flows [mol/s] in the order of the components. */
export function streamOf(mixture: Mixture, T: number, bar: number, flows: ArrayLike<number>): StreamState {
  const stream = emptyStream(mixture.size);
  stream.flowsMolPerS.set(flows);
  stream.temperatureK = T;
  stream.pressurePa = bar * 1e5;
  mixture.settle(stream);
  return stream;
}

/** Mole fractions of the gas of a settled stream. */
export function gasFractions(stream: StreamState): Float64Array {
  const gas = stream.flowsMolPerS.map((flow, i) => flow - stream.liquidMolPerS[i]!);
  const total = gas.reduce((sum, flow) => sum + flow, 0);
  return gas.map((flow) => flow / total);
}

/** Mole fractions of the liquid of a settled stream without solids. */
export function liquidFractions(stream: StreamState): Float64Array {
  const total = stream.liquidMolPerS.reduce((sum, flow) => sum + flow, 0);
  return stream.liquidMolPerS.map((flow) => flow / total);
}
