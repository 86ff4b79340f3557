import { describe, expect, test, vi } from 'vitest';
import { blockKinds } from '../../src/blocks/registry.ts';
import { numericSettings } from '../../src/flowsheet/numeric-settings.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import { balance } from '../../src/tally/balance.ts';
import { closePlant } from '../../src/tally/close-plant.ts';
import { figureLeaves } from '../../src/tally/figure-leaves.ts';
import { holdsOn } from '../../src/tally/lever-ranking.ts';
import { type Lever, levers } from '../../src/tally/levers.ts';
import { createPlant } from '../../src/tally/plant.ts';
import { createClosedAgain, sizeOf, type Way } from './closed-again.ts';
import { read } from './read.ts';
import { shipped, shippedText } from './shipped.ts';

const loop = (name: string, set: readonly string[] = []) => read(shippedText(`${name}.yaml`), { set });
const leverOf = (list: readonly Lever[], path: string) => list.find(({ setting }) => setting.path === path)!;

/**
 * For figures that do not move: the noise of a pass leaves up to 3e-7 in d ln figure / d ln setting. Duties and powers
 * are differences of the heats that flow about: 1e-7 of the largest of them, per relative change of the setting.
 */
const FLOOR = 3e-7;
const HEAT_FLOOR = 1e-7;
/** What closing again may leave open of what a lever is allowed to be off. */
const CERTAIN = 0.1;

describe('levers are the central differences of the loop closed again, to 1e-5 in every figure:', () => {
  test.each(shipped.map((file) => file.replace('.yaml', '')))('%s', { timeout: 120_000 }, async (name) => {
    const flowsheet = await loop(name);
    const found = levers(flowsheet);
    expect(found.levers.length).toBeGreaterThan(9);
    const names = Object.keys(found.figures);
    const heats = Object.entries(found.figures).filter(([figure]) => isHeat(figure));
    const heat = Math.max(0, ...heats.map(([, value]) => Math.abs(value)));
    // The specific power is the total power in another unit, and as noisy.
    const perPower = found.figures['specific_power_kWh_t']! / found.figures['power_kW.total']! || 0;
    // The conversion loop loses no pressure, so that its recycle keeps whatever lower pressure it starts with.
    const again = createClosedAgain(flowsheet, name === 'conversion-loop');
    const off: string[] = [];
    for (const { setting, figures, sides, note } of found.levers) {
      const allowed = (figure: string, slope: number) => {
        const noisy = isHeat(figure) ? heat : figure === 'specific_power_kWh_t' ? heat * perPower : 0;
        const still = FLOOR * Math.abs(found.figures[figure]!) + HEAT_FLOOR * noisy;
        return 1e-5 * Math.abs(slope) + (still * setting.unitSI) / sizeOf(setting) + 1e-12;
      };
      const compare = (way: Way, slopes: Readonly<Record<string, number>>) => {
        const differences = again.slopes(
          setting,
          way,
          names,
          (figure, { value, uncertainty }) => uncertainty <= CERTAIN * allowed(figure, value),
        );
        expect(Object.keys(slopes)).toEqual(names);
        for (const [figure, { value, uncertainty }] of differences) {
          const apart = Math.abs(slopes[figure]! - value);
          const most = allowed(figure, value);
          if (apart <= most && uncertainty <= CERTAIN * most) continue;
          const seen = `${slopes[figure]}, closed again ${value} +- ${uncertainty}`;
          off.push(`${setting.path} ${way} ${figure}: ${seen}: ${(apart / most).toFixed(1)} of allowed`);
        }
      };
      if (sides !== null) {
        compare('more', sides.more);
        compare('less', sides.less);
      } else if (note?.startsWith('at its lower bound')) compare('more', figures);
      else if (note?.startsWith('at its upper bound')) compare('less', figures);
      else compare('both', figures);
    }
    expect(off).toEqual([]);
  });
});

