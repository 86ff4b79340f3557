import { describe, expect, test } from 'vitest';
import type { Result } from '../../src/model/result.ts';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';
import { shippedText } from './shipped.ts';

// Plausibility bands of ammonia loops are common practice: EFMA booklet 1 (2000); Appl, Ammonia (Wiley-VCH); from memory.

const solved = async (name: string, options: Parameters<typeof read>[1] = {}): Promise<Result> =>
  balance(await read(shippedText(`${name}.yaml`), options)).result;
const within = (value: number | undefined | null, [low, high]: readonly [number, number], what: string) => {
  expect(value, what).toBeGreaterThanOrEqual(low);
  expect(value, what).toBeLessThanOrEqual(high);
};
const perTonne = (kW: number, { figures }: Result) => (24 * kW) / figures.production_t_d!;

function expectAmmoniaLoop(result: Result, inlet: string, outlet: string): void {
  within(result.figures.per_pass_conversion['converter']!['H2'], [0.2, 0.3], 'per pass');
  within(result.streams[outlet]!.mole_fraction['NH3'], [0.12, 0.2], 'NH3 at the outlet');
  within(result.streams[inlet]!.mole_fraction['NH3'], [0.015, 0.045], 'NH3 at the inlet');
  within(result.figures.recycle_ratio, [2.5, 5.5], 'recycle ratio');
}

describe('ammonia with flash gas return', () => {
  const name = 'ammonia-flash-gas-return';

  test('lies where such loops lie, refrigeration included', async () => {
    const result = await solved(name);
    expectAmmoniaLoop(result, 'S4', 'S5');
    within(result.figures.inerts['converter'], [0.02, 0.15], 'inerts');
    within(perTonne(result.figures.power_kW['refrigeration']!, result), [60, 150], 'refrigeration, kWh/t');
    const { makeup_compressor: makeup, circulator } = result.figures.power_kW;
    within(perTonne(makeup! + circulator!, result), [250, 450], 'compression, kWh/t');
  });

  test('what the let-down gas of the plain loop loses comes back, and leaves by the purge where it is inert', async () => {
    const [returned, plain] = [await solved(name), await solved('ammonia-loop')];
    expect(returned.figures.overall_yield!.value).toBeGreaterThan(plain.figures.overall_yield!.value);
    expect(returned.streams['S8']!.components_kmol_h['CH4']).toBeGreaterThan(
      plain.streams['S8']!.components_kmol_h['CH4']!,
    );
    expect(returned.figures.inerts['converter']).toBeGreaterThan(plain.figures.inerts['converter']!);
  });

  test('the ledger shows the fate of every dissolved gas, exit by exit', async () => {
    const { ledger, streams } = await solved(name);
    for (const id of ['H2', 'N2', 'Ar', 'CH4']) {
      expect(Object.keys(ledger[id]!.out)).toEqual(['S8', 'S12']);
      // With the product leaves less than what dissolved at 192 bar; the rest came out at 20 bar and went back.
      const dissolved = streams['S7']!.components_kmol_h[id]!;
      const back = streams['S13']!.components_kmol_h[id]!;
      expect(ledger[id]!.out['S12']).toBeGreaterThan(0);
      expect(Math.abs(dissolved - back - ledger[id]!.out['S12']!)).toBeLessThan(1e-9 * dissolved);
      // More of the gas that dissolves well (methane) stays with the product than of hydrogen.
      if (id !== 'H2') {
        expect(ledger[id]!.out['S12']! / dissolved).toBeGreaterThan(
          ledger['H2']!.out['S12']! / streams['S7']!.components_kmol_h['H2']!,
        );
      }
    }
  });

  test('three levels take a third less power than all of the cold at the last one', async () => {
    const [three, two, one] = [
      await solved(name),
      await solved(name, { case: 'two levels' }),
      await solved(name, { case: 'one level' }),
    ];
    const power = (r: Result) => r.figures.power_kW['refrigeration']!;
    expect(power(three)).toBeLessThan(power(two));
    expect(power(two)).toBeLessThan(power(one));
    within(1 - power(three) / power(one), [0.25, 0.4], 'saved');
    // By hand: Q (308.15 − T)/T / 0.5 of each level.
    const { levels } = three.blocks['condenser']!.details as { levels: Record<string, number>[] };
    const byHand = levels.map(
      (l) => ((-l['duty_kW']! * (308.15 - l['evaporator_K']!)) / l['evaporator_K']!) * 2,
    );
    expect(Math.abs(byHand.reduce((sum, kW) => sum + kW, 0) - power(three))).toBeLessThan(
      1e-6 * power(three),
    );
  });
});

