import type { Component } from '../model/component.ts';
import type { BlockSpec, LedgerSpec, StreamSpec } from '../model/flowsheet.ts';
import type { Basis } from './price-text.ts';

/** What there is in a flowsheet to be priced. */
export interface PriceWorld {
  readonly components: readonly Component[];
  readonly streams: readonly StreamSpec[];
  readonly feeds: readonly string[];
  readonly blocks: readonly { readonly name: string; readonly settings: BlockSpec['settings'] | null }[];
  readonly ledger: LedgerSpec;
}

/** Something that is bought or sold: how it may be counted, and the formula of its amount per hour in each way. */
export interface Priceable {
  readonly income: boolean;
  readonly amounts: Readonly<Partial<Record<Basis, string>>>;
  /** why this flowsheet has none of it; null where it has */
  readonly missing: string | null;
}

/** Everything that can be priced, by name. `named` are the feeds that have a price of their own. */
export function priceables(world: PriceWorld, named: ReadonlySet<string>): Map<string, Priceable> {
  const { feeds, ledger } = world;
  const own = feeds.includes('makeup') ? [] : feeds.filter((feed) => !named.has(feed));
  const makeup: [string, Priceable][] = feeds.includes('makeup')
    ? []
    : [['makeup', fed(world, own, 'every feed has a price of its own')]];
  const cooled = world.blocks.filter(({ settings }) => isSplitCooling(settings?.['cooling']));
  const noCooling = 'no condenser has cooling, so nothing tells cooling water from refrigeration';
  return new Map([
    ...makeup,
    ...feeds.map((feed): [string, Priceable] => [feed, fed(world, [feed], null)]),
    [
      'power',
      // Refrigeration that is bought as cold does not take power of one's own.
      bought(
        named.has('refrigeration')
          ? 'figures.power_kW.total - figures.power_kW.refrigeration'
          : 'figures.power_kW.total',
        null,
      ),
    ],
    [
      'refrigeration',
      bought(
        sum(cooled.map(({ name }) => `-blocks.${name}.refrigeration_duty_kW`)),
        cooled.length > 0 ? null : noCooling,
      ),
    ],
    [
      'cooling_water',
      bought(
        sum(cooled.map(({ name }) => `-blocks.${name}.water_duty_kW`)),
        cooled.length > 0 ? null : noCooling,
      ),
    ],
    ['product', sold(world)],
    [
      'purge',
      {
        income: true,
        amounts: { energy: '1000 * figures.purge.lhv_MW' },
        missing: ledger.purge.length > 0 ? null : 'the ledger names no purge',
      },
    ],
  ]);
}

/** A condenser's cooling, shared between water and refrigeration. */
function isSplitCooling(cooling: unknown): boolean {
  return typeof cooling === 'object' && cooling !== null && 'water' in cooling;
}

function bought(kW: string, missing: string | null): Priceable {
  return { income: false, amounts: { energy: kW }, missing };
}

/** Whole streams, counted by mass (kg/h), moles (kmol/h) or lower heating value (kW). */
function fed({ streams, components }: PriceWorld, feeds: readonly string[], none: string | null): Priceable {
  const tags = streams.filter(({ from }) => feeds.includes(from.name)).map(({ tag }) => tag);
  const molar = sum(tags.map((tag) => `streams.${tag}.flow`));
  return {
    income: false,
    amounts: {
      mass: sum(tags.map((tag) => `streams.${tag}.mass`)),
      molar,
      normalVolume: molar,
      energy: sum(
        tags.flatMap((tag) =>
          components
            .filter(({ lowerHeatingJPerMol }) => lowerHeatingJPerMol > 0)
            .map((component) => heating(`streams.${tag}.n.${component.id}`, component)),
        ),
      ),
    },
    missing: tags.length > 0 ? null : none,
  };
}

/** The product of the ledger: that component in that stream. */
function sold({ ledger: { product }, components }: PriceWorld): Priceable {
  if (product === null) return { income: true, amounts: {}, missing: 'the ledger names no product' };
  const { stream, component: id } = product;
  const molar = `streams.${stream}.n.${id}`;
  return {
    income: true,
    amounts: {
      mass: `streams.${stream}.m.${id}`,
      molar,
      normalVolume: molar,
      energy: heating(molar, components.find((component) => component.id === id)!),
    },
    missing: null,
  };
}

/** kmol/h times J/mol are kJ/h. */
function heating(kmolPerH: string, { lowerHeatingJPerMol }: Component): string {
  return `${lowerHeatingJPerMol / 3600} * ${kmolPerH}`;
}

function sum(terms: readonly string[]): string {
  return terms.length === 0 ? '0' : terms.join(' + ');
}
