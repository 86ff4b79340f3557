import { blockKinds } from '../blocks/registry.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import { vapourPressureRange } from '../properties/vapour-pressure.ts';
import type { NumericSetting } from './numeric-settings.ts';

/** A constant that can be moved by a factor: what it belongs to, and the name of that. */
export interface ConstantPath {
  readonly of: 'reaction' | 'component';
  readonly name: string;
}

/** What `reactions.NAME.K` or `components.ID.vapour_pressure` names; null for any other path. */
export function constantAt(path: string): ConstantPath | null {
  const [section, name, field, ...rest] = path.split('.');
  if (name === undefined || rest.length > 0) return null;
  if (section === 'reactions' && field === 'K') return { of: 'reaction', name };
  if (section === 'components' && field === 'vapour_pressure') return { of: 'component', name };
  return null;
}

/**
 * The constants of a flowsheet that act in it, each as a factor of 1 on what the data say: the equilibrium constant of every
 * reaction that runs to equilibrium somewhere, and, with `liquid: antoine`, every vapour pressure that is known.
 */
export function numericConstants(
  flowsheet: Pick<Flowsheet, 'blocks' | 'components' | 'liquid' | 'reactions'>,
): readonly NumericSetting[] {
  const { blocks, components, liquid, reactions } = flowsheet;
  const atEquilibrium = new Set(
    blocks.flatMap(({ kind, settings }) => blockKinds.get(kind)?.equilibriaIn?.(settings) ?? []),
  );
  return [
    ...reactions
      .filter(({ name }) => atEquilibrium.has(name))
      .map(({ name }) => factor(`reactions.${name}.K`)),
    ...(liquid === 'eos' ? [] : components)
      .filter((c) => !c.solid && vapourPressureRange(c) !== null)
      .map(({ id }) => factor(`components.${id}.vapour_pressure`)),
  ];
}

function factor(path: string): NumericSetting {
  const bounds = { low: 0, high: Number.POSITIVE_INFINITY };
  return { path, dimension: 'number', value: 1, unit: '1', unitSI: 1, bounds };
}
