import type { Result, StreamResult } from '../model/result.ts';
import { isWithoutPower } from './no-power.ts';
import { fixed, percent, significant } from './numbers.ts';
import { plainText } from './plain.ts';
import type { SheetOptions } from './sheet.ts';

/**
 * One statement about the loop; an empty label carries on the statement before it. Blanks that hold a name and
 * its numbers together on one line are no-break spaces.
 */
export interface StoryLine {
  readonly label: string;
  readonly text: string;
}

/** The loop in the order its questions are asked: what goes round, what converts, what is lost, what it takes. */
export function story(result: Result, options: SheetOptions = {}): StoryLine[] {
  return [
    ...freshFeed(result),
    ...goesRound(result),
    ...conversions(result),
    ...product(result),
    ...inerts(result),
    ...purge(result),
    ...power(result),
    ...heat(result),
    ...userFigures(result, options.figureUnits ?? {}),
  ];
}

/** Streams that come in over the battery limit. */
export function feedStreams(result: Result): [string, StreamResult][] {
  return Object.entries(result.streams).filter(([, stream]) => !(blockOf(stream.from) in result.blocks));
}

function blockOf(end: string): string {
  return end.split('.', 1)[0] ?? end;
}

function freshFeed(result: Result): StoryLine[] {
  const feeds = feedStreams(result);
  if (feeds.length === 0) return [];
  const total = feeds.reduce((sum, [, stream]) => sum + stream.flow_kmol_h, 0);
  const parts = feeds.map(([tag, stream]) =>
    feeds.length === 1
      ? `in ${plainText(tag)}`
      : `${plainText(stream.from)} ${significant(stream.flow_kmol_h)} in ${plainText(tag)}`,
  );
  return listed('Fresh feed', `${significant(total)} kmol/h`, parts, feeds.length === 1 ? ' ' : ': ');
}

function goesRound(result: Result): StoryLine[] {
  const ratio = result.figures.recycle_ratio;
  if (ratio === null) return [{ label: 'Goes round', text: 'nothing: no recycle is named or found' }];
  const feed = feedStreams(result).reduce((sum, [, stream]) => sum + stream.flow_kmol_h, 0);
  return [
    {
      label: 'Goes round',
      text: `${significant(ratio * feed)} kmol/h, ${significant(ratio, 4)} mol recycle per mol fresh feed`,
    },
  ];
}

function conversions(result: Result): StoryLine[] {
  const { per_pass_conversion: perPass, overall_conversion: overall } = result.figures;
  const lines: StoryLine[] = [];
  for (const [block, values] of Object.entries(perPass)) {
    const text = namedPercents(values);
    if (text !== '')
      lines.push({ label: lines.length === 0 ? 'One pass' : '', text: `${text} in ${plainText(block)}` });
  }
  const text = namedPercents(overall);
  if (text !== '') lines.push({ label: 'Overall', text: `${text} over the battery limit` });
  return lines;
}

function product(result: Result): StoryLine[] {
  const { overall_yield: overallYield, production_t_d: production } = result.figures;
  const lines: StoryLine[] = [];
  if (overallYield !== null) {
    const { product: made, reactant, value } = overallYield;
    lines.push({
      label: 'Yield',
      text: `${percent(value)} of the ${made} that the ${reactant} fed could make`,
    });
  }
  if (production !== null) {
    lines.push({
      label: 'Production',
      text: `${significant(production)} t/d ${overallYield?.product ?? ''}`.trimEnd(),
    });
  }
  return lines;
}

function inerts(result: Result): StoryLine[] {
  return Object.entries(result.figures.inerts).map(([block, fraction], index) => ({
    label: index === 0 ? 'Inerts' : '',
    text: `${fixed(fraction * 100, 2, 1e-10)} mol % at the inlet of ${plainText(block)}`,
  }));
}

function purge(result: Result): StoryLine[] {
  const { purge: lost } = result.figures;
  if (lost === null) return [];
  const heating = lost.lhv_MW > 0 ? `, ${significant(lost.lhv_MW, 4)} MW lower heating value` : '';
  const where = lost.streams.length > 1 ? ` in ${lost.streams.map(plainText).join(' and ')} together` : '';
  const head = `${significant(lost.flow_kmol_h)} kmol/h${where}, ${percent(lost.fraction_of_makeup)} of the fresh feed${heating}`;
  const parts = Object.entries(lost.lost_kmol_h)
    .filter(([, flow]) => flow > 0)
    .map(([id, flow]) => {
      const fraction = lost.lost_fraction[id];
      const share = fraction === undefined || fraction === null ? '' : ` (${percent(fraction)})`;
      return `${id} ${significant(flow, 4)}${share}`;
    });
  return [
    { label: 'Purge', text: head },
    ...(parts.length === 0
      ? []
      : [{ label: '  takes along', text: `kmol/h and part of the feed: ${together(parts)}` }]),
  ];
}

function power(result: Result): StoryLine[] {
  const { total, ...machines } = result.figures.power_kW;
  const parts = Object.entries(machines)
    .filter(([name, value]) => value !== 0 || name !== 'refrigeration')
    .map(([name, value]) => `${plainText(name)} ${significant(value)}`);
  if (isWithoutPower(result.figures)) return [{ label: 'Power', text: 'none' }];
  const sum = total ?? Object.values(machines).reduce((a, b) => a + b, 0);
  const lines = listed('Power', `${significant(sum)} kW`, parts, ': ');
  const specific = result.figures.specific_power_kWh_t;
  if (specific !== null)
    lines.push({ label: 'Specific power', text: `${significant(specific, 4)} kWh per t of product` });
  return lines;
}

function heat(result: Result): StoryLine[] {
  const duties = Object.entries(result.figures.duty_kW)
    .filter(([, duty]) => duty !== 0)
    .map(([block, duty]) => `${plainText(block)} ${significant(duty)}`);
  return duties.length === 0 ? [] : [{ label: 'Heat added, kW', text: together(duties) }];
}

function userFigures(result: Result, units: Readonly<Record<string, string>>): StoryLine[] {
  return Object.entries(result.figures.user).map(([name, value]) => {
    const unit = plainText(units[name] ?? '');
    const shown = unit === '%' && value !== null ? percent(value) : `${significant(value)} ${unit}`.trimEnd();
    return { label: plainText(name), text: shown };
  });
}

/** What is formed rather than converted has a negative conversion: it is in the result, but tells no story. */
function namedPercents(values: Readonly<Record<string, number>>): string {
  const parts = Object.entries(values)
    .filter(([, fraction]) => fraction >= 0)
    .map(([id, fraction]) => `${id} ${percent(fraction)}`);
  return together(parts);
}

/** A total followed by its parts. */
function listed(label: string, total: string, parts: readonly string[], joint: string): StoryLine[] {
  return [{ label, text: parts.length === 0 ? total : total + joint + together(parts) }];
}

/** Parts in a row, none of them broken over two lines. */
function together(parts: readonly string[]): string {
  return parts.map((part) => part.replaceAll(' ', '\u00a0')).join(', ');
}
