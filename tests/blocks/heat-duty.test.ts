import { expect, test } from 'vitest';
import { PassTrouble } from '../../src/diagnostics/diagnostic.ts';
import { mixtureOf, streamOf, trial, troubleOf } from './helpers.ts';

const mixture = mixtureOf(['H2', 'N2', 'NH3']);
const inlet = streamOf(mixture, { celsius: 30, bar: 150, flows: { H2: 3, N2: 1, NH3: 1 } });
const kinds = [
  ['heater', {}],
  ['condenser', {}],
  ['flash', { pressure: '150 bar' }],
] as const;

test.each(kinds)('a %s is not given more cooling than the stream holds', (kind, raw) => {
  try {
    trial(kind, { ...raw, duty: '-2 MW' }, mixture, [inlet]);
    expect.unreachable();
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble)) throw trouble;
    expect([trouble.code, trouble.setting]).toEqual(['duty-too-large', 'duty']);
    expect(trouble.message).toBe(
      'The duty of -2.000 MW is more heat than this stream of 18.00 kmol/h holds.',
    );
    expect(trouble.why).toBe('with all of it condensed and cooled to 20 K it would not have given so much');
    expect(trouble.mend).toBe('set duty closer to zero, or set temperature instead of duty');
  }
});

test('nor more heating than it takes up below 3500 K', () => {
  expect(troubleOf(() => trial('heater', { duty: '5 MW' }, mixture, [inlet]))).toBe('duty-too-large');
});

test('a duty within reach is met', () => {
  const { report } = trial('heater', { duty: '-50 kW' }, mixture, [inlet]);
  expect(Math.abs(report.dutyW + 50e3)).toBeLessThan(1e-6);
});