test('levers pass the plant far less often than solving it again for every setting', async () => {
  const flowsheet = await loop('ammonia-loop');
  const passes = passesOf(() => levers(flowsheet), flowsheet);
  const settings = numericSettings(flowsheet);
  const solving = passesOf(() => {
    const plant = createPlant(flowsheet);
    for (const { path, value } of settings) {
      // Levers are checked at a second step, by which a kink is told from a curve: so are these.
      for (const share of [1.001, 0.999, 1.0005, 0.9995]) {
        plant.set(path, value * share);
        closePlant(plant, { method: 'auto', tolerance: 1e-9, maxPasses: 200 });
      }
      plant.set(path, value);
    }
  }, flowsheet);
  expect(passes).toBeLessThan(0.5 * solving);
  // The first setting costs the linearised recycles, the next ones a pass to each side at two steps.
  const first = passesOf(() => levers(flowsheet, { over: settings.slice(0, 1) }), flowsheet);
  const two = passesOf(() => levers(flowsheet, { over: settings.slice(0, 2) }), flowsheet);
  expect(two - first).toBeLessThanOrEqual(4);
});

/** Passes of the whole plant that something takes; derivatives carried through it count as one. */
function passesOf(work: () => void, flowsheet: Flowsheet): number {
  const kinds = [...new Set(flowsheet.blocks.map(({ kind }) => blockKinds.get(kind)!))];
  let passes = 0;
  const spies = kinds.map((kind) => {
    const create = kind.create;
    return vi.spyOn(kind, 'create').mockImplementation((settings, context) => {
      const unit = create(settings, context);
      return {
        ...unit,
        pass(inlets, outlets) {
          passes++;
          unit.pass(inlets, outlets);
        },
        slopes(inlets, outlets, slopes) {
          passes++;
          return unit.slopes?.(inlets, outlets, slopes) ?? false;
        },
      };
    });
  });
  work();
  for (const spy of spies) spy.mockRestore();
  return passes / flowsheet.blocks.length;
}

function isHeat(figure: string): boolean {
  return /^(duty|power)_kW/.test(figure);
}

describe('levers of the loop with a closed-form answer', () => {
  // N = F/D at the converter, D = 1 - (1 - X)(1 - p); yield X/D; argon at the inlet 1/p of what is fed.
  const [X, p] = [0.25, 0.04];
  const D = 1 - (1 - X) * (1 - p);

  test('yield: more purge costs X(1 - X)/D2, more conversion gives p/D2', async () => {
    const found = levers(await loop('conversion-loop')).levers;
    const yieldBy = (path: string) => leverOf(found, path).figures['overall_yield']!;
    expect(yieldBy('purge.fractions.bleed')).toBeCloseTo((-0.01 * X * (1 - X)) / D ** 2, 9);
    expect(yieldBy('converter.reactions.synthesis.conversion')).toBeCloseTo((0.01 * p) / D ** 2, 9);
  });

  test('recycle: by the purge, and in proportion to all flows fed together', async () => {
    const { levers: found, figures } = levers(await loop('conversion-loop'));
    const rest = (1 - X) * 4 * (24.75 / D) + 1 / p;
    const perFraction = -rest + (1 - p) * ((-(1 - X) * 4 * 24.75 * (1 - X)) / D ** 2 - 1 / p ** 2);
    expect(leverOf(found, 'purge.fractions.bleed').figures['recycle_ratio']! * 100).toBeCloseTo(
      0.01 * perFraction,
      5,
    );
    // Euler: a figure of degree one is the sum of flow times slope over the flows fed.
    const flows = found.filter(({ setting }) => setting.path.startsWith('makeup.flows.'));
    expect(flows.map(({ setting }) => setting.unit)).toEqual(['kmol/h', 'kmol/h', 'kmol/h']);
    const sum = flows.reduce(
      (all, { setting, figures: slopes }) =>
        all + (setting.value / setting.unitSI) * slopes['production_t_d']!,
      0,
    );
    expect(sum).toBeCloseTo(figures['production_t_d']!, 6);
  });

  test('a recovery of 100 % is told to be at its bound and has the slope of the one side', async () => {
    const lever = leverOf(levers(await loop('conversion-loop')).levers, 'separator.recover.product.NH3');
    // Of ammonia made, r / (1 - (1 - r)(1 - p)) leaves as product: slope p at r = 1.
    expect(lever.note).toBe('at its upper bound: taken downwards only');
    expect(lever.figures['overall_yield']).toBeCloseTo((0.01 * p * X) / D, 7);
  });
});

