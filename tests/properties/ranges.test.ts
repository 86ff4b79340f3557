import { describe, expect, test } from 'vitest';
import { emptyStream } from '../../src/model/stream.ts';
import { builtInComponent, builtInIds } from '../../src/properties/components.ts';
import { henryConstants } from '../../src/properties/data/henry-constants.ts';
import { liquidVolumeRange } from '../../src/properties/liquid-volume.ts';
import { heatCapacityRange } from '../../src/properties/ranges.ts';
import { vapourPressureRange } from '../../src/properties/vapour-pressure.ts';
import { mixtureOf } from './mixture-of.ts';

interface Known {
  readonly correlation: string;
  readonly ids: readonly string[];
  /** shares of the liquid; none for a gas */
  readonly liquid: readonly number[];
  readonly fromK: number;
  readonly toK: number;
}

const components = builtInIds.map((id) => builtInComponent(id)!);

/** Every correlation of the data that has a range, and a stream that is computed with it. */
const heat = components.flatMap((c): Known[] => {
  const range = heatCapacityRange(c);
  return range === null
    ? []
    : [{ correlation: `heat capacity of ${c.id}`, ids: [c.id], liquid: [0], ...range }];
});
const pressures = components.flatMap((c): Known[] => {
  const range = c.solid ? null : vapourPressureRange(c);
  return range === null
    ? []
    : [{ correlation: `vapour pressure of ${c.id}`, ids: [c.id], liquid: [1], ...range }];
});
const volumes = components.flatMap((c): Known[] => {
  const range = c.solid ? null : liquidVolumeRange(c);
  return range === null
    ? []
    : [{ correlation: `liquid volume of ${c.id}`, ids: [c.id], liquid: [1], ...range }];
});
const henrys = henryConstants.map(
  ({ solvent, solute, fromK, toK }): Known => ({
    correlation: `Henry constant of ${solute} in ${solvent}`,
    ids: [solvent, solute],
    liquid: [0.99, 0.01],
    fromK,
    toK,
  }),
);

function namedAt({ ids, liquid }: Known, T: number): string[] {
  const wet = liquid[0]! > 0;
  const mixture = mixtureOf(ids, wet ? { condense: [ids[0]!] } : {});
  const stream = emptyStream(mixture.size);
  stream.temperatureK = T;
  stream.pressurePa = 1e5;
  stream.flowsMolPerS.fill(1);
  if (wet) {
    stream.flowsMolPerS.set(liquid);
    stream.liquidMolPerS.set(liquid);
  }
  return mixture.usesOutside(stream).map(({ correlation }) => correlation);
}

describe.each([
  ['heat capacity', heat, builtInIds.length],
  ['vapour pressure', pressures, 15],
  ['Henry constant', henrys, 20],
] as const)('each %s', (_, known, least) => {
  test('is named just outside its range and not just inside', () => {
    expect(known.length).toBeGreaterThanOrEqual(least);
    for (const one of known) {
      // some constants are known at one temperature only
      const inside = Math.min(0.1, (one.toK - one.fromK) / 2);
      expect(namedAt(one, one.fromK + inside), one.correlation).not.toContain(one.correlation);
      expect(namedAt(one, one.toK - inside), one.correlation).not.toContain(one.correlation);
      expect(namedAt(one, one.toK + 0.1), one.correlation).toContain(one.correlation);
      if (one.fromK > 1) expect(namedAt(one, one.fromK - 0.1), one.correlation).toContain(one.correlation);
    }
  });
});

test('each liquid volume is named outside its range, unless the vapour pressure is already', () => {
  expect(volumes.length).toBeGreaterThanOrEqual(15);
  for (const one of volumes) {
    const middle = 0.5 * (one.fromK + one.toK);
    expect(namedAt(one, middle), one.correlation).not.toContain(one.correlation);
    for (const T of [one.fromK - 0.1, one.toK + 0.1].filter((edge) => edge > 1)) {
      expect(namedAt(one, T).join(), one.correlation).toMatch(
        new RegExp(`${one.correlation}|vapour pressure of ${one.ids[0]}`),
      );
    }
  }
});

test('what is there in traces only is not spoken of, nor a liquid by an equation of state', () => {
  const mixture = mixtureOf(['N2', 'H2O']);
  const stream = emptyStream(mixture.size);
  stream.temperatureK = 150;
  stream.pressurePa = 1e5;
  stream.flowsMolPerS.set([1, 1e-9]);
  expect(mixture.usesOutside(stream).map(({ correlation }) => correlation)).toEqual(['heat capacity of N2']);
  const eos = mixtureOf(['N2', 'H2O'], { liquid: 'eos' });
  stream.temperatureK = 265;
  stream.flowsMolPerS.set([1, 1]);
  stream.liquidMolPerS.set([0.001, 1]);
  expect(eos.usesOutside(stream)).toEqual([]);
});
