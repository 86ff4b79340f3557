import { type NumericSetting, numericSettings } from '../flowsheet/numeric-settings.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import type { ConstantSource } from '../model/reaction.ts';

/** What stands at one path of a flowsheet: a number with its dimension, or a text. */
export type SettingValue =
  | { readonly kind: 'number'; readonly setting: NumericSetting }
  | { readonly kind: 'text'; readonly text: string };

/**
 * What decides a result, by path and in the order of the file: models, feeds, blocks with every setting, streams, ledger
 * and aims. Of components of the user's own only the names are listed.
 */
export function settingList(flowsheet: Flowsheet): Map<string, SettingValue> {
  const list = new Map<string, SettingValue>();
  const text = (path: string, value: unknown) => list.set(path, { kind: 'text', text: String(value) });
  text('components', flowsheet.components.map((c) => c.id).join(', '));
  text('gas', flowsheet.gas);
  text('liquid', flowsheet.liquid);
  text('dissolved_gases', flowsheet.dissolvedGases);
  for (const { name, equation, constant } of flowsheet.reactions) {
    text(`reactions.${name}`, `${equation}, ${constantText(constant)}`);
  }
  for (const feed of flowsheet.feeds) text(`${feed.name}.basis`, feed.basis);
  for (const block of flowsheet.blocks) text(`${block.name}.kind`, block.kind);
  for (const setting of numericSettings(flowsheet)) list.set(setting.path, { kind: 'number', setting });
  for (const block of flowsheet.blocks) {
    for (const [path, value] of leaves(block.name, block.settings)) if (!list.has(path)) text(path, value);
  }
  for (const { tag, from, to } of flowsheet.streams) {
    text(`streams.${tag}`, `${endText(from)} -> ${to === null ? 'out' : endText(to)}`);
  }
  const { product, reactant, purge, recycle } = flowsheet.ledger;
  text('ledger.product', product === null ? 'none' : `${product.component} in ${product.stream}`);
  text('ledger.reactant', reactant ?? 'none');
  text('ledger.purge', purge.join(', ') || 'none');
  text('ledger.recycle', recycle ?? 'none');
  for (const { name, move, between, until, wanted, unit } of flowsheet.aims) {
    const bounds = `between ${between.join(' and ')} ${unit}`.trimEnd();
    text(`aims.${name}`, `${move} ${bounds} until ${until.text} = ${wanted}`);
  }
  return list;
}

function constantText(constant: ConstantSource): string {
  if (constant.kind === 'gibbs') return 'Gibbs energies';
  return constant.kind === 'published' ? constant.name : `lnK ${constant.text}`;
}

function endText({ name, port }: { readonly name: string; readonly port: string | null }): string {
  return port === null ? name : `${name}.${port}`;
}

function leaves(path: string, value: unknown): [string, unknown][] {
  if (typeof value !== 'object' || value === null) return value === undefined ? [] : [[path, value]];
  if ('per' in value && 'value' in value) return [[path, `${value.value} ${value.per}`]];
  return Object.entries(value).flatMap(([key, part]) => leaves(`${path}.${key}`, part));
}
