import { countSlips, nearest } from '../diagnostics/nearest.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import type { FormulaName } from '../units/formula.ts';
import type { Fault } from './findings.ts';

/** Names a formula may begin with. */
export const formulaRoots: readonly string[] = ['streams', 'blocks', 'figures'];

/** What there is in a flowsheet for formulas to name; made once, and asked of every formula. */
export interface FormulaWorld {
  readonly tree: Tree;
  /** the user's own figures that stand above */
  readonly figures: readonly string[];
  /** names of single numbers that stand beside streams, blocks and figures: cost and profit of an objective */
  readonly money?: readonly string[];
}

/** A number, a branch with known names, or a branch whose names only the result knows. */
type Tree = 'number' | 'details' | { readonly [name: string]: Tree };

/**
 * Check the names of a formula:
 *
 *   streams.TAG.n.COMP  kmol/h    .y.COMP  mole fraction    .m.COMP  kg/h    .w.COMP  mass fraction
 *   streams.TAG.T  K    .P  bar    .flow  kmol/h    .mass  kg/h    .vapour_fraction    .enthalpy  kW
 *   blocks.NAME.duty  kW    .power  kW    and the details of its kind, as in the result
 *   figures....    as in the result, e.g. figures.recycle_ratio, figures.overall_conversion.H2,
 *                  figures.user.NAME for an own figure that stands above
 *
 * @returns the first name that leads nowhere, and why; null where all are good
 */
export function misnamed(
  names: readonly FormulaName[],
  world: FormulaWorld,
): { readonly name: FormulaName; readonly fault: Fault } | null {
  for (const name of names) {
    const fault = follow(name.parts, world);
    if (fault !== null) return { name, fault };
  }
  return null;
}

/** The names there are in a flowsheet, its own figures aside. */
export function formulaWorld({
  tags,
  blocks,
  components,
}: {
  readonly tags: readonly string[];
  readonly blocks: readonly string[];
  readonly components: readonly string[];
}): FormulaWorld {
  const byComponent = each(components, 'number');
  const stream: Tree = {
    n: byComponent,
    y: byComponent,
    m: byComponent,
    w: byComponent,
    T: 'number',
    P: 'number',
    flow: 'number',
    mass: 'number',
    vapour_fraction: 'number',
    enthalpy: 'number',
  };
  const tree: Tree = {
    streams: each(tags, stream),
    blocks: each(blocks, 'details'),
    figures: {
      per_pass_conversion: each(blocks, byComponent),
      overall_conversion: byComponent,
      overall_yield: { value: 'number' },
      production_t_d: 'number',
      recycle_ratio: 'number',
      inerts: each(blocks, 'number'),
      purge: {
        flow_kmol_h: 'number',
        fraction_of_makeup: 'number',
        lost_kmol_h: byComponent,
        lost_fraction: byComponent,
        lhv_MW: 'number',
      },
      power_kW: each([...blocks, 'refrigeration', 'total'], 'number'),
      specific_power_kWh_t: 'number',
      duty_kW: each(blocks, 'number'),
      user: {},
    },
  };
  return { tree, figures: [] };
}

/** The same of a flowsheet that has been read, its own figures with them. */
export function worldOf({ streams, blocks, components, figures }: Flowsheet): FormulaWorld {
  const names = {
    tags: streams.map(({ tag }) => tag),
    blocks: blocks.map(({ name }) => name),
    components: components.map(({ id }) => id),
  };
  return { ...formulaWorld(names), figures: figures.map(({ name }) => name) };
}

function each(names: readonly string[], tree: Tree): Tree {
  return Object.fromEntries(names.map((name) => [name, tree]));
}

function follow(parts: readonly string[], world: FormulaWorld): Fault | null {
  const { figures, money = [] } = world;
  if (parts.length === 1 && money.includes(parts[0])) return null;
  let { tree } = world;
  for (const [i, part] of parts.entries()) {
    // The user's own figures come and go from formula to formula.
    if (i === 2 && parts[0] === 'figures' && parts[1] === 'user') tree = each(figures, 'number');
    const path = parts.slice(0, i).join('.');
    if (tree === 'number') {
      const why = `${path} is one number and has no parts`;
      return { code: 'unknown-figure', what: `${parts.join('.')} is not known.`, why, mend: `write ${path}` };
    }
    if (tree === 'details') return misspeltDetail(parts, i);
    if (Object.hasOwn(tree, part)) {
      tree = tree[part];
      continue;
    }
    const known = Object.keys(tree);
    const near = nearestName(part, known);
    const list = known.length === 0 ? 'there are none' : `known are ${shortened(known)}`;
    const write = (name: string) => [...parts.slice(0, i), name, ...parts.slice(i + 1)].join('.');
    return {
      code: 'unknown-figure',
      what: `${[...parts.slice(0, i), part].join('.')} is not known.`,
      why:
        near === null ? `${path} has no ${part}; ${list}` : `${path} has no ${part}; the nearest is ${near}`,
      mend: near !== null ? `write ${write(near)}` : oneOf(known, path),
    };
  }
  if (tree === 'number') return null;
  if (parts.join('.') === 'figures.user') tree = each(figures, 'number');
  const known = tree === 'details' ? ['duty', 'power'] : Object.keys(tree);
  return {
    code: 'unknown-figure',
    what: `${parts.join('.')} is not one number.`,
    why: known.length === 0 ? 'there is nothing in it' : `it has the parts ${shortened(known)}`,
    mend: known.length === 1 ? `write ${parts.join('.')}.${known[0]}` : oneOf(known, parts.join('.')),
  };
}

/** The details of a block are known from its result only, but a slip in duty or power can be told. */
function misspeltDetail(parts: readonly string[], at: number): Fault | null {
  const near = ['duty', 'power'].find(
    (name) => parts[at] !== name && countSlips(parts[at].toLowerCase(), name) <= 1,
  );
  if (near === undefined) return null;
  const path = [...parts.slice(0, at), near].join('.');
  return {
    code: 'unknown-figure',
    what: `${parts.join('.')} is not known.`,
    why: `the nearest is ${near}`,
    mend: `write ${path}`,
  };
}

/** What to write where nothing is near: the choice, for one picked for the user would be a guess. */
function oneOf(known: readonly string[], path: string): string {
  return known.length === 0 ? 'take it out' : `write ${path}.NAME, NAME one of ${shortened(known)}`;
}

/** The name most likely meant: a slip of the pen, or the one name that holds what was written (yield, overall_yield). */
export function nearestName(part: string, known: readonly string[]): string | null {
  const near = nearest(part, known);
  if (near !== null || part.length < 4) return near;
  const holding = known.filter((name) => name.toLowerCase().includes(part.toLowerCase()));
  return holding.length === 1 ? holding[0]! : null;
}

function shortened(names: readonly string[]): string {
  return names.length > 12 ? `${names.slice(0, 12).join(', ')}, ...` : names.join(', ');
}