describe('ammonia with hydrogen recovery: three recycles', () => {
  const name = 'ammonia-purge-recovery';

  test('closes from its own start values in at most 30 passes with auto, cases too', async () => {
    for (const one of [undefined, 'no recovery', 'small purge']) {
      const flowsheet = await read(shippedText(`${name}.yaml`), one ? { case: one } : {});
      const { result } = balance(flowsheet, { method: 'auto' });
      expect(result.convergence.converged).toBe(true);
      expect(result.convergence.passes, one).toBeLessThanOrEqual(30);
    }
  });

  test('lies where such loops lie; inerts fall by half and the hydrogen lost to a quarter', async () => {
    const [recovered, plain] = [await solved(name), await solved(name, { case: 'no recovery' })];
    expectAmmoniaLoop(recovered, 'S5', 'S6');
    const lost = (r: Result) => r.figures.purge!.lost_fraction['H2']!;
    within(lost(recovered) / lost(plain), [0.2, 0.3], 'hydrogen lost');
    within(recovered.figures.inerts['converter']! / plain.figures.inerts['converter']!, [0.4, 0.6], 'inerts');
    expect(recovered.figures.production_t_d).toBeGreaterThan(plain.figures.production_t_d!);
    expect(recovered.figures.power_kW['makeup_compressor']).toBeGreaterThan(
      plain.figures.power_kW['makeup_compressor']!,
    );
    within(
      recovered.streams['S5']!.mole_fraction['H2']! / recovered.streams['S5']!.mole_fraction['N2']!,
      [2.7, 3.2],
      'H2:N2',
    );
  });

  // Lower heating values in kJ/mol at 25 degC, NASA TM-4513 (1993), from memory: H2 241.82, CH4 802.56, NH3 316.8.
  test('the purge is worth its heating value as fuel', async () => {
    const { figures, streams } = await solved(name);
    const { H2, CH4, NH3 } = streams['S21']!.components_kmol_h;
    const byHand = (H2! * 241.82 + CH4! * 802.56 + NH3! * 316.8) / 3600;
    expect(Math.abs(figures.purge!.lhv_MW / byHand - 1)).toBeLessThan(1e-3);
  });

  test('the expander delivers: its power counts negative in the total, and entropy does not fall', async () => {
    const { figures, blocks, streams, closure } = await solved(name);
    expect(figures.power_kW['expander']).toBeLessThan(-200);
    const { total, ...parts } = figures.power_kW;
    expect(Math.abs(Object.values(parts).reduce((sum, kW) => sum + kW, 0) - total!)).toBeLessThan(
      1e-9 * total!,
    );
    // 95 % of the shaft arrives at the terminals.
    const shaft = blocks['expander']!.details['shaft_power_kW'] as number;
    expect(Math.abs(figures.power_kW['expander']! - 0.95 * shaft)).toBeLessThan(1e-9 * -shaft);
    expect(Math.abs(streams['S21']!.enthalpy_kW - streams['S20']!.enthalpy_kW - shaft)).toBeLessThan(1e-6);
    expect(streams['S21']!.entropy_kW_K).toBeGreaterThan(streams['S20']!.entropy_kW_K);
    expect(Math.abs(closure.energy)).toBeLessThan(1e-9);
  });
});

describe('green ammonia', () => {
  const name = 'green-ammonia';

  // Low-pressure loops: 30 to 120 bar, patent family US 5 032 364; bands as above.
  test('lies where low-pressure loops lie', async () => {
    const result = await solved(name);
    expectAmmoniaLoop(result, 'S12', 'S13');
    within(result.streams['S13']!.pressure_bar, [30, 120], 'pressure');
    expect(result.figures.overall_conversion['H2']).toBeGreaterThan(0.98);
    expect(result.figures.inerts['converter']).toBeLessThan(0.02);
    // Condensing at low pressure costs more cold than the 60 to 150 kWh/t of a loop at 150 to 200 bar.
    within(perTonne(result.figures.power_kW['refrigeration']!, result), [120, 250], 'refrigeration, kWh/t');
  });

  test('a higher pressure takes more compression and less cold', async () => {
    const [low, high] = [await solved(name), await solved(name, { case: 'higher pressure' })];
    const share = (r: Result, machine: string) => perTonne(r.figures.power_kW[machine]!, r);
    expect(share(high, 'makeup_compressor')).toBeGreaterThan(share(low, 'makeup_compressor'));
    expect(share(high, 'refrigeration')).toBeLessThan(share(low, 'refrigeration'));
  });

  // Vapour pressure of water at 35 degC: 5.63 kPa (steam tables). Gas non-ideality and Poynting at 25 bar: 4 %.
  test('hydrogen leaves its aftercooler saturated with water, and most of the water fell out before', async () => {
    const { streams, ledger, warnings } = await solved(name);
    const gas = streams['S5']!;
    const saturated = 0.0563 / gas.pressure_bar;
    expect(Math.abs(gas.mole_fraction['H2O']! / saturated - 1)).toBeLessThan(0.05);
    expect(ledger['H2O']!.out['S4']! / ledger['H2O']!.in).toBeGreaterThan(0.9);
    expect(warnings).toEqual([]);
  });

  test('the argon that enters is the argon that leaves, forty times as concentrated in between', async () => {
    const { ledger, figures } = await solved(name);
    const { in: entering, out } = ledger['Ar']!;
    expect(Math.abs(Object.values(out).reduce((sum, n) => sum + n, 0) - entering)).toBeLessThan(
      1e-9 * entering,
    );
    within(figures.user['argon_build_up'], [20, 60], 'build-up');
  });
});
