import { type Draft, type End, short } from './flowsheet-draft.ts';

/** Draws from a range; whole numbers below a bound. */
export interface Chance {
  between(low: number, high: number): number;
  below(count: number): number;
}

export function createChance(draw: () => number): Chance {
  return {
    between: (low, high) => low + (high - low) * draw(),
    below: (count) => Math.floor(count * draw()),
  };
}

/**
 * So many blocks that a gas passes on its way: heaters, valves, knock-out drums, and lines of which a part goes by
 * another heater. All together lose at most `loss` bar.
 */
export function gasTrain(
  draft: Draft,
  chance: Chance,
  name: string,
  start: End,
  length: number,
  loss: number,
  drums: boolean,
): End {
  const most = loss / Math.max(1, length);
  let end = start;
  for (let left = length; left > 0; ) {
    const one = `${name}_${draft.count + 1}`;
    const bar = Number(short(end.bar - most * chance.between(0.1, 1)));
    const degC = chance.between(70, 200);
    const pick = chance.below(8);
    if (pick === 0 && left >= 3) {
      draft.lead(end, draft.block(one, 'splitter', `fractions: {by: ${short(chance.between(10, 60))} %}`));
      const by = { at: `${one}.by`, bar: end.bar };
      const rest = { at: `${one}.rest`, bar: end.bar };
      const heater = draft.block(`${one}_by`, 'heater', `temperature: ${short(degC)} degC`);
      draft.lead(by, heater);
      const mixer = draft.block(`${one}_join`, 'mixer');
      draft.lead({ at: heater, bar: end.bar }, mixer);
      draft.lead(rest, mixer);
      end = { at: mixer, bar: end.bar };
      left -= 3;
      continue;
    }
    if (pick === 1) {
      draft.lead(end, draft.block(one, 'valve', `pressure: ${bar} bar`));
      end = { at: one, bar };
    } else if (pick === 2 && drums) {
      draft.lead(end, draft.block(one, 'flash', `pressure: ${bar} bar, adiabatic: true`));
      draft.lead({ at: `${one}.liquid`, bar }, 'out');
      end = { at: `${one}.gas`, bar };
    } else {
      const drop = Number(short(end.bar - bar));
      draft.lead(
        end,
        draft.block(one, 'heater', `temperature: ${short(degC)} degC, pressure_drop: ${drop} bar`),
      );
      end = { at: one, bar: end.bar - drop };
    }
    left--;
  }
  return end;
}

/** So many blocks that a condensate passes: let down into drums, pumped up, cooled. */
export function liquidTrain(
  draft: Draft,
  chance: Chance,
  name: string,
  start: End,
  length: number,
  coldDegC: number,
): End {
  let end = start;
  for (let left = length; left > 0; left--) {
    const one = `${name}_${draft.count + 1}`;
    if (left % 3 === 0) {
      const bar = Number(short(end.bar * chance.between(0.85, 0.97)));
      draft.lead(end, draft.block(one, 'flash', `pressure: ${bar} bar, adiabatic: true`));
      draft.lead({ at: `${one}.gas`, bar }, 'out');
      end = { at: `${one}.liquid`, bar };
    } else if (left % 3 === 2) {
      const bar = Number(short(end.bar * chance.between(1.1, 1.3)));
      draft.lead(end, draft.block(one, 'pump', `pressure: ${bar} bar`));
      end = { at: one, bar };
    } else {
      const degC = coldDegC - chance.between(0, 5);
      draft.lead(end, draft.block(one, 'heater', `temperature: ${short(degC)} degC`));
      end = { at: one, bar: end.bar };
    }
  }
  return end;
}
