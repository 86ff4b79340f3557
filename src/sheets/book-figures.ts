import { blockKinds } from '../blocks/registry.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import type { Reaction } from '../model/reaction.ts';
import type { Figures, Result } from '../model/result.ts';
import { yieldReaction } from '../tally/figures.ts';
import type { Closed, ClosureCells } from './book-closure.ts';
import { figureDisplay } from './figure-display.ts';
import { isWithoutPower } from './no-power.ts';
import { plainText } from './plain.ts';
import { feedStreams } from './story.ts';
import { heads, looks, number, ownFormat, text, unitHeads } from './xlsx-looks.ts';
import { type Cell, type Page, put, type Style } from './xlsx-model.ts';
import type { Names } from './xlsx-names.ts';
import {
  agreed,
  cellTerm,
  constant,
  minus,
  over,
  plus,
  product,
  type Range,
  type Term,
  times,
  total,
} from './xlsx-term.ts';

export interface FigureContext extends Closed {
  readonly page: Page;
  readonly result: Result;
  readonly flowsheet: Flowsheet;
  readonly closures: ClosureCells;
  readonly names: Names;
  readonly figureUnits: Readonly<Record<string, string>>;
}

/** A figure that follows from other cells, with the number of the result that it must give. */
interface Live {
  readonly term: Term;
  readonly expected: number;
}

/** The key figures, live wherever they follow from streams, ledger and blocks; the main ones have names. */
export function fillFigures(context: FigureContext): void {
  const { page, result, closures, figureUnits } = context;
  put(page, [...heads(['figure', 'of'], 2), ...heads(['value'], 0), ...unitHeads(['unit', 'worked out'])]);
  const feed = write(context, 'fresh feed', '', 'kmol/h', freshFeed(context), 'fresh_feed');
  recycleAndConversions(context, feed!);
  const production = yieldAndProduction(context);
  inerts(context);
  purge(context, feed!);
  powers(context, production);
  for (const [name, value] of Object.entries(result.figures.user)) {
    const { unit } = figureDisplay(`user.${name}`, figureUnits);
    const percent = unit === '%';
    write(
      context,
      'own figure',
      name,
      percent ? 'fraction' : unit,
      value,
      null,
      percent ? looks.share : null,
    );
  }
  const { mass, atoms, energy } = result.closure;
  const closure = (of: string, expected: number) =>
    write(context, 'closure', of, 'relative', { term: closures.get(of)!, expected }, null, looks.closure);
  closure('mass', mass);
  for (const [element, value] of Object.entries(atoms)) closure(`atoms ${element}`, value);
  closure('energy', energy);
}

function freshFeed({ result, streams }: FigureContext): Live {
  const feeds = feedStreams(result);
  return {
    term: plus(feeds.map(([tag]) => streams.get(tag)!.flow)),
    expected: feeds.reduce((sum, [, stream]) => sum + stream.flow_kmol_h, 0),
  };
}

function recycleAndConversions(context: FigureContext, feed: Term): void {
  const { result, flowsheet, streams, ledger } = context;
  const { recycle_ratio, per_pass_conversion, overall_conversion } = result.figures;
  const { recycle } = flowsheet.ledger;
  const ratio =
    recycle === null || recycle_ratio === null
      ? null
      : { term: over(streams.get(recycle)!.flow, feed), expected: recycle_ratio };
  write(context, 'recycle ratio', '', 'mol/mol', ratio, 'recycle_ratio');
  for (const [block, values] of Object.entries(per_pass_conversion)) {
    for (const [id, expected] of Object.entries(values)) {
      const into = plus(amountsInto(context, block, id));
      const term = over(minus(into, amountOutOf(context, block, id)), into);
      write(
        context,
        'conversion per pass',
        `${id} in ${block}`,
        'fraction',
        { term, expected },
        `conversion_${id}_${block}`,
      );
    }
  }
  for (const [id, expected] of Object.entries(overall_conversion)) {
    const entering = ledger.entering.get(id)!;
    const term = over(minus(entering, ledger.leaving.get(id)!), entering);
    write(context, 'overall conversion', id, 'fraction', { term, expected }, `overall_conversion_${id}`);
  }
}

/** Yield and production; gives the production. */
function yieldAndProduction(context: FigureContext): Term | null {
  const { result, flowsheet, streams, ledger } = context;
  const { overall_yield, production_t_d } = result.figures;
  const made = flowsheet.ledger.product;
  if (made === null) return null;
  if (overall_yield !== null) {
    const ids = flowsheet.components.map(({ id }) => id);
    const [p, r] = [ids.indexOf(overall_yield.product), ids.indexOf(overall_yield.reactant)];
    const { coefficients } = yieldReaction(flowsheet.reactions, p!, r!)!;
    const possible = over(
      times(ledger.entering.get(overall_yield.reactant)!, constant(coefficients[p!]!)),
      constant(-coefficients[r!]!),
    );
    const gained = minus(
      streams.get(made.stream)!.amounts.get(made.component)!,
      ledger.entering.get(made.component)!,
    );
    const of = `${overall_yield.product} per ${overall_yield.reactant}`;
    const found = { term: over(gained, possible), expected: overall_yield.value };
    write(context, 'yield', of, 'fraction', found, 'overall_yield');
  }
  if (production_t_d === null) return null;
  const kgPerH = streams.get(made.stream)!.masses.get(made.component)!;
  const perDay = { term: times(kgPerH, constant(0.024)), expected: production_t_d };
  return write(context, 'production', made.component, 't/d', perDay, 'production_t_d');
}

