import { describe, expect, test } from 'vitest';
import { type BalanceOptions, balance } from '../../src/tally/balance.ts';
import { closePlant } from '../../src/tally/close-plant.ts';
import { createPlant } from '../../src/tally/plant.ts';
import { nothingCondenses } from '../../src/tally/why-dry.ts';
import { gatherFacts } from '../../src/tally/why-facts.ts';
import { flippingVessel, hotLoop, idleReactor, methaneLoop, synthesisLoop } from './failing-loops.ts';
import { read } from './read.ts';

const direct: BalanceOptions = { method: 'direct', maxPasses: 40 };
const bleed = 'raise purge.fractions.bleed';

/** Code, line, and the three sentences; what hangs on the way a method takes becomes #. */
async function failureOf(text: string, options: BalanceOptions = direct): Promise<string[]> {
  const { result, diagnosis } = balance(await read(text), options);
  expect(result.convergence.converged).toBe(false);
  const { code, where, what, why, mend } = diagnosis!;
  const tidy = (sentence: string) =>
    sentence
      .replace(/closes in \d+ passes/g, 'closes in # passes')
      .replace(/after \d+ direct/, 'after # direct')
      .replace(/max-passes \d+/, 'max-passes #')
      .replace(/\([^ )]+ is [^ )]+ off\)/, '(#)');
  return [`${code} ${where.line}`, tidy(what), tidy(why), tidy(mend)];
}

describe('a way out that is none', () => {
  const inert = [
    'exit-too-small 12',
    'The recycle through S7 did not close in 40 passes (#): Ar has no way out to speak of.',
    '2.99 kmol/h of Ar enter the loop in every pass, and only 4.13e-7 kmol/h leave (4.13e-7 kmol/h by S6, 0 kmol/h by S4): to leave as fast as it comes, 2.99e9 kmol/h of it would have to go round',
    `${bleed} from 1e-7 % to 0.1 %, by which the loop closes in # passes with --method auto, 7170 kmol/h going round with 41.7 % Ar (tried); or less Ar in the feed`,
  ];

  test('an inert before a purge of 1e-7 %', async () => {
    expect(await failureOf(synthesisLoop({ purge: '0.0000001 %' }))).toEqual(inert);
  });

  test('the same by a method whose guesses lead astray: told after direct passes', async () => {
    const found = await failureOf(synthesisLoop({ purge: '0.0000001 %' }), {
      method: 'wegstein',
      maxPasses: 40,
    });
    expect(found).toEqual([
      inert[0],
      inert[1],
      `after # direct passes from the feeds, ${inert[2]}`,
      inert[3],
    ]);
  });

  test('hydrogen fed in excess', async () => {
    expect(await failureOf(synthesisLoop({ purge: '0.0000001 %', parts: 'H2: 76, N2: 24' }))).toEqual([
      'exit-too-small 12',
      'The recycle through S7 did not close in 40 passes (#): H2 has no way out to speak of.',
      '760 kmol/h of H2 enter and 728 kmol/h are taken up in every pass, and only 2.08e-6 kmol/h leave (2.08e-6 kmol/h by S6, 0 kmol/h by S4): to leave as fast as it comes, 4.35e10 kmol/h of it would have to go round',
      `${bleed} from 1e-7 % to 0.3 %, by which the loop closes in # passes with --method auto, 13800 kmol/h going round with 96.77 % H2 (tried); or a feed closer to the stoichiometric ratio`,
    ]);
  });

  test('a component that is formed, and a separator that hardly recovers it', async () => {
    expect(await failureOf(methaneLoop('0.000001 %'))).toEqual([
      'exit-too-small 12',
      'The recycle through S7 did not close in 40 passes (#): CH4 has no way out to speak of.',
      '25 kmol/h of CH4 are formed in every pass, and only 2.2e-5 kmol/h leave (2.2e-5 kmol/h by S6, 0 kmol/h by S4): to leave as fast as it comes, 2.5e9 kmol/h of it would have to go round',
      'raise membrane.recover.product.CH4, now 1e-6 %, or a block that takes CH4 out of the recycle',
    ]);
  });
});

test('a purge too small: what goes round where it closes, and a purge by which less does', async () => {
  expect(await failureOf(synthesisLoop({ purge: '0.001 %' }))).toEqual([
    'small-purge 12',
    'The recycle through S7 did not close in 40 passes (#): the way out for Ar is too small for the passes allowed.',
    '2.99 kmol/h of Ar enter the loop in every pass, and 0.001 % of what goes round leaves in a pass (0.00413 kmol/h by S6, 0 kmol/h by S4); 0.001 % of a deviation goes out in a pass and the rest comes back (spectral radius 0.9999900): by direct substitution about 2070000 passes; closed, 534000 kmol/h go round with 56 % Ar in it',
    `${bleed} from 0.001 % to 0.1 %, by which the loop closes in # passes with --method auto, 7170 kmol/h going round with 41.7 % Ar (tried); or less Ar in the feed; as it is, the loop closes in # passes with --method auto (tried)`,
  ]);
});

