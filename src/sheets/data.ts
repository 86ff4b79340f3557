import type { PublishedConstant } from '../chemistry/published-constants.ts';
import { formatTerms } from '../chemistry/reaction-format.ts';
import type { CatalogueEntry, CatalogueLine, CatalogueRow } from '../properties/catalogue.ts';
import { fixed } from './numbers.ts';
import { wrapped } from './plain.ts';
import { aligned, type Rows } from './table.ts';

const WIDTH = 100;

/** The list of built-in components and of published equilibrium constants. */
export function dataListText(
  components: readonly CatalogueLine[],
  constants: readonly PublishedConstant[],
): string {
  const rows: Rows = [
    ['id', 'formula', 'name', 'CAS', 'g/mol', 'boils, degC', 'critical, degC'],
    ...components.map((line) => [
      line.id,
      line.formula,
      line.name,
      line.cas,
      fixed(line.molarMassGPerMol, 3),
      degC(line.boilingK),
      degC(line.criticalK),
    ]),
  ];
  return [
    'Components',
    ...aligned(rows, { left: [0, 1, 2, 3], indent: 2 }),
    '',
    'Published equilibrium constants, for reactions: {name: {equation: ..., constant: NAME}}',
    ...constants.flatMap(constantLines),
    '',
    'looptally data NAME shows the data of one of them with their sources.',
    '',
  ].join('\n');
}

/** Published equilibrium constants one below the other. */
export function constantsText(constants: readonly PublishedConstant[]): string {
  return `${constants.flatMap(constantLines).join('\n')}\n`;
}

/** The data of one component in groups, the sources numbered below. */
export function dataEntryText(entry: CatalogueEntry): string {
  const sources: string[] = [];
  const groups = [...new Set(entry.rows.map((row) => row.group))];
  return [
    `${entry.id}  ${entry.name}, ${entry.formula}, CAS ${entry.cas}`,
    ...(entry.note === '' ? [] : wrapped(entry.note, WIDTH, '  ', '  ')),
    ...groups.flatMap((group) => [
      '',
      group,
      ...groupLines(
        entry.rows.filter((row) => row.group === group),
        sources,
      ),
    ]),
    '',
    'Sources',
    ...sources.flatMap((source, index) => wrapped(source, WIDTH, `  [${index + 1}] `, '      ')),
    '',
  ].join('\n');
}

function groupLines(rows: readonly CatalogueRow[], sources: string[]): string[] {
  const cells = rows.map((row) => [
    row.quantity,
    typeof row.value === 'object' ? '' : valueText(row.value),
    typeof row.value === 'object' ? '' : row.unit.replace(/^-$/, ''),
    row.range === null ? '' : rangeText(row.range),
    row.source === '' ? '' : `[${sourceNumber(row.source, sources)}]`,
  ]);
  return aligned(cells, { left: [0, 2, 3, 4], indent: 2 }).flatMap((line, index) => {
    const row = rows[index]!;
    const coefficients =
      typeof row.value === 'object'
        ? [
            Object.entries(row.value)
              .map(([name, value]) => `${name} ${value}`)
              .join(', '),
            `(${row.unit})`,
          ].join(' ')
        : '';
    return [
      line,
      ...[coefficients, row.note].filter(Boolean).flatMap((text) => wrapped(text, WIDTH, '      ', '      ')),
    ];
  });
}

/** Data are shown as they are kept, to the last digit. */
function valueText(value: number | string): string {
  return typeof value === 'number' ? String(Number(value.toPrecision(12))) : value;
}

function sourceNumber(source: string, sources: string[]): number {
  const found = sources.indexOf(source);
  return found >= 0 ? found + 1 : sources.push(source);
}

function constantLines(constant: PublishedConstant): string[] {
  const { name, stoichiometry, range, standardPressurePa, source, note } = constant;
  return [
    `  ${name}  ${formatTerms(stoichiometry)}  (${rangeText(range)}, standard pressure ${standardPressurePa / 1e5} bar)`,
    ...[source, note].filter(Boolean).flatMap((text) => wrapped(text, WIDTH, '      ', '      ')),
  ];
}

function rangeText({ fromK, toK }: { readonly fromK: number; readonly toK: number }): string {
  return `${Number(fromK.toFixed(2))} to ${Number(toK.toFixed(2))} K`;
}

function degC(kelvin: number | null): string {
  return kelvin === null ? '-' : fixed(kelvin - 273.15, 2);
}
