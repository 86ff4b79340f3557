import { nearest } from '../diagnostics/nearest.ts';
import { NORMAL_VOLUME_M3_PER_MOL } from '../properties/constants.ts';
import { unitFactor } from '../units/unit-table.ts';
import type { Fault } from './findings.ts';

/** How an amount is counted when it is priced. */
export type Basis = 'mass' | 'molar' | 'normalVolume' | 'energy';

export interface Price {
  readonly currency: string;
  /** money per unit */
  readonly value: number;
  readonly basis: Basis;
  /** priced units in one unit of the formulas: kg, kmol (molar and normal volume) or kWh */
  readonly unitsPerFormulaUnit: number;
}

const bases: readonly Basis[] = ['mass', 'molar', 'normalVolume', 'energy'];

const offered: Readonly<Record<Basis, readonly string[]>> = {
  mass: ['t', 'kg', 'lb'],
  molar: ['kmol', 'lbmol'],
  normalVolume: ['Nm3', 'kNm3', 'MMscf'],
  energy: ['kWh', 'MWh', 'GJ', 'MMBtu'],
};

const nouns: Readonly<Record<Basis, string>> = {
  mass: 'mass',
  molar: 'amount in moles',
  normalVolume: 'normal volume',
  energy: 'energy',
};

/** Read a price such as `60 EUR/MWh` of something that is counted in one of these ways. */
export function parsePrice(text: string, fitting: readonly Basis[]): Price | { readonly fault: Fault } {
  const match =
    /^\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)\s*([^\s\d/.,;:+-][^\s\d/.,;:]{0,11})\s*\/\s*(\S+)\s*$/.exec(
      text,
    );
  const example = `${fitting.includes('energy') ? '60 EUR/MWh' : '350 EUR/t'}`;
  if (match === null || !Number.isFinite(Number(match[1]))) {
    return {
      fault: {
        code: 'bad-price',
        what: `"${text.trim()}" is no price.`,
        why: 'a price is a number, a currency and what it is paid for, with a / between',
        mend: `write it as in ${example}`,
      },
    };
  }
  const [, number, currency, unit] = match as unknown as [string, string, string, string];
  for (const basis of fitting) {
    const units = unitsIn(unit, basis);
    if (units !== null) return { currency, value: Number(number), basis, unitsPerFormulaUnit: units };
  }
  const fits = fitting.flatMap((basis) => offered[basis]);
  const other = bases.find((basis) => unitsIn(unit, basis) !== null);
  const near = nearest(unit, fits);
  return {
    fault: {
      code: other === undefined ? 'unknown-unit' : 'wrong-unit',
      what: `the price ${text.trim()} does not fit.`,
      why:
        other === undefined
          ? `no unit "${unit}" is known for a price here`
          : `${unit} counts ${nouns[other]}, and ${fitting.map((b) => nouns[b]).join(' or ')} is priced here`,
      mend: near === null ? `price it per ${fits.join(', ')}` : `write ${number} ${currency}/${near}`,
    },
  };
}

/** Priced units in one kg, kmol or kWh; null where the unit is of another kind. */
function unitsIn(unit: string, basis: Basis): number | null {
  const perHour = `${unit}/h`;
  if (basis === 'mass') return inverse(unitFactor(perHour, 'massFlow')?.factor, 1 / 3600);
  if (basis === 'molar') return inverse(unitFactor(perHour, 'molarFlow')?.factor, 1 / 3.6);
  if (basis === 'normalVolume') {
    return inverse(unitFactor(perHour, 'normalVolumeFlow')?.factor, NORMAL_VOLUME_M3_PER_MOL / 3.6);
  }
  const asPower = unit.endsWith('Wh') ? unit.slice(0, -1) : perHour;
  return inverse(unitFactor(asPower, 'power')?.factor, 1e3);
}

function inverse(factor: number | undefined, one: number): number | null {
  return factor === undefined ? null : one / factor;
}
