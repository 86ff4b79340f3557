import { expect, test } from 'vitest';
import { InputError } from '../../src/diagnostics/diagnostic.ts';
import { balance } from '../../src/tally/balance.ts';
import { planFlowsheet } from '../../src/tally/plan.ts';
import { read } from './read.ts';

const loop = (change: { dissolved?: boolean; bleed?: string; makeup?: string } = {}) => `
looptally: 1
title: closed loop
components: [H2, N2, NH3, Ar]
dissolved_gases: ${change.dissolved ?? false}
reactions: {synthesis: N2 + 3 H2 <=> 2 NH3}
feeds:
  makeup: {flow: 1000 kmol/h, temperature: 35 degC, pressure: 200 bar, composition: {${change.makeup ?? 'H2: 75, N2: 25, Ar: 0.3'}}}
blocks:
  mixer: {kind: mixer}
  converter: {kind: reactor, reactions: {synthesis: {}}, temperature: 450 degC}
  condenser: {kind: condenser, temperature: 0 degC}
  purge: {kind: splitter, fractions: {bleed: ${change.bleed ?? '0 %'}}}
streams:
  S1: makeup -> mixer
  S2: mixer -> converter
  S3: converter -> condenser
  S4: condenser.liquid -> out
  S5: condenser.gas -> purge
  S6: purge.bleed -> out
  S7: purge.rest -> mixer
`;

test('a loop without purge and without dissolved gases is refused, naming the component, the loop and the remedy', async () => {
  const flowsheet = await read(loop());
  let error: unknown;
  try {
    balance(flowsheet);
  } catch (thrown) {
    error = thrown;
  }
  expect(error).toBeInstanceOf(InputError);
  const found = (error as InputError).diagnostics;
  expect(found.map((d) => d.code)).toEqual(['no-way-out']);
  expect(found[0].what).toBe(
    'Ar can enter the loop of mixer, converter, condenser, purge and has no way out of it.',
  );
  expect(found[0].mend).toBe(
    'put a splitter with a purge into the recycle, or set dissolved_gases: true if it dissolves in the condensate',
  );
  expect(found[0].where.line).toBe(21);
  expect(planFlowsheet(flowsheet).diagnostics.map((d) => d.code)).toEqual(['no-way-out']);
});

test.each([
  ['a purge', { bleed: '1 %' }],
  ['dissolved gas in the condensate', { dissolved: true }],
  ['a makeup without it', { makeup: 'H2: 75, N2: 25' }],
])('%s is enough of a way out', async (_, change) => {
  expect(planFlowsheet(await read(loop(change))).diagnostics).toEqual([]);
});

test('a recycle that runs away is told as such, with what piles up in it', async () => {
  const { result, diagnosis } = balance(
    await read(loop({ dissolved: true, makeup: 'H2: 75, N2: 25, Ar: 3' })),
  );
  expect(result.convergence.converged).toBe(false);
  expect(diagnosis?.code).toBe('exit-too-small');
  expect(diagnosis?.why).toMatch(/times the feed, and is [\d.]+ % Ar: 29.1 kmol\/h of Ar enter the loop/);
  expect(diagnosis?.mend).toMatch(
    /^raise purge.fractions.bleed from 0 % to .*\(tried\); or less Ar in the feed$/,
  );
});

test('a trace of inert finds its way out with the dissolved gas alone', async () => {
  const { result } = balance(await read(loop({ dissolved: true })));
  expect(result.convergence.converged).toBe(true);
  expect(Math.abs(result.ledger['Ar'].closure)).toBeLessThan(1e-9);
});
