import { describe, expect, test } from 'vitest';
import { effectivenessOfDysonSimon } from '../../src/chemistry/rate-laws/dyson-simon-effectiveness.ts';
import { lnPhiOfDysonSimon } from '../../src/chemistry/rate-laws/dyson-simon-fugacity.ts';
import type { RateLaw } from '../../src/chemistry/rate-laws/rate-law.ts';
import { rateLaws } from '../../src/chemistry/rate-laws/rate-laws.ts';
import { parseReaction } from '../../src/chemistry/reaction-text.ts';
import { builtInComponent } from '../../src/properties/components.ts';
import {
  dysonSimonEffectiveness,
  dysonSimonFugacity,
  dysonSimonRates,
  eklundConstants,
  graafRates,
  methanolPoint,
  muraseRate,
  vandenBusscheFromentRates,
  xuFromentRates,
} from '../published/kinetics.ts';

const ATM = 101_325;
const KELVIN = 273.15;

/** Rates of a law as printed: its own constants and activities. */
function printedRates(law: RateLaw, T: number, activities: Readonly<Record<string, number>>): number[] {
  const a = Float64Array.from(law.species, (id) => activities[id]!);
  const forward = new Float64Array(law.reactions.length);
  const lnK = new Float64Array(law.reactions.length);
  law.forward(T, a, forward);
  law.lnK(T, lnK);
  return law.reactions.map(({ stoichiometry }, r) => {
    const lnQ = law.species.reduce((sum, id, s) => sum + (stoichiometry[id] ?? 0) * Math.log(a[s]!), 0);
    return -forward[r]! * Math.expm1(lnQ - lnK[r]!);
  });
}

function expectRelative(actual: number, wanted: number, allowed: number): void {
  expect(Math.abs(actual / wanted - 1), `${actual} against ${wanted}`).toBeLessThanOrEqual(allowed);
}

const law = (name: string) => rateLaws.get(name)!;

describe.each([...rateLaws.values()])('$name', (own) => {
  test('its reactions are balanced and made of its species', () => {
    const components = own.species.map((id) => builtInComponent(id)!);
    for (const { equation, stoichiometry } of own.reactions) {
      const parsed = parseReaction(equation, components);
      expect(parsed).toMatchObject({ ok: true });
      if (!parsed.ok) continue;
      expect([...parsed.coefficients]).toEqual(own.species.map((id) => stoichiometry[id] ?? 0));
    }
  });

  test('its constants of dependent reactions agree with one another', () => {
    // Reactions of three of which the third is the sum of the others: their ln K must be so too.
    if (own.reactions.length < 3) return expect(own.reactions.length).toBeGreaterThan(0);
    const lnK = new Float64Array(3);
    own.lnK(520, lnK);
    expect(lnK[2]).toBeCloseTo(lnK[0]! + lnK[1]!, 10);
  });

  test('its forward rates are above zero and grow with the pressure of what reacts', () => {
    const T = 0.5 * (own.range.fromK + own.range.toK);
    const rates = (scale: number) => {
      const out = new Float64Array(own.reactions.length);
      const a = Float64Array.from(own.species, () => (scale * own.range.fromPa) / own.pressureUnitPa / 5);
      own.forward(T, a, out);
      return out;
    };
    const [low, high] = [rates(1), rates(1.01)];
    low.forEach((rate, r) => {
      expect(rate).toBeGreaterThan(0);
      // Steam reforming is held back by hydrogen; there the rate falls with pressure.
      if (own.name !== 'xu-froment-1989') expect(high[r]).toBeGreaterThan(rate);
    });
  });
});