function inerts(context: FigureContext): void {
  const { result, flowsheet } = context;
  for (const [block, expected] of Object.entries(result.figures.inerts)) {
    const running = reactionsIn(flowsheet, block);
    const idle = flowsheet.components.filter((_, i) => running.every((one) => one.coefficients[i] === 0));
    const of = (ids: readonly { readonly id: string }[]) =>
      plus(ids.flatMap(({ id }) => amountsInto(context, block, id)));
    const all = plus(inletTags(context, block).map((tag) => context.streams.get(tag)!.flow));
    const found = all.value > 0 ? { term: over(of(idle), all), expected } : expected;
    write(context, 'inerts at inlet', block, 'mol/mol', found, `inerts_${block}`, looks.share);
  }
}

function purge(context: FigureContext, feed: Term): void {
  const { page, result, streams, ledger, components } = context;
  const lost: Figures['purge'] = result.figures.purge;
  if (lost === null) return;
  const { flow_kmol_h, fraction_of_makeup, lost_kmol_h, lost_fraction, lhv_MW } = lost;
  const flow = plus(lost.streams.map((tag) => streams.get(tag)!.flow));
  const cell = write(context, 'purge', '', 'kmol/h', { term: flow, expected: flow_kmol_h }, 'purge_flow');
  const part = { term: over(cell!, feed), expected: fraction_of_makeup };
  write(context, 'purge per fresh feed', '', 'mol/mol', part, 'purge_per_feed', looks.share);
  const from = page.rows.length;
  const cells = new Map<string, Term | null>();
  for (const [id, expected] of Object.entries(lost_kmol_h)) {
    const term = plus(lost.streams.map((tag) => streams.get(tag)!.amounts.get(id)!));
    cells.set(id, write(context, 'lost in purge', id, 'kmol/h', { term, expected }, `lost_${id}`));
  }
  const range: Range = { page, from: [from, VALUE], to: [page.rows.length - 1, VALUE] };
  for (const [id, expected] of Object.entries(lost_fraction)) {
    const term = over(cells.get(id)!, ledger.entering.get(id)!);
    write(context, 'lost in purge, part of feed', id, 'fraction', { term, expected }, null);
  }
  // kmol/h times kJ/mol is MJ/h
  const heating = { term: over(product(range, components.lowerHeating), constant(3600)), expected: lhv_MW };
  write(context, 'lower heating value of purge', '', 'MW', heating, 'purge_heating_value');
}

function powers(context: FigureContext, production: Term | null): void {
  const { page, result, blocks } = context;
  const { power_kW, specific_power_kWh_t, duty_kW } = result.figures;
  const from = page.rows.length;
  for (const [name, expected] of Object.entries(power_kW)) {
    if (name === 'total') continue;
    const term = blocks.power.get(name);
    write(context, 'power', name, 'kW', term === undefined ? expected : { term, expected });
  }
  const range: Range = { page, from: [from, VALUE], to: [page.rows.length - 1, VALUE] };
  const sum = { term: total(range), expected: power_kW['total'] ?? 0 };
  const all = write(context, 'power', 'total', 'kW', sum, 'power_total');
  const specific =
    specific_power_kWh_t === null || production === null || isWithoutPower(result.figures)
      ? null
      : { term: over(times(constant(24), all!), production), expected: specific_power_kWh_t };
  write(context, 'specific power', '', 'kWh/t', specific, 'specific_power');
  for (const [name, expected] of Object.entries(duty_kW))
    write(context, 'heat added', name, 'kW', { term: blocks.duty.get(name)!, expected });
}

const VALUE = 2;

/** One line: a formula where the figure has one, the number where not; gives the cell, null where it is empty. */
function write(
  { page, names }: FigureContext,
  figure: string,
  of: string,
  unit: string,
  found: Live | number | null,
  name: string | null = null,
  look: Style | null = unit === 'fraction' ? looks.share : null,
): Term | null {
  const worked = found !== null && typeof found !== 'number' && Number.isFinite(found.expected);
  const plain = typeof found === 'number' ? found : null;
  const style = look ?? ownFormat(plain ?? (worked ? found.expected : 0));
  const value: Cell = worked ? agreed(found.term, found.expected, style) : number(plain, style);
  const how = worked ? 'by formula' : value === null ? 'no value' : 'by the solver';
  const row = put(page, [
    text(figure),
    text(plainText(of)),
    value,
    text(unit, looks.unit),
    text(how, looks.unit),
  ]);
  if (value === null) return null;
  const cell = cellTerm(page, row, VALUE);
  return name === null ? cell : names.define(name, cell);
}

function inletTags({ result }: FigureContext, block: string): string[] {
  return Object.entries(result.streams).flatMap(([tag, { to }]) => (blockOf(to) === block ? [tag] : []));
}

function amountsInto(context: FigureContext, block: string, id: string): Term[] {
  return inletTags(context, block).map((tag) => context.streams.get(tag)!.amounts.get(id)!);
}

/** What leaves a reactor by its outlet. */
function amountOutOf({ result, streams }: FigureContext, block: string, id: string): Term {
  const tags = Object.entries(result.streams).flatMap(([tag, { from }]) =>
    blockOf(from) === block ? [tag] : [],
  );
  return plus(tags.map((tag) => streams.get(tag)!.amounts.get(id)!));
}

function blockOf(end: string): string {
  return end.split('.', 1)[0]!;
}

function reactionsIn({ blocks, reactions }: Flowsheet, name: string): readonly Reaction[] {
  const { kind, settings } = blocks.find((block) => block.name === name)!;
  const names = blockKinds.get(kind)!.reactionsIn?.(settings) ?? [];
  return reactions.filter((reaction) => names.includes(reaction.name));
}
