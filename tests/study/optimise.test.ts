import { describe, expect, test } from 'vitest';
import { optimiseText } from '../../src/sheets/optimise.ts';
import { balanceAt } from '../../src/study/balance-at.ts';
import { createObjectiveCases } from '../../src/study/objective-cases.ts';
import { optimise } from '../../src/study/optimise.ts';
import { shippedText } from '../tally/shipped.ts';
import { bruteForce } from './brute-force.ts';
import { flowsheetOf, shipped } from './read-study.ts';

/** A shipped flowsheet with another objective than its own. */
async function asked(name: string, objective: string) {
  const text = shippedText(name).replace(/\nobjective:[\s\S]*$/, '\n');
  return flowsheetOf(`${text}\nobjective: ${objective}\n`);
}

describe('the best of a brute-force grid is found within 1e-4', () => {
  test.each([
    { name: 'ammonia-loop', inner: 1, active: [true], bounds: [null, null] },
    { name: 'methanation', inner: 0, active: [false, true], bounds: [null, 'low'] },
    { name: 'methanol-optimum', inner: 1, active: [true], bounds: [null, null] },
  ] as const)('$name', { timeout: 240_000 }, async ({ name, inner, active, bounds }) => {
    const flowsheet = await shipped(name);
    const objective = flowsheet.objective!;
    const { outcome, best, starts } = optimise(flowsheet, objective);
    expect(outcome).toBe('found');
    const grid = bruteForce(createObjectiveCases(flowsheet, objective), inner).goals[0]!;
    const found = best!.case.goals[0]!;
    expect(Math.abs(found / grid - 1)).toBeLessThan(1e-4);
    const sign = objective.goals[0]!.sense === 'minimise' ? 1 : -1;
    expect(sign * (found - grid)).toBeLessThan(1e-6 * Math.abs(grid));
    expect(best!.active).toEqual(active);
    expect(best!.atBound).toEqual(bounds);
    for (const c of best!.case.c) expect(c).toBeLessThan(1e-6);
    // Every start leads to the same end.
    for (const { goal } of starts) expect(Math.abs(goal / found - 1)).toBeLessThan(1e-5);
  });
});

test('a limit that lets everything pass changes nothing, and one less changes the answer', async () => {
  const move = 'move: {condenser.temperature: -30 degC..25 degC}';
  const free = await asked('ammonia-loop.yaml', `{maximise: profit, ${move}}`);
  const loose = await asked(
    'ammonia-loop.yaml',
    `{maximise: profit, ${move}, limits: figures.recycle_ratio < 9}`,
  );
  const tight = await asked(
    'ammonia-loop.yaml',
    `{maximise: profit, ${move}, limits: figures.recycle_ratio < 3.3}`,
  );
  const [a, b, c] = [free, loose, tight].map((one) => optimise(one, one.objective!));
  expect(b!.best!.active).toEqual([false]);
  expect(b!.best!.case.goals[0]! / a!.best!.case.goals[0]!).toBeCloseTo(1, 8);
  expect(c!.best!.active).toEqual([true]);
  expect(c!.best!.case.figures[0]).toBeCloseTo(3.3, 5);
  expect(c!.best!.case.goals[0]!).toBeLessThan(a!.best!.case.goals[0]!);
});

test('the worth of an active limit is what letting it off brings', async () => {
  const goalAt = async (limit: number) => {
    const flowsheet = await asked(
      'ammonia-loop.yaml',
      `{maximise: profit, move: {condenser.temperature: -30 degC..25 degC, purge.fractions.bleed: 0.5 %..10 %}, limits: figures.inerts.converter < ${limit} %}`,
    );
    return optimise(flowsheet, flowsheet.objective!, { starts: 1 });
  };
  const [less, here, more] = [await goalAt(13.9), await goalAt(14), await goalAt(14.1)];
  const slope = (more.best!.case.goals[0]! - less.best!.case.goals[0]!) / 0.002;
  expect(here.worth[0]! / slope).toBeCloseTo(1, 2);
});

test('the optimum is the balance of the file with these settings, and the money adds up to the goal', async () => {
  const flowsheet = await shipped('ammonia-loop');
  const objective = flowsheet.objective!;
  const { best } = optimise(flowsheet, objective, { starts: 1 });
  const settings = objective.moves.map(({ path }, i) => ({ path, value: best!.settings[i]! }));
  const { result } = balanceAt(flowsheet, settings);
  expect(result.convergence.converged).toBe(true);
  expect(result.figures.inerts['converter']! / best!.case.figures[0]!).toBeCloseTo(1, 7);
  const { figures, streams, blocks } = result;
  const heatingMWh = { H2: 241.83, NH3: 316.8, CH4: 802.56 };
  const makeup = Object.entries(heatingMWh).reduce(
    (sum, [id, kJ]) => sum + (streams['S1']!.components_kmol_h[id] ?? 0) * (kJ / 3600),
    0,
  );
  const water = -(blocks['condenser']!.details['water_duty_kW'] as number) * 3.6e-3;
  const profit =
    (420 * figures.production_t_d!) / 24 +
    20 * figures.purge!.lhv_MW -
    25 * makeup -
    (70 * figures.power_kW['total']!) / 1e3 -
    0.5 * water;
  expect(best!.case.goals[0]! / profit).toBeCloseTo(1, 4);
});