describe('ammonia after Dyson and Simon', () => {
  const own = law('dyson-simon-1968');
  const T = dysonSimonRates.celsius + KELVIN;
  const lnPhi = new Float64Array(3);
  lnPhiOfDysonSimon(T, dysonSimonRates.atm * ATM, lnPhi);
  const rateAt = (ammonia: number) => {
    const rest = 1 - ammonia;
    const y = { N2: rest / 4, H2: (3 * rest) / 4, NH3: ammonia };
    const a = Object.fromEntries(
      own.species.map((id, s) => [id, y[id as keyof typeof y] * Math.exp(lnPhi[s]!) * dysonSimonRates.atm]),
    );
    // mol N2/(m3 s) to kmol NH3/(m3 h)
    return printedRates(own, T, a)[0]! * 2 * 3.6;
  };

  // Four digits are printed: 1e-3 covers their rounding.
  test.each(dysonSimonRates.rows)('at %d of ammonia the rate is %d kmol/(m3 h)', (y, rate) => {
    expectRelative(rateAt(y), rate, 1e-3);
  });

  test('it vanishes at 29.71 % of ammonia', () => {
    expect(rateAt(dysonSimonRates.zeroAt - 1e-4)).toBeGreaterThan(0);
    expect(rateAt(dysonSimonRates.zeroAt + 1e-4)).toBeLessThan(0);
  });

  test.each(dysonSimonFugacity)(
    'at %d degC and %d atm the fugacity coefficients are %d, %d, %d',
    (...row) => {
      const [celsius, atm, H2, N2, NH3] = row;
      const out = new Float64Array(3);
      lnPhiOfDysonSimon(celsius + KELVIN, atm * ATM, out);
      // rounded to four decimals
      [N2, H2, NH3].forEach((phi, s) => {
        expect(Math.abs(Math.exp(out[s]!) - phi)).toBeLessThanOrEqual(6e-5);
      });
    },
  );

  test.each(dysonSimonEffectiveness)('at %d atm the effectiveness is %d', (atm, share) => {
    expect(effectivenessOfDysonSimon.at(700, atm * ATM, 0.1)).toBeCloseTo(share, 4);
  });

  test('between the pressures of the paper the effectiveness lies between, and it stays within 0 and 1', () => {
    const at = (atm: number) => effectivenessOfDysonSimon.at(700, atm * ATM, 0.1);
    expect(at(187.5)).toBeCloseTo(0.5 * (at(150) + at(225)), 12);
    expect(at(100)).toBe(at(150));
    // the printed cubic gives −0.107 here
    expect(effectivenessOfDysonSimon.at(800, 225 * ATM, 0)).toBe(0);
    for (let T = 500; T <= 1000; T += 10) {
      for (const X of [-0.1, 0, 0.1, 0.3, 0.9]) {
        for (const atm of [50, 180, 400]) {
          const share = effectivenessOfDysonSimon.at(T, atm * ATM, X);
          expect(share).toBeGreaterThanOrEqual(0);
          expect(share).toBeLessThanOrEqual(1);
        }
      }
    }
  });
});

test('ammonia after Murase: the rate and the constant at 750 K', () => {
  const own = law('murase-1970');
  const { kelvin, atm, rate, constant } = muraseRate;
  // printed to four and three digits
  expectRelative(printedRates(own, kelvin, atm)[0]! * 3.6, rate, 2e-4);
  const lnK = new Float64Array(1);
  own.lnK(kelvin, lnK);
  expectRelative(Math.exp(lnK[0]!), constant, 2e-3);
});

test.each(vandenBusscheFromentRates)('methanol after Vanden Bussche and Froment at %d K', (T, ...rates) => {
  // printed to five digits
  printedRates(law('vanden-bussche-froment-1996'), T, methanolPoint).forEach((rate, r) => {
    expectRelative(rate, rates[r]!, 1e-4);
  });
});

test.each(graafRates)('methanol after Graaf at %d K', (T, ...rates) => {
  // printed to four and five digits
  printedRates(law('graaf-1988'), T, methanolPoint).forEach((rate, r) => {
    expectRelative(rate, rates[r]!, 2e-4);
  });
});

test('reforming after Xu and Froment at 773 K', () => {
  const { kelvin, bar, rates } = xuFromentRates;
  // mol/(kg s) to kmol/(kg h); printed to four and five digits
  printedRates(law('xu-froment-1989'), kelvin, bar).forEach((rate, r) => {
    expectRelative(rate * 3.6, rates[r]!, 2e-4);
  });
});

test.each(eklundConstants)('sulphur dioxide after Eklund: k and Kp at %d K', (T, k, Kp) => {
  const own = law('eklund-1956');
  const lnK = new Float64Array(1);
  own.lnK(T, lnK);
  // the reaction is written for 2 SO2; printed to four digits
  expectRelative(Math.exp(lnK[0]! / 2), Kp, 1e-3);
  const out = new Float64Array(1);
  own.forward(T, Float64Array.from([0.1, 0.05, 0.1]), out);
  expectRelative((2 * out[0]!) / 0.05, k, 1e-3);
});

test('below 5 % of conversion the rate of sulphur dioxide is that of 5 %', () => {
  const rate = (conversion: number) => {
    const out = new Float64Array(1);
    law('eklund-1956').forward(720, Float64Array.from([0.1 * (1 - conversion), 0.1, 0.1 * conversion]), out);
    return out[0]!;
  };
  expect(rate(0)).toBeCloseTo(rate(0.05), 12);
  expect(rate(0.1)).toBeLessThan(rate(0.05));
});
