import { describe, expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';
import { shippedText } from './shipped.ts';

const loops = ['ammonia-loop.yaml', 'methanol-loop.yaml'];

describe.each(loops)('%s with liquid: eos', (name) => {
  test.each(['srk', 'pr'])('closes in mass, atoms and energy to 1e-9 with %s', async (gas) => {
    const { result, diagnosis } = balance(
      await read(shippedText(name), { set: ['liquid=eos', `gas=${gas}`] }),
    );
    expect(diagnosis).toBeNull();
    const open = [
      result.closure.mass,
      result.closure.energy,
      ...Object.values(result.closure.atoms),
      ...Object.values(result.ledger).map((entry) => entry.closure),
    ];
    expect(Math.max(...open.map(Math.abs))).toBeLessThan(1e-9);
  });

  test('tells nearly the same story as vapour pressures do', async () => {
    const [antoine, eos] = await Promise.all(
      ['antoine', 'eos'].map(async (liquid) =>
        balance(await read(shippedText(name), { set: [`liquid=${liquid}`] })),
      ),
    );
    // ammonia over the condensate differs by a tenth, the dissolved gases by as much
    expect(eos.result.figures.recycle_ratio! / antoine.result.figures.recycle_ratio!).toBeGreaterThan(0.9);
    expect(eos.result.figures.recycle_ratio! / antoine.result.figures.recycle_ratio!).toBeLessThan(1.1);
  });
});

describe('what a result says of its condensate', () => {
  const said = async (name: string, set: readonly string[] = []) =>
    balance(await read(shippedText(name), { set })).result.assumptions.join('\n');

  test('names the pairs that have activity parameters, and the source', async () => {
    expect(await said('methanol-loop.yaml')).toMatch(
      /Activity coefficients in the condensate: CH3OH-H2O \(NRTL/,
    );
    expect(await said('ammonia-loop.yaml')).not.toMatch(/Activity coefficients/);
  });

  test('calls Raoult by name with an ideal gas', async () => {
    expect(await said('ammonia-loop.yaml', ['gas=ideal'])).toMatch(/Raoult's law, no Poynting factor/);
  });

  test('lists the binary parameters of liquid: eos, and the pairs that have none', async () => {
    const text = await said('ammonia-loop.yaml', ['liquid=eos']);
    expect(text).toMatch(/by the equation of state in both phases/);
    expect(text).toMatch(/H2-NH3 \(liquid\)/);
    expect(text).toMatch(/Pairs whose binary parameter is 0, for none is at hand: H2-N2/);
  });
});
