import { dewPointK } from './dew-point.ts';
import { answerText, type Finding } from './why.ts';
import type { Facts, OnwardPass } from './why-facts.ts';
import { bar, degC } from './why-format.ts';
import { vesselsOf } from './why-vessels.ts';

/** So many changes between one and two phases in the direct passes are no accident of the way there. */
const CHANGES = 4;
/** A dew point is looked for up to so far above the vessel [K]. */
const ABOVE_K = 60;

/** A vessel holds two phases in one pass and one in the next, and goes on like that. */
export function flippingPhases(facts: Facts): Finding | null {
  const { plant, group, onward } = facts;
  for (const { name, block, mixture } of vesselsOf(plant, group)) {
    const seen = onward.flatMap((pass) => stateOf(pass, name));
    const changes = seen.filter(
      (one, k) => k > 0 && (one.phases === 'both') !== (seen[k - 1].phases === 'both'),
    );
    const two = seen.findLast(({ phases }) => phases === 'both');
    const one = seen.findLast(({ phases }) => phases !== 'both');
    if (changes.length < CHANGES || !two || !one || !changes.includes(seen.at(-1)!)) continue;
    const stateText = (state: typeof two) => {
      const { pressurePa, flowsMolPerS } = state.dew;
      const dewK = dewPointK(mixture, pressurePa, flowsMolPerS, state.temperatureK + ABOVE_K);
      const dew = dewK === null ? 'no dew point' : `a dew point of ${degC(dewK)}`;
      return `${degC(state.temperatureK)} and ${bar(pressurePa)} with ${dew}`;
    };
    const setting = ['temperature', 'duty', 'pressure'].find((key) => key in plant.blocks[block].settings);
    const path = setting === undefined ? name : `${name}.${setting}`;
    return {
      code: 'phases-flip',
      what: `${name} changes between one phase and two from pass to pass`,
      why: `in ${changes.length} of ${seen.length - 1} further passes it changed: ${one.phases} only at ${stateText(one)}, gas and liquid at ${stateText(two)}; each makes the next pass the other`,
      mend: [
        `move ${path} so that ${name} stands well off the dew point`,
        answerText(facts) || 'or use --method newton',
      ].join('; '),
      where: plant.flowsheet.placeOf(`blocks.${path}`),
    };
  }
  return null;
}

function stateOf({ vessels }: OnwardPass, name: string) {
  const state = vessels.get(name);
  return state === undefined || state.phases === 'empty' ? [] : [state];
}
