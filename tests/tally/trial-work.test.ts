import { afterEach, describe, expect, test, vi } from 'vitest';
import { rateLaws } from '../../src/chemistry/rate-laws/rate-laws.ts';
import { balance } from '../../src/tally/balance.ts';
import { closePlant } from '../../src/tally/close-plant.ts';
import { createPlant } from '../../src/tally/plant.ts';
import { closedAsItIs } from '../../src/tally/why-as-is.ts';
import { gatherFacts } from '../../src/tally/why-facts.ts';
import { trendOnly } from '../../src/tally/why-passes.ts';
import { createPatience, isOutOfWork, tryOut } from '../../src/tally/why-trial.ts';
import { synthesisLoop } from './failing-loops.ts';
import { read } from './read.ts';
import { shippedText } from './shipped.ts';

const text = shippedText('ammonia-kinetic-bed.yaml');
/** Stiff from end to end, and inerts have next to no way out. */
const stiff = text
  .replace('volume: 45 m3', 'volume: 45000 m3')
  .replace(
    'adiabatic: true\n    pressure',
    'cooling: {temperature: 300 degC, heat_transfer: 50 kW/(m3 K)}\n    pressure',
  )
  .replace('bleed: 2.2 %', 'bleed: 0 %');

afterEach(() => {
  vi.restoreAllMocks();
});

/** Counts how often the rate law is evaluated. */
function rateCounter(): () => number {
  const spy = vi.spyOn(rateLaws.get('dyson-simon-1968')!, 'forward');
  return () => spy.mock.calls.length;
}

test('a stiff bed in a loop that does not close: the reason takes a bounded number of rates, and is told in full', async () => {
  const flowsheet = await read(stiff);
  const rates = rateCounter();
  const { diagnosis } = balance(flowsheet, { maxPasses: 20 });
  // Without a bound the trials as it is alone take a million.
  expect(rates()).toBeLessThan(500_000);
  expect(diagnosis?.code).toBe('small-purge');
  expect(diagnosis?.mend).toMatch(/^raise purge\.fractions\.bleed from 0 % to .*\(tried\)/);
});

describe('a trial around a kinetic bed', () => {
  test('takes its evaluations off, and ends within a pass or so of what it was given', async () => {
    const plant = createPlant(await read(text));
    const group = plant.groups.find(({ tears }) => tears.length > 0)!;
    const rates = rateCounter();
    const patience = createPatience();
    const before = patience.evaluations;
    expect(tryOut(plant, group, 1e-9, [], 'auto', patience)).not.toBeNull();
    const whole = rates();
    expect(before - patience.evaluations).toBe(whole);
    const short = { ...createPatience(), evaluations: 1000 };
    expect(tryOut(plant, group, 1e-9, [], 'auto', short)).toBeNull();
    expect(isOutOfWork(short)).toBe(true);
    expect(rates() - whole).toBe(1000 - short.evaluations);
    expect(rates() - whole).toBeLessThan(whole / 2);
    expect(tryOut(plant, group, 1e-9, [], 'auto', short)).toBeNull();
    expect(short.passes).toBeGreaterThan(0);
  });
});

describe('trials as it is', () => {
  const options = { method: 'auto', tolerance: 1e-9, maxPasses: 60 } as const;

  test('do not make the passes of a closing again that has shown where they end', async () => {
    const plant = createPlant(await read(synthesisLoop({ purge: '0.001 %' })));
    const { failure } = closePlant(plant, { ...options, maxPasses: 5 });
    const { group, closure } = failure!;
    expect(closedAsItIs(plant, group, closure!, 0, options).closed?.method).toBe('auto');
    const stalled = { ...closure!, reason: 'stalled' } as const;
    expect(closedAsItIs(plant, group, stalled, 0, options).closed?.method).not.toBe('auto');
    // A closing that took more than trials may has shown that this one would be ended.
    expect(closedAsItIs(plant, group, closure!, 1e6, options).closed?.method).not.toBe('auto');
  });

  test('that were ended for want of evaluations are not said to have failed', async () => {
    const plant = createPlant(await read(synthesisLoop({ purge: '0.001 %' })));
    const { failure, passes } = closePlant(plant, { ...options, maxPasses: 5 });
    const { group, closure, names } = failure!;
    const facts = gatherFacts(plant, group, closure!, names, passes, options);
    const told = (failing: readonly ('auto' | 'newton' | 'anderson')[]) =>
      trendOnly({ ...facts, beyond: null, failing }).why;
    expect(told([])).not.toMatch(/trial/);
    expect(told(['anderson'])).toMatch(/; a trial by --method anderson did not close either$/);
    expect(told(['newton', 'anderson'])).toMatch(/; trials by --method newton and anderson did not close/);
  });
});
