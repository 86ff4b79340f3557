import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import type { Group, Plant } from './plant.ts';

/** A condenser or let-down vessel of a loop, as it stands after a pass. */
export interface Vessel {
  readonly block: number;
  readonly name: string;
  readonly inlet: StreamState;
  readonly gas: StreamState;
  readonly liquid: StreamState;
  /** the property model with the condensables of this block */
  readonly mixture: Mixture;
}

export type Phases = 'empty' | 'gas' | 'liquid' | 'both';

/** The blocks of a group that part one inlet into gas and liquid. */
export function vesselsOf(plant: Plant, group: Group): Vessel[] {
  return group.blocks.flatMap((block) => {
    const { name, settings } = plant.blocks[block];
    const ports = plant.kinds[block].ports(settings).outlets;
    const gas = plant.outlets[block][ports.indexOf('gas')];
    const liquid = plant.outlets[block][ports.indexOf('liquid')];
    const inlet = plant.inlets[block][0];
    if (!gas || !liquid || !inlet) return [];
    const condense = settings['condense'] as readonly string[] | undefined;
    const mixture = condense ? plant.mixture.withCondensables(condense) : plant.mixture;
    return [{ block, name, inlet, gas, liquid, mixture }];
  });
}

export function phasesIn({ gas, liquid, mixture }: Vessel): Phases {
  const isGas = mixture.total(gas) > 0;
  const isLiquid = mixture.total(liquid) > 0;
  if (isGas) return isLiquid ? 'both' : 'gas';
  return isLiquid ? 'liquid' : 'empty';
}
