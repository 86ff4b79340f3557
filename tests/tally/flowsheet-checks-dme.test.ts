import { describe, expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';
import { shippedText } from './shipped.ts';

describe('direct dimethyl ether', () => {
  const solved = async (set: string[] = []) =>
    balance(await read(shippedText('dme-direct.yaml'), { set })).result;
  const within = (value: number | undefined, low: number, high: number, what: string) => {
    expect(value, what).toBeGreaterThanOrEqual(low);
    expect(value, what).toBeLessThanOrEqual(high);
  };

  // Slurry pilot of 5 t/d at 260 degC, 5 MPa, H2/CO = 1: 50 to 60 % of the CO per pass, more than 90 % of the products
  // ether: T. Ogawa, N. Inoue, T. Shikada & Y. Ohno, J. Nat. Gas Chem. 12 (2003) 219-227, from memory. Equilibrium with
  // an approach is an upper bound on what a slurry reactor reaches.
  test('converts more than half of the carbon monoxide per pass, nearly all to ether', async () => {
    const { figures } = await solved();
    within(figures.per_pass_conversion['converter']!['CO'], 0.5, 0.7, 'CO per pass');
    within(figures.user['ether_among_products']!, 0.9, 1, 'ether among the products');
  });

  // 3 CO + 3 H2 = (CH3)2O + CO2: two thirds of the carbon, one carbon dioxide for each ether, H2 and CO alike.
  test('keeps the stoichiometry of the three reactions together', async () => {
    const { figures, ledger } = await solved();
    within(figures.user['carbon_dioxide_per_ether']!, 0.95, 1, 'CO2 per ether');
    within(figures.user['carbon_in_ether']!, 0.6, 2 / 3, 'carbon in ether');
    const { H2, CO, CO2, CH3OH, DME, H2O } = ledger;
    within(H2!.consumed / CO!.consumed, 1, 1.05, 'H2 to CO');
    const formed = 2 * DME!.formed + CH3OH!.formed + CO2!.formed - CO!.consumed;
    expect(Math.abs(formed)).toBeLessThan(1e-9 * CO!.consumed);
    expect(Math.abs(DME!.formed - H2O!.formed - CO2!.formed)).toBeLessThan(1e-9 * DME!.formed);
  });

  test('carbon dioxide leaves with the ether, by the gas of its column', async () => {
    const { ledger } = await solved();
    const { out, in: entering, formed } = ledger['CO2']!;
    expect(out['S13']! / (entering + formed)).toBeGreaterThan(0.9);
  });

  // Saturated CO2 at -25 degC: 16.8 bar; SRK fugacity coefficients of CO2 in this gas at 48 bar are 0.75 to 0.85.
  test('it shares itself in the chiller as Raoult would have it', async () => {
    const { streams } = await solved();
    const [gas, liquid] = [streams['S7']!, streams['S12']!];
    const ratio = (gas.mole_fraction['CO2']! * 48) / (liquid.mole_fraction['CO2']! * 16.8);
    within(ratio, 1.15, 1.45, 'gas over liquid');
  });

  test('a colder chiller loses less ether with the gas', async () => {
    const cold = balance(await read(shippedText('dme-direct.yaml'), { case: 'colder chiller' })).result;
    expect(cold.streams['S7']!.mole_fraction['DME']).toBeLessThan(
      (await solved()).streams['S7']!.mole_fraction['DME']!,
    );
  });
});