describe('a condenser that stays dry', () => {
  const dry = { pressure: '50 bar', reactor: 'temperature: 500 degC', condenser: '45 degC' };

  test('while a small purge lets a little of the product out', async () => {
    expect(await failureOf(synthesisLoop({ ...dry, purge: '0.05 %' }))).toEqual([
      'nothing-condenses 11',
      'The recycle through S7 did not close in 40 passes (#): nothing condenses in condenser, so NH3 has no way out there.',
      'condenser stands at 45.0 degC and 50 bar, and the gas in it (5.5 % NH3) has its dew point at -16.1 degC, below that; NH3 leaves by other ways only (3.54 kmol/h by S6); 0.05 % of a deviation goes out in a pass and the rest comes back (spectral radius 0.999500): by direct substitution about 41400 passes',
      'set condenser.temperature to -67.0 degC, by which the loop closes in # passes with --method auto, 19900 kmol/h going round (tried); or raise the pressure of the loop; as it is, the loop closes in # passes with --method auto (tried)',
    ]);
  });

  test('and no purge to speak of', async () => {
    const trap = synthesisLoop({ ...dry, purge: '0.0000001 %', parts: 'H2: 75, N2: 25' });
    expect(await failureOf(trap)).toEqual([
      'nothing-condenses 11',
      'The recycle through S7 did not close in 40 passes (#): nothing condenses in condenser, so NH3 has no way out there.',
      'condenser stands at 45.0 degC and 50 bar, and the gas in it (5.53 % NH3) has its dew point at -15.9 degC, below that; NH3 leaves by other ways only (7.23e-6 kmol/h by S6); nor does anything condense in 24 further direct passes; all of a deviation comes back in every pass (spectral radius 1)',
      'set condenser.temperature to -31.0 degC, by which the loop closes in # passes with --method auto, 17500 kmol/h going round (tried); or raise the pressure of the loop',
    ]);
  });
});

test('where something condenses after all, with a recycle beyond all use, no more is claimed than that', async () => {
  const dry = { pressure: '50 bar', reactor: 'temperature: 500 degC', condenser: '-14.8 degC' };
  const trap = synthesisLoop({ ...dry, purge: '0.00001 %', parts: 'H2: 75, N2: 25' });
  const plant = createPlant(await read(trap));
  const options = { method: 'direct', maxPasses: 40, tolerance: 1e-9 } as const;
  const { failure, passes } = closePlant(plant, options);
  const facts = gatherFacts(plant, failure!.group, failure!.closure!, failure!.names, passes, options);
  expect(facts.answer).toBeNull();
  const beyond = { ...facts.beyond!, timesFed: 2e5 };
  const told = (names: readonly string[]) =>
    nothingCondenses({ ...facts, beyond: { ...beyond, dry: new Set(names) } })!;
  expect(told(['condenser']).what).toBe('nothing condenses in condenser, so NH3 has no way out there');
  expect(told(['condenser']).why).toContain(
    '200000 times the feed going round, and even then nothing condenses',
  );
  expect(told([]).what).toMatch(
    /^nothing condenses in condenser before the recycle has grown beyond all use,/,
  );
  expect(told([]).why).toContain('200000 times the feed going round, and only then something condenses');
});

test('a reactor gone out: what comes in goes round until the other exits take it', async () => {
  expect(await failureOf(idleReactor('0.01 %'))).toEqual([
    'reactor-gone-out 9',
    'The recycle through S6 did not close in 40 passes (#): next to nothing reacts in converter, so what comes into the loop goes round.',
    'it takes 0.01 % of the CO in a pass: 3330 kmol/h enter it at 300.0 degC and 20 bar',
    'a hotter inlet of converter, more catalyst, or a larger purge that keeps the recycle small',
  ]);
});

/** What is advised in `mend` as tried: the changes, and the way by which it closes. */
function claimsOf(mend: string) {
  return mend
    .split(/;| or /)
    .filter((part) => part.includes('(tried)'))
    .map((part) => ({
      passes: Number(part.match(/closes in (\d+) passes/)![1]),
      method: part.match(/--method (\w+)/)?.[1] as 'auto' | undefined,
      maxPasses: Number(part.match(/--max-passes (\d+)/)?.[1] ?? 0),
      set: [...part.matchAll(/(?:raise|set) (\S+)(?: from .*?)? to ([-\w.]+ (?:%|degC))/g)].map(
        ([, path, value]) => `${path}=${value}`,
      ),
    }));
}

test.each([
  ['an exit', synthesisLoop({ purge: '0.001 %' }), direct],
  ['a recovery', methaneLoop('0.000001 %'), direct],
  [
    'a dry condenser',
    synthesisLoop({
      pressure: '50 bar',
      reactor: 'temperature: 500 degC',
      condenser: '45 degC',
      purge: '0.05 %',
    }),
    direct,
  ],
  ['phases that flip', flippingVessel('1000 degC'), direct],
  ['too few passes', synthesisLoop(), { maxPasses: 3 }],
  ['an idle reactor', idleReactor('0.1 %'), direct],
] as const)('what was tried is found again: %s', async (_, text, options) => {
  const { diagnosis } = balance(await read(text), options);
  for (const { passes, method, maxPasses, set } of claimsOf(diagnosis!.mend)) {
    const { result } = balance(await read(text, { set }), {
      ...options,
      ...(method ? { method } : {}),
      ...(maxPasses > 0 ? { maxPasses } : {}),
    });
    expect(result.convergence).toMatchObject({ converged: true, passes });
  }
});