test('where two equal pressures meet in a mixer, more and less are told apart', async () => {
  const { levers: found } = levers(await loop('ammonia-loop'));
  const { sides, figures, note } = leverOf(found, 'circulator.pressure');
  expect(note).toContain('a kink');
  expect(sides!.more['overall_yield']).toBeCloseTo(0, 9);
  expect(sides!.more['power_kW.circulator']).toBeGreaterThan(0);
  expect(sides!.less['overall_yield']).toBeGreaterThan(1e-5);
  expect(figures['overall_yield']).toBeCloseTo(sides!.less['overall_yield']! / 2, 9);
  expect(found.filter((lever) => lever.sides !== null).map(({ setting }) => setting.path)).toEqual([
    'makeup_compressor.pressure',
    'circulator.pressure',
  ]);
});

test('a boiling point on the way of a setting is told: the phase changes', async () => {
  const flowsheet = await read(`
looptally: 1
components: [H2O]
gas: ideal
feeds: {water: {flow: 100 kmol/h, temperature: 20 degC, pressure: 1 bar, composition: {H2O: 1}}}
blocks: {boiler: {kind: heater, vapour_fraction: 0.5}, after: {kind: heater, duty: 0 kW}}
streams: {S1: water -> boiler, S2: boiler -> after, S3: after -> out}
`);
  // Full evaporation needs this duty; a little more is superheat.
  const { blocks } = balance({
    ...flowsheet,
    blocks: [{ ...flowsheet.blocks[0]!, settings: { vapour_fraction: 1 } }, flowsheet.blocks[1]!],
  }).result;
  const boiler = { ...flowsheet.blocks[0]!, settings: { duty: 1e3 * blocks['boiler']!.duty_kW } };
  const found = levers({ ...flowsheet, blocks: [boiler, flowsheet.blocks[1]!] }).levers;
  expect(leverOf(found, 'boiler.duty').note).toMatch(/^a stream changes its phase here/);
});

test('levers leave no trace: figures as balanced, and the same twice', async () => {
  const flowsheet = await loop('methanation');
  const found = levers(flowsheet);
  for (const [name, value] of figureLeaves(balance(flowsheet).result.figures)) {
    expect(Math.abs(found.figures[name]! - value), name).toBeLessThanOrEqual(1e-8 * Math.abs(value) + 1e-12);
  }
  expect(levers(flowsheet)).toEqual(found);
});

test('the lever of a setting that an aim moves is taken where the aim put it', async () => {
  const aims =
    'aims: {cap: {move: purge.fractions.bleed, between: [1 %, 20 %], until: streams.S2.y.Ar = 5 %}}\n';
  const flowsheet = await read(shippedText('conversion-loop.yaml') + aims);
  const { levers: found, result } = levers(flowsheet);
  const { value } = leverOf(found, 'purge.fractions.bleed').setting;
  expect(value).toBe(result.aims['cap']!.value);
  expect(value).toBeGreaterThan(0.041);
  const D = 1 - 0.75 * (1 - value);
  expect(leverOf(found, 'purge.fractions.bleed').figures['overall_yield']).toBeCloseTo(
    (-0.01 * 0.25 * 0.75) / D ** 2,
    8,
  );
});

test('a loop that does not close has no levers', async () => {
  const found = levers(await loop('ammonia-loop'), { maxPasses: 2 });
  expect(found.levers).toEqual([]);
  expect(found.diagnosis).not.toBeNull();
});

test('what holds a figure most is told by elasticity, feeds aside', async () => {
  const { levers: found, figures, result } = levers(await loop('conversion-loop'));
  const holds = holdsOn('overall_yield', found, figures, Object.keys(result.blocks));
  // d ln yield / d ln r = r dY/dr / Y = p at r = 1; d ln / d ln X = p/D; d ln / d ln p = -p (1 - X)/D
  const D = 1 - 0.75 * 0.96;
  expect(holds.map(({ setting }) => setting)).toEqual([
    'converter.reactions.synthesis.conversion',
    'purge.fractions.bleed',
    'separator.recover.product.NH3',
  ]);
  expect(holds[0]!.elasticity).toBeCloseTo(0.04 / D, 7);
  expect(holds[1]!.elasticity).toBeCloseTo((-0.04 * 0.75) / D, 7);
  expect(holds[2]!.elasticity).toBeCloseTo(0.04, 6);
});
