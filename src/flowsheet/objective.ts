import type { Aim, FigureLimit, Goal, Move, Objective } from '../model/flowsheet.ts';
import { compileFormula } from '../units/formula.ts';
import { lastUnit } from '../units/quantity.ts';
import { unitOfBound } from './aims.ts';
import type { Fault, Reading } from './findings.ts';
import { type FormulaWorld, formulaRoots } from './formula-scope.ts';
import { type ReadFormula, readFormula } from './formulas.ts';
import { checkPart } from './issues.ts';
import type { ReadPrices } from './prices.ts';
import { objectiveSchema } from './schema-studies.ts';
import { type SettingsWorld, trySetting } from './settings.ts';
import { readTarget, unitOfName } from './target.ts';
import { child, nodeAt, type Path, placeInside, placeOfPath, type YamlScalar } from './yaml-tree.ts';

/**
 * The objective: one goal, or two for a trade-off front; the settings that may be moved, and the limits that must hold.
 * Null where there is none or it is at fault.
 */
export function readObjective(
  reading: Reading,
  world: FormulaWorld,
  settings: SettingsWorld,
  prices: ReadPrices | null,
  aims: readonly Aim[],
): Objective | null {
  const { root, findings } = reading;
  if (child(root, 'objective') === undefined) return null;
  const entry = checkPart(reading, objectiveSchema, ['objective']);
  if (entry === undefined) return null;
  const before = findings.list.length;
  const money: FormulaWorld = { ...world, money: ['cost', 'profit'] };
  const goals = (['minimise', 'maximise'] as const).flatMap((sense) =>
    (entry[sense] ?? []).flatMap((_, i) => readGoal(reading, money, prices, sense, i)),
  );
  const asked = (entry.minimise?.length ?? 0) + (entry.maximise?.length ?? 0);
  if (asked < 1 || asked > 2) {
    complain(reading, ['objective'], {
      what: asked === 0 ? 'the objective does not say what is wanted.' : 'the objective has too many goals.',
      why: 'it has one goal, or two for a trade-off front',
      mend: asked === 0 ? 'add e.g. minimise: cost' : 'keep two of them and make limits of the others',
    });
  }
  const moves = Object.keys(entry.move).flatMap((path) => readMove(reading, settings, aims, path));
  if (Object.keys(entry.move).length === 0) {
    complain(reading, ['objective', 'move'], {
      what: 'the objective moves nothing.',
      why: 'without a setting to move there is nothing to choose',
      mend: 'add e.g. condenser.temperature: -30 degC..5 degC',
    });
  }
  if (Object.keys(entry.move).length > MOST_MOVES) {
    complain(reading, ['objective', 'move'], {
      what: 'the objective moves too many settings.',
      why: `at most ${MOST_MOVES} can be searched evenly`,
      mend: 'keep those that matter most; looptally levers tells which they are',
    });
  }
  const limits = (entry.limits ?? []).flatMap((_, i) => readLimit(reading, money, prices, i));
  return findings.list.length > before ? null : { goals, moves, limits };
}

const MOST_MOVES = 12;

function readGoal(
  reading: Reading,
  world: FormulaWorld,
  prices: ReadPrices | null,
  sense: Goal['sense'],
  i: number,
): Goal[] {
  const node = scalarAt(reading, ['objective', sense], i);
  const read = readFormula(reading, world, 'objective', node);
  const formula = read === null ? null : withMoney(reading, node, read, node.text, prices);
  if (read === null || formula === null) return [];
  const single = read.names.length === 1 && read.names[0]!.length === node.text.trim().length;
  const parts = single ? read.names[0]!.parts : [];
  const unit =
    parts.length === 1
      ? `${prices!.prices.currency}/h`
      : single
        ? (unitOfName(parts) ?? unitInName(parts))
        : '';
  return [{ sense, text: node.text.trim(), formula, unit }];
}

const UNITS: readonly (readonly [string, string])[] = [
  ['_kWh_t', 'kWh/t'],
  ['_t_d', 't/d'],
  ['_kmol_h', 'kmol/h'],
  ['_MW', 'MW'],
  ['_kW', 'kW'],
];

/** The unit that the name of a figure ends with. */
function unitInName(parts: readonly string[]): string {
  return UNITS.find(([suffix]) => parts.some((part) => part.endsWith(suffix)))?.[1] ?? '';
}

/** The formula with cost and profit written out, so that it names nothing but streams, blocks and figures. */
function withMoney(
  { findings }: Reading,
  node: YamlScalar,
  { formula, names }: ReadFormula,
  text: string,
  prices: ReadPrices | null,
) {
  let written = text;
  for (const { parts, offset, length } of names.toReversed()) {
    if (parts.length > 1) continue;
    const money = parts[0] === 'cost' ? prices?.cost : prices?.profit;
    if (money === undefined || money === null) {
      findings.error(placeInside(node, offset, length), {
        code: 'bad-objective',
        what: `${parts[0]} cannot be worked out.`,
        why:
          prices === null
            ? 'it is made of prices, and the file has none that fit'
            : 'the product has no price',
        mend:
          prices === null
            ? 'add e.g. prices: {power: 60 EUR/MWh, product: 350 EUR/t}'
            : 'add product: 350 EUR/t to prices',
      });
      return null;
    }
    written = `${written.slice(0, offset)}(${money})${written.slice(offset + length)}`;
  }
  if (written === text) return formula;
  const compiled = compileFormula(written, formulaRoots);
  if (!compiled.ok) throw new Error(`${written}: ${compiled.what}`);
  return { text, evaluate: compiled.evaluate };
}