describe('a reactor at its bound', () => {
  test('running away: a heater of set duty, and no cooler', async () => {
    expect(await failureOf(hotLoop('2 MW'))).toEqual([
      'reactor-at-bound 10',
      'converter: the outlet would be hotter than 3500 K.',
      '218 kmol/h enter it at 2964.0 degC and 20 bar, and no outlet temperature between 20 and 3500 K closes its heat balance; heat is set in the loop by heater.duty 2 MW',
      'give the heat a way out: less duty, a temperature for converter, or a cooler set to a temperature in the recycle',
    ]);
  });

  test('chilled below 20 K', async () => {
    expect(await failureOf(synthesisLoop({ reactor: 'duty: -100 MW' }))).toEqual([
      'reactor-at-bound 10',
      'converter: the outlet would be colder than 20 K.',
      '1010 kmol/h enter it at 34.4 degC and 200 bar, and with its duty of -100 MW no outlet temperature between 20 and 3500 K closes its heat balance; heat is set in the loop by converter.duty -100 MW',
      'take out less heat: a duty closer to zero, a temperature for converter, or a heater set to a temperature before it',
    ]);
  });
});

test('a vessel that flips between one phase and two', async () => {
  expect(await failureOf(flippingVessel('1000 degC'))).toEqual([
    'phases-flip 8',
    'The recycle through S7 did not close in 40 passes (#): cooler changes between one phase and two from pass to pass.',
    'in 23 of 23 further passes it changed: gas only at 32.7 degC and 20 bar with a dew point of -4.3 degC, gas and liquid at -28.4 degC and 20 bar with a dew point of -12.9 degC; each makes the next pass the other',
    'move cooler.duty so that cooler stands well off the dew point; as it is, the loop closes in # passes with --method auto (tried)',
  ]);
});

describe('nothing wrong with the flowsheet', () => {
  test('passes that lead away from the answer', async () => {
    expect(await failureOf(flippingVessel('700 degC'))).toEqual([
      'passes-lead-away 18',
      'The recycle through S7 did not close in 40 passes (#): each pass leads away from the answer, and direct did not get round that.',
      'a deviation grows by a factor of 1.13 in every pass (spectral radius 1.13)',
      'as it is, the loop closes in # passes with --method auto (tried)',
    ]);
  });

  test('too few direct passes', async () => {
    expect(await failureOf(synthesisLoop({ purge: '0.5 %' }))).toEqual([
      'too-few-passes 20',
      'The recycle through S7 did not close in 40 passes (#): it was stopped after the 40 passes that were allowed.',
      '0.5 % of a deviation goes out in a pass and the rest comes back (spectral radius 0.99500): by direct substitution about 4140 passes',
      'as it is, the loop closes in # passes with --method auto (tried)',
    ]);
  });

  test('too few passes of the automatic method', async () => {
    expect(await failureOf(synthesisLoop(), { maxPasses: 4 })).toEqual([
      'too-few-passes 20',
      'The recycle through S7 did not close in 4 passes (#): it was stopped after the 4 passes that were allowed.',
      '2 % of a deviation goes out in a pass and the rest comes back (spectral radius 0.9800): by direct substitution about 1030 passes',
      'as it is, the loop closes in # passes with --max-passes # (tried)',
    ]);
  });
});

test('the settings that were tried for the advice are put back', async () => {
  const text = synthesisLoop({ purge: '0.0000001 %' });
  const flowsheet = await read(text);
  const once = balance(flowsheet, direct);
  const again = balance(flowsheet, direct);
  expect(again.diagnosis).toEqual(once.diagnosis);
  expect(again.result.streams['S6'].flow_kmol_h).toBe(once.result.streams['S6'].flow_kmol_h);
});

test('an inventory that nothing decides: fed in the ratio in which it reacts, and no way out but the reaction', async () => {
  const found = await failureOf(methaneLoop('3 %'), { method: 'auto' });
  expect(found[1].replace(/in \d+ passes/, 'in # passes')).toBe(
    'The recycle through S7 did not close in # passes (#): nothing decides how much H2 goes round.',
  );
  expect(found[2].replace(/S7.H2 and/, '# and')).toBe(
    'the streams agree with one another at this # and at any other (the linearised recycle is singular): as much H2 is used up or leaves as comes in, however much goes round',
  );
  expect(found[0]).toMatch(/^undetermined /);
  expect(found[3]).toBe(
    'give H2 a way out that grows with what goes round (a purge, a leak, a solubility), or set what is left open',
  );
});