test('the same file gives the same bytes', async () => {
  const flowsheet = await shipped('methanation');
  const once = optimiseText(optimise(flowsheet, flowsheet.objective!, { starts: 2 }));
  const again = optimiseText(optimise(flowsheet, flowsheet.objective!, { starts: 2 }));
  expect(again).toBe(once);
  expect(once.split('\n').filter((line) => [...line].length > 100)).toEqual([]);
});

describe('two goals', () => {
  const front =
    '{minimise: figures.specific_power_kWh_t, maximise: figures.overall_yield.value, move: {condenser.temperature: -30 degC..25 degC, purge.fractions.bleed: 0.5 %..10 %}, limits: figures.inerts.converter < 14 %}';

  test('give cases of which none is better in both, evenly spread from end to end', async () => {
    const flowsheet = await asked('ammonia-loop.yaml', front);
    const { front: points } = optimise(flowsheet, flowsheet.objective!, { points: 6, starts: 2 });
    expect(points).toHaveLength(6);
    const [power, made] = [0, 1].map((g) => points.map((point) => point.case.goals[g]!));
    for (let k = 1; k < points.length; k++) {
      expect(power![k]).toBeGreaterThan(power![k - 1]!);
      expect(made![k]).toBeGreaterThan(made![k - 1]!);
    }
    // On the line between the ends each point's foot lies where the line was divided.
    const share = (values: readonly number[], k: number) =>
      (values[k]! - values[0]!) / (values.at(-1)! - values[0]!);
    points.forEach((_, k) => {
      expect((share(power!, k) + share(made!, k)) / 2).toBeGreaterThanOrEqual(k / 5 - 1e-6);
      expect(share(made!, k)).toBeGreaterThanOrEqual(share(power!, k) - 1e-6);
    });
    // No case of a grid beats a point of the front.
    const cases = createObjectiveCases(flowsheet, flowsheet.objective!);
    for (let i = 0; i <= 8; i++) {
      for (let j = 0; j <= 8; j++) {
        const one = cases.at(Float64Array.from([i / 8, j / 24]));
        if (one === null || one.c[0]! > 1e-6) continue;
        for (let k = 0; k < points.length; k++) {
          const better = one.goals[0]! < power![k]! * (1 - 1e-5) && one.goals[1]! > made![k]! * (1 + 1e-5);
          expect(better).toBe(false);
        }
      }
    }
  });

  test('that want the same have one case', async () => {
    const flowsheet = await asked(
      'conversion-loop.yaml',
      '{maximise: [figures.overall_yield.value, figures.recycle_ratio], move: {purge.fractions.bleed: 1 %..20 %}}',
    );
    const { front: points } = optimise(flowsheet, flowsheet.objective!);
    expect(points).toHaveLength(1);
    expect(points[0]!.settings[0]).toBe(0.01);
  });
});

describe('limits that cannot be met', () => {
  test('alone: the one in the way is told with what it can reach', async () => {
    const flowsheet = await asked(
      'conversion-loop.yaml',
      '{minimise: figures.recycle_ratio, move: {purge.fractions.bleed: 4 %..20 %}, limits: [figures.overall_yield.value > 95 %, figures.recycle_ratio < 5]}',
    );
    const found = optimise(flowsheet, flowsheet.objective!);
    expect(found.outcome).toBe('limits-not-met');
    expect(found.reach.map(({ canBeMet }) => canBeMet)).toEqual([false, true]);
    // The yield of the closed form, best at the smallest purge.
    expect(found.reach[0]!.nearest).toBeCloseTo(0.25 / (1 - 0.75 * 0.96), 7);
    expect(found.reach[0]!.settings[0]).toBeCloseTo(0.04, 7);
  });

  test('together: both can be met alone, and the case told misses them least', async () => {
    const flowsheet = await asked(
      'conversion-loop.yaml',
      '{minimise: figures.recycle_ratio, move: {purge.fractions.bleed: 1 %..20 %}, limits: [figures.overall_yield.value > 90 %, figures.overall_yield.value < 80 %]}',
    );
    const found = optimise(flowsheet, flowsheet.objective!);
    expect(found.outcome).toBe('limits-not-met');
    expect(found.reach.every(({ canBeMet }) => canBeMet)).toBe(true);
    const [over, under] = found.best!.case.c;
    expect(over! / under!).toBeCloseTo(1, 3);
  });
});

test('where nothing closes the reason is told', async () => {
  const flowsheet = await asked(
    'ammonia-loop.yaml',
    '{minimise: figures.recycle_ratio, move: {letdown.pressure: 300 bar..400 bar}}',
  );
  const found = optimise(flowsheet, flowsheet.objective!);
  expect(found.outcome).toBe('not-closed');
  expect(found.failure).toContain('letdown');
});