function readMove(reading: Reading, settings: SettingsWorld, aims: readonly Aim[], path: string): Move[] {
  const { root, findings } = reading;
  const at: Path = ['objective', 'move', path];
  const node = nodeAt(root, at) as YamlScalar;
  const where = nodeAt(root, ['objective', 'move'])!;
  const keyPlace =
    where.kind === 'mapping' ? where.entries.find((e) => e.key === path)!.keyPlace : node.place;
  const cannot = (what: string, why: string, mend: string, place = keyPlace): Move[] => {
    findings.error(place, { code: 'bad-objective', what, why, mend });
    return [];
  };
  const example = 'write both bounds with their units, e.g. -30 degC..5 degC';
  const dots = node.text.indexOf('..');
  if (dots < 0) {
    return cannot(`${path} has no bounds.`, 'the two bounds have .. between them', example, node.place);
  }
  const ends = [node.text.slice(0, dots), node.text.slice(dots + 2)];
  const values = ends.map((end, i) => {
    const lead = (i === 0 ? 0 : dots + 2) + end.search(/\S|$/);
    const text = end.trim();
    const place = placeInside(node, lead, text.length);
    const value = { kind: 'scalar', value: text, text, place, textPlace: null } as const;
    return trySetting(reading, settings, { path, pathPlace: keyPlace, value });
  });
  const [low, high] = values;
  if (low === undefined || high === undefined) return [];
  if (low === null || high === null || /^(solve|ledger)\./.test(path)) {
    const why = 'an objective moves settings of blocks and feeds that are one number';
    return cannot(`${path} cannot be moved.`, why, 'write a path such as purge.fractions.bleed');
  }
  const aim = aims.find((one) => one.move === path);
  if (aim !== undefined) {
    const why = `the aim ${aim.name} moves it already`;
    return cannot(`${path} cannot be moved.`, why, 'move another setting, or make a limit of the aim');
  }
  if (!(low < high)) {
    const why = low === high ? 'between them there is no room to move' : 'the lower bound stands first';
    const mend = low === high ? 'write two different bounds' : 'swap the two';
    return cannot(`the bounds of ${path} are not in order.`, why, mend, node.place);
  }
  const written = lastUnit(ends);
  return [{ path, between: [low, high], unit: unitOfBound(path, ends[1]!.trim()), written }];
}

function readLimit(
  reading: Reading,
  world: FormulaWorld,
  prices: ReadPrices | null,
  i: number,
): FigureLimit[] {
  const node = scalarAt(reading, ['objective', 'limits'], i);
  const sign = /<=|>=|≤|≥|<|>/.exec(node.text);
  if (sign === null) {
    reading.findings.error(node.place, {
      code: 'bad-objective',
      what: `"${node.text}" is no limit.`,
      why: 'a limit is a formula, < or >, and a value',
      mend: 'write it as in figures.inerts.converter < 14 %',
    });
    return [];
  }
  const text = node.text.slice(0, sign.index).trimEnd();
  const read = readFormula(reading, world, 'limit', node, text);
  const formula = read === null ? null : withMoney(reading, node, read, text, prices);
  if (read === null || formula === null) return [];
  const from = sign.index + sign[0].length;
  const single = read.names.length === 1 && read.names[0]!.length === text.trim().length;
  // cost and profit are money, which has no unit of ours.
  const isMoney = read.names.some(({ parts }) => parts.length === 1);
  const target = readTarget(node.text.slice(from), read.names, single && !isMoney);
  if (!('fault' in target)) {
    const side = /[<≤]/.test(sign[0]) ? 'below' : 'above';
    return [{ text: node.text.trim(), formula: { ...formula, text }, side, bound: target.value }];
  }
  const wanted = node.text.slice(from).trim();
  const lead = from + node.text.slice(from).search(/\S|$/);
  const { fault } = target;
  const fitting: Fault =
    fault.code === 'bad-aim'
      ? {
          code: 'bad-objective',
          what: `"${wanted}" is no value of a limit.`,
          why: `behind ${sign[0]} stands one number, with its unit where it has one`,
          mend: `write it as in ${text} ${sign[0]} 14 %`,
        }
      : fault;
  reading.findings.error(placeInside(node, lead, wanted.length), {
    ...fitting,
    what: `limit: ${fitting.what}`,
  });
  return [];
}

/** The text of a list, or the one value that stands in its place. */
function scalarAt({ root }: Reading, path: Path, i: number): YamlScalar {
  const node = nodeAt(root, path)!;
  return (node.kind === 'list' ? node.items[i] : node) as YamlScalar;
}

function complain(reading: Reading, path: Path, fault: Omit<Fault, 'code'>): void {
  reading.findings.error(placeOfPath(reading.root, path), { code: 'bad-objective', ...fault });
}
