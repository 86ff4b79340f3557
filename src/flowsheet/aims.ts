import type { Aim } from '../model/flowsheet.ts';
import { type Dimension, dimensions } from '../units/dimension.ts';
import { parseQuantity } from '../units/quantity.ts';
import type { Reading } from './findings.ts';
import type { FormulaWorld } from './formula-scope.ts';
import { readFormula } from './formulas.ts';
import { checkPart } from './issues.ts';
import { aimSchema } from './schema-studies.ts';
import { optionalEntries } from './section.ts';
import { type SettingsWorld, trySetting } from './settings.ts';
import { readTarget } from './target.ts';
import { nodeAt, type Path, placeInside, placeOfPath, type YamlScalar } from './yaml-tree.ts';

/** The aims: which setting moves, between which bounds [SI], until which formula has which value. */
export function readAims(
  reading: Reading,
  world: FormulaWorld | null,
  settings: SettingsWorld,
): readonly Aim[] {
  const { root, findings } = reading;
  const aims: Aim[] = [];
  const moved = new Map<string, Path>();
  for (const { key } of optionalEntries(
    reading,
    'aims',
    'aims: {inert cap: {move: ..., between: [..., ...], until: ...}}',
  )) {
    const path: Path = ['aims', key];
    const entry = checkPart(reading, aimSchema, path);
    if (entry === undefined) continue;
    const before = moved.get(entry.move);
    const movePath = [...path, 'move'];
    if (before !== undefined) {
      const what = `two aims move ${entry.move}.`;
      const fault = {
        code: 'bad-aim',
        what,
        why: 'one setting can meet one aim',
        mend: 'let one of them move another setting',
      };
      findings.error(placeOfPath(root, movePath), fault, placeOfPath(root, before));
    }
    moved.set(entry.move, movePath);
    const between = readBounds(reading, settings, path, entry.move);
    const until = readUntil(reading, world, key, path);
    if (between === null || until === null) continue;
    aims.push({
      name: key,
      move: entry.move,
      between,
      unit: unitOfBound(entry.move, entry.between[1]),
      ...until,
    });
  }
  return aims;
}

function readBounds(
  reading: Reading,
  settings: SettingsWorld,
  path: Path,
  move: string,
): [number, number] | null {
  const { root, findings } = reading;
  const where = placeOfPath(root, [...path, 'move']);
  const bounds = [0, 1].map((i) => {
    const node = nodeAt(root, [...path, 'between', i]) as YamlScalar;
    return trySetting(reading, settings, { path: move, pathPlace: where, value: node });
  });
  const [low, high] = bounds;
  if (low === undefined || high === undefined) return null;
  if (low === null || high === null) {
    const why = 'an aim moves a setting that is one number';
    findings.error(where, {
      code: 'bad-aim',
      what: `${move} cannot be moved.`,
      why,
      mend: 'write a path such as purge.fractions.bleed',
    });
    return null;
  }
  if (move.startsWith('solve.') || move.startsWith('ledger.')) {
    const why = 'an aim moves a setting of a block or feed';
    findings.error(where, {
      code: 'bad-aim',
      what: `${move} cannot be moved.`,
      why,
      mend: 'write a path such as purge.fractions.bleed',
    });
    return null;
  }
  if (low < high) return [low, high];
  const place = placeOfPath(root, [...path, 'between', 0]);
  const why = low === high ? 'between them there is no room to move' : 'the lower bound stands first';
  const mend = low === high ? 'write two different bounds' : 'swap the two';
  findings.error(place, {
    code: 'bad-aim',
    what: `the bounds of aim ${path[1]} are not in order.`,
    why,
    mend,
  });
  return null;
}

/** SI unit of the setting, told by the unit that its bound is written in. */
export function unitOfBound(move: string, bound: string | number): string {
  if (/^[^.]+\.flows\.[^.]+$/.test(move) && typeof bound === 'string') return 'mol/s';
  const fitting = (Object.keys(dimensions) as Dimension[]).find((d) => parseQuantity(String(bound), d).ok);
  return fitting === undefined ? '' : dimensions[fitting].si;
}

function readUntil(reading: Reading, world: FormulaWorld | null, name: string, path: Path) {
  const { root, findings } = reading;
  const node = nodeAt(root, [...path, 'until']) as YamlScalar;
  const at = node.text.lastIndexOf('=');
  if (at < 0) {
    const why = 'the formula and its wanted value have an = between them';
    findings.error(node.place, {
      code: 'bad-aim',
      what: `aim ${name}: until has no target.`,
      why,
      mend: `write e.g. ${node.text} = 12 %`,
    });
    return null;
  }
  const text = node.text.slice(0, at).trimEnd();
  const read = readFormula(reading, world, `aim ${name}`, node, text);
  if (read === null) return null;
  const single = read.names.length === 1 && read.names[0].length === text.trim().length;
  const target = readTarget(node.text.slice(at + 1), read.names, single);
  if (!('fault' in target)) {
    return { until: read.formula, target: target.value, wanted: node.text.slice(at + 1).trim() };
  }
  const lead = node.text.slice(at + 1).search(/\S|$/);
  const { fault } = target;
  findings.error(placeInside(node, at + 1 + lead, node.text.slice(at + 1).trim().length), {
    ...fault,
    what: `aim ${name}: ${fault.what}`,
  });
  return null;
}
