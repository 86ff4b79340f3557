import type { Flowsheet } from '../model/flowsheet.ts';
import type { Plan } from '../tally/plan.ts';
import { degreesOfFreedom } from './degrees-of-freedom.ts';
import { plainText, wrapped } from './plain.ts';
import { noPaint, type SheetOptions } from './sheet.ts';
import { aligned } from './table.ts';

const WIDTH = 100;

/** What `looptally check` says of a file without faults: what is in it, order, loops and tears, degrees of freedom. */
export function checkText(flowsheet: Flowsheet, plan: Plan, options: SheetOptions = {}): string {
  const paint = options.paint ?? noPaint;
  const name = plainText(flowsheet.title) || 'Untitled flowsheet';
  return [
    paint.head(name),
    '='.repeat(Math.min(WIDTH, [...name].length)),
    `case: ${flowsheet.caseName === null ? 'as in the file' : plainText(flowsheet.caseName)}`,
    'no faults found; nothing was solved',
    '',
    paint.head('What is in it'),
    ...aligned(contents(flowsheet), { left: [0, 1], indent: 2 }).flatMap((line) =>
      wrapped(line.trim(), WIDTH, '  ', '    '),
    ),
    '',
    paint.head('Order of calculation'),
    ...wrapped(plan.order.map(plainText).join(' -> '), WIDTH, '  ', '    '),
    '',
    paint.head('Loops'),
    ...loopLines(flowsheet, plan),
    '',
    paint.head('Degrees of freedom'),
    ...freedomLines(flowsheet),
    ...(plan.aims.length === 0 ? [] : ['', paint.head('Aims'), ...aimLines(plan)]),
    '',
    paint.head('Sources'),
    ...sourceLines(plan),
    '',
    paint.head('Assumptions'),
    ...plan.assumptions.flatMap((text) => wrapped(plainText(text), WIDTH, '  - ', '    ')),
    '',
  ].join('\n');
}

/** Models, constants and data: what all share, then by block, then by component with each source once. */
function sourceLines({ sources }: Plan): string[] {
  const numbered = [...new Set(sources.components.flatMap(({ data }) => Object.values(data)))];
  const cited = (data: Readonly<Record<string, string>>) =>
    Object.entries(data)
      .map(([what, source]) => `${what} [${numbered.indexOf(source) + 1}]`)
      .join(', ');
  return [
    ...sources.shared.map((text) => `all blocks: ${text}`),
    ...sources.blocks.flatMap(({ name, models }) => models.map((text) => `${name}: ${text}`)),
    ...sources.components.map(({ id, role, data }) => `${id} (${role}): ${cited(data)}`),
    ...numbered.map((source, k) => `[${k + 1}] ${source}`),
  ].flatMap((line) => wrapped(plainText(line), WIDTH, '  ', '      '));
}

function contents(flowsheet: Flowsheet): string[][] {
  const { components, reactions, feeds, blocks, streams, cases } = flowsheet;
  const rows: [string, readonly string[]][] = [
    ['components', components.map((component) => component.id)],
    ['reactions', reactions.map((reaction) => `${reaction.name} (${reaction.equation})`)],
    ['feeds', feeds.map((feed) => feed.name)],
    ['blocks', blocks.map((block) => `${block.name} (${block.kind})`)],
    ['streams', streams.map((stream) => stream.tag)],
    ['cases', cases],
  ];
  return rows
    .filter(([, names]) => names.length > 0)
    .map(([head, names]) => [
      `${names.length} ${names.length === 1 ? head.slice(0, -1) : head}:`,
      names.map(plainText).join(', '),
    ]);
}

function loopLines({ solve }: Flowsheet, plan: Plan): string[] {
  if (plan.loops.length === 0) return ['  none: one pass through the blocks gives the answer'];
  const guesses = `  the solver guesses ${plan.unknowns} numbers: flows, temperature and pressure of each tear`;
  const { tears, smallest } = plan;
  const given = solve.tear.length === 0 ? '' : ', those of solve.tear among them';
  const number = `  ${tears.length} ${tears.length === 1 ? 'tear' : 'tears'}, ${smallest ? 'the smallest number that breaks every loop' : 'a small number (not proven smallest)'}${given}`;
  const loops = plan.loops.flatMap(({ blocks, tears }, index) =>
    wrapped(
      `${blocks.map(plainText).join(', ')}; torn at ${tears.map(plainText).join(', ')}`,
      WIDTH,
      `  ${index + 1}. `,
      '     ',
    ),
  );
  return [...loops, number, guesses];
}

function freedomLines(flowsheet: Flowsheet): string[] {
  const { perStream, streams, unknowns, byFeeds, byBlocks, aims, left } = degreesOfFreedom(flowsheet);
  const lines = [
    `${unknowns} unknowns: ${streams} streams, each with ${perStream - 2} component flows, temperature and pressure`,
    `${byFeeds} given by the feeds, ${byBlocks} by the balances and settings of the blocks`,
    ...(aims === 0
      ? []
      : [
          `${aims} ${aims === 1 ? 'setting set free by an aim and fixed by its wanted value' : 'settings set free by aims and fixed by their wanted values'}`,
        ]),
    `${left} left`,
  ];
  return lines.flatMap((line) => wrapped(line, WIDTH, '  ', '    '));
}

function aimLines(plan: Plan): string[] {
  return plan.aims.flatMap(({ name, moves, until }) =>
    wrapped(`${plainText(name)}: moves ${plainText(moves)} until ${plainText(until)}`, WIDTH, '  ', '    '),
  );
}
