import { nearest } from '../diagnostics/nearest.ts';
import type { Component } from '../model/component.ts';
import type { Formula, LedgerSpec, PricedItem, Prices, StreamSpec } from '../model/flowsheet.ts';
import { compileFormula } from '../units/formula.ts';
import type { Reading } from './findings.ts';
import { formulaRoots } from './formula-scope.ts';
import { parsePrice } from './price-text.ts';
import { priceables } from './priced-amounts.ts';
import { optionalEntries } from './section.ts';

/** The prices of a file and what they make of it. */
export interface ReadPrices {
  readonly prices: Prices;
  /** formula of money per hour: all that is bought, less the fuel value of the purge */
  readonly cost: string;
  /** what the product brings, less the cost; null where the product has no price */
  readonly profit: string | null;
}

/** The prices; null where there are none or some are at fault. */
export function readPrices(
  reading: Reading,
  components: readonly Component[],
  streams: readonly StreamSpec[],
  feeds: readonly string[] | null,
  blocks: readonly { readonly name: string; readonly settings: Readonly<Record<string, unknown>> | null }[],
  ledger: LedgerSpec | null,
): ReadPrices | null {
  const entries = optionalEntries(reading, 'prices', 'prices: {power: 60 EUR/MWh, product: 350 EUR/t}');
  if (entries.length === 0 || ledger === null || feeds === null) return null;
  const named = new Set(entries.map(({ key }) => key));
  const known = priceables({ components, streams, feeds, blocks, ledger }, named);
  const items: PricedItem[] = [];
  let currency: string | null = null;
  let sound = true;
  for (const { key, keyPlace, value } of entries) {
    const fault = (code: string, what: string, why: string, mend: string, where = keyPlace): void => {
      reading.findings.error(where, { code, what, why, mend });
      sound = false;
    };
    const priced = known.get(key);
    if (priced === undefined) {
      const near = nearest(key, known.keys());
      const names = [...known.keys()].join(', ');
      const why = near === null ? `priced are ${names}` : `the nearest name is ${near}`;
      fault(
        'bad-price',
        `nothing called ${key} has a price.`,
        why,
        near === null ? `take ${key} out` : `write ${near}`,
      );
      continue;
    }
    if (priced.missing !== null) {
      fault('bad-price', `there is no ${key} to be priced.`, priced.missing, `take ${key} out of prices`);
      continue;
    }
    const text = value.kind === 'scalar' ? value.text : '';
    const fitting = Object.keys(priced.amounts) as (keyof typeof priced.amounts)[];
    const price = parsePrice(text, fitting);
    const place = value.kind === 'scalar' && text !== '' ? value.place : keyPlace;
    if ('fault' in price) {
      const { code, what, why, mend } = price.fault;
      fault(code, `${key}: ${what}`, why, mend, place);
      continue;
    }
    currency ??= price.currency;
    if (price.currency !== currency) {
      const why = `the prices above are in ${currency}, and currencies are not converted`;
      fault(
        'bad-price',
        `${key} is priced in ${price.currency}.`,
        why,
        `give its price in ${currency}`,
        place,
      );
      continue;
    }
    const factor = price.value * price.unitsPerFormulaUnit;
    items.push({
      name: key,
      price: text.trim(),
      income: priced.income,
      perHour: formulaOf(`(${factor}) * (${priced.amounts[price.basis]})`),
    });
  }
  if (!sound || currency === null) return null;
  const total = (income: boolean, sign: string, skip = '') =>
    items
      .filter((item) => item.income === income && item.name !== skip)
      .map(({ perHour }) => `${sign} ${perHour.text}`)
      .join(' ');
  const cost = `0 ${total(false, '+')} ${total(true, '-', 'product')}`;
  const sale = items.find(({ name }) => name === 'product');
  return {
    prices: { currency, items },
    cost,
    profit: sale === undefined ? null : `${sale.perHour.text} - (${cost})`,
  };
}

/** A formula that we have written ourselves. */
function formulaOf(text: string): Formula {
  const compiled = compileFormula(text, formulaRoots);
  if (!compiled.ok) throw new Error(`${text}: ${compiled.what}`);
  return { text, evaluate: compiled.evaluate };
}
