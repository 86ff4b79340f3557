import { nearest } from '../diagnostics/nearest.ts';
import type { Aim, Flowsheet } from '../model/flowsheet.ts';
import type { Shape, Spread } from '../model/spread.ts';
import type { Dimension } from '../units/dimension.ts';
import { type Limits, lastUnit, parseQuantity } from '../units/quantity.ts';
import { settingPath } from './changes.ts';
import { numericConstants } from './constants.ts';
import type { Fault, Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import { type NumericSetting, numericSettings } from './numeric-settings.ts';
import { spreadSchemas } from './schema-studies.ts';
import { optionalEntries } from './section.ts';
import { keyPlaceOfPath, nodeAt, type Path, placeOfPath } from './yaml-tree.ts';

export interface ReadSpreads {
  readonly spreads: readonly Spread[];
  /** every path under `spreads`, those at fault too */
  readonly paths: readonly string[];
}

/** What can be spread: every numeric setting with a value, and every constant that acts. */
export function spreadableSettings(
  flowsheet: Pick<Flowsheet, 'blocks' | 'components' | 'feeds' | 'liquid' | 'reactions'>,
): readonly NumericSetting[] {
  return [...numericSettings(flowsheet), ...numericConstants(flowsheet)];
}

/**
 * The spreads, in SI, in the order of the file.
 *
 * @param known  what can be spread; null where parts of the file could not be read: then paths and values are not judged
 */
export function readSpreads(
  reading: Reading,
  known: readonly NumericSetting[] | null,
  aims: readonly Aim[],
): ReadSpreads {
  const entries = optionalEntries(
    reading,
    'spreads',
    'spreads: {condenser.temperature: {kind: normal, sd: 2 K}}',
  );
  const spreads = entries.flatMap(({ key, keyPlace }): Spread[] => {
    const path: Path = ['spreads', key];
    const entry = readEntry(reading, path);
    if (known === null) return [];
    const setting = known.find((one) => one.path === key);
    const aim = aims.find((one) => one.move === key);
    if (setting === undefined) reading.findings.error(keyPlace, noSetting(key, known));
    else if (aim !== undefined) reading.findings.error(keyPlace, movedByAim(key, aim));
    if (setting === undefined || aim !== undefined || entry === undefined) return [];
    const shape = shapeOf(reading, path, entry, setting);
    if (shape === null) return [];
    return [{ path: key, shape, written: lastUnit([writtenInFile(reading, key), ...ownValues(entry)]) }];
  });
  return { spreads, paths: entries.map(({ key }) => key) };
}

/** The values of an entry that are written in a unit of the setting, not in one of its differences. */
function ownValues(entry: Entry): string[] {
  const values = Object.entries(entry).filter(([key]) =>
    ['mean', 'median', 'low', 'mode', 'high'].includes(key),
  );
  return values.map(([, value]) => String(value));
}

/** What stands in the file for a setting; '' for a constant. */
function writtenInFile({ root }: Reading, path: string): string {
  const target = settingPath(root, path);
  const node = 'fault' in target ? undefined : nodeAt(root, target.path);
  return node?.kind === 'scalar' ? node.text : '';
}

type Kind = keyof typeof spreadSchemas;
type Entry = { [K in Kind]: ReturnType<(typeof spreadSchemas)[K]['parse']> }[Kind];

/** The entry checked by the schema of its kind. */
function readEntry(reading: Reading, path: Path): Entry | undefined {
  const { root, findings } = reading;
  const kinds = Object.keys(spreadSchemas) as Kind[];
  const node = nodeAt(root, path);
  const written = nodeAt(root, [...path, 'kind']);
  const kind = kinds.find((one) => written?.kind === 'scalar' && written.text === one);
  if (kind !== undefined) return checkPart<Entry>(reading, spreadSchemas[kind], path);
  const word = written?.kind === 'scalar' ? written.text : '';
  const near = word === '' ? null : nearest(word, kinds);
  findings.error(
    written === undefined
      ? keyPlaceOfPath(root, path)
      : placeOfPath(root, node?.kind === 'mapping' ? [...path, 'kind'] : path),
    {
      code: word === '' ? 'missing-key' : 'wrong-value',
      what: word === '' ? `the spread of ${path[1]} has no kind.` : `${word} is no kind of spread.`,
      why: near === null ? `a spread is one of ${kinds.join(', ')}` : `the nearest kind is ${near}`,
      mend: near === null ? 'write e.g. {kind: normal, sd: 2 K}' : `write kind: ${near}`,
    },
  );
  return undefined;
}

/** The shape in SI, or null with a finding. */
function shapeOf(reading: Reading, path: Path, entry: Entry, setting: NumericSetting): Shape | null {
  const { low, high } = setting.bounds;
  const within: Limits = {
    ...(low === Number.NEGATIVE_INFINITY ? {} : { min: low }),
    ...(high === Number.POSITIVE_INFINITY ? {} : { max: high }),
  };
  const value = (key: string, written: string | number | undefined, limits = within) =>
    written === undefined
      ? setting.value
      : readValue(reading, [...path, key], written, setting.dimension, limits);
  switch (entry.kind) {
    case 'normal': {
      const mean = value('mean', entry.mean);
      const dimension = differences[setting.dimension] ?? setting.dimension;
      const sd = readValue(reading, [...path, 'sd'], entry.sd, dimension, { above: 0 });
      return mean === null || sd === null ? null : { kind: 'normal', mean, sd };
    }
    case 'log-normal': {
      const median = value('median', entry.median, { ...within, above: 0 });
      if (median === null) return null;
      if (median > 0) return { kind: 'log-normal', median, factor: entry.factor };
      return outOfOrder(reading, [...path, 'kind'], {
        what: `the spread of ${path[1]} has no median above 0.`,
        why: `the value in the file is ${setting.value}, and what is log-normal is above 0`,
        mend: 'give a median, or another kind of spread',
      });
    }
    case 'uniform': {
      const from = value('low', entry.low);
      const to = value('high', entry.high);
      if (from === null || to === null) return null;
      if (from < to) return { kind: 'uniform', low: from, high: to };
      return outOfOrder(reading, [...path, 'low'], notInOrder(path, 'low below high'));
    }
    case 'triangular': {
      const from = value('low', entry.low);
      const mode = value('mode', entry.mode);
      const to = value('high', entry.high);
      if (from === null || mode === null || to === null) return null;
      if (from < to && from <= mode && mode <= to) return { kind: 'triangular', low: from, mode, high: to };
      const at = entry.mode === undefined || from >= to ? 'low' : 'mode';
      return outOfOrder(reading, [...path, at], notInOrder(path, 'low, mode and high from small to large'));
    }
  }
}

/** What a standard deviation of such a quantity is. */
const differences: Readonly<Partial<Record<Dimension, Dimension>>> = {
  temperature: 'temperatureDifference',
  pressure: 'pressureDifference',
};

function readValue(
  { root, findings }: Reading,
  path: Path,
  written: string | number,
  dimension: Dimension,
  limits: Limits,
): number | null {
  const result = parseQuantity(String(written), dimension, limits);
  if (result.ok) return result.value;
  const { code, what, why, mend } = result;
  findings.error(placeOfPath(root, path), { code, what: `${path.join('.')}: ${what}`, why, mend });
  return null;
}

function notInOrder(path: Path, order: string): Omit<Fault, 'code'> {
  return {
    what: `the spread of ${path[1]} is not in order.`,
    why: `it needs ${order}; a mode left out is the value in the file`,
    mend: 'put the values in order',
  };
}

function outOfOrder({ root, findings }: Reading, path: Path, fault: Omit<Fault, 'code'>): null {
  findings.error(placeOfPath(root, path), { code: 'bad-spread', ...fault });
  return null;
}

function noSetting(path: string, known: readonly NumericSetting[]): Fault {
  const near = nearest(
    path,
    known.map((one) => one.path),
  );
  return {
    code: 'unknown-setting',
    what: `${path} cannot be spread.`,
    why:
      near === null
        ? 'it is no setting of this file that is a number and has a value, and no constant that acts in it'
        : `it is no number of this file; the nearest is ${near}`,
    mend:
      near === null
        ? 'write e.g. condenser.temperature, makeup.composition.Ar, reactions.synthesis.K or components.NH3.vapour_pressure'
        : `write ${near}`,
  };
}

function movedByAim(path: string, aim: Aim): Fault {
  return {
    code: 'bad-spread',
    what: `${path} is spread here and moved by the aim ${aim.name}.`,
    why: 'the aim finds its value in every case, whatever is drawn',
    mend: 'take out the spread, or the aim',
  };
}
