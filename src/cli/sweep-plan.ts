import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { SET_FILE } from '../flowsheet/changes.ts';
import type { Fault } from '../flowsheet/findings.ts';
import { numericSettings } from '../flowsheet/numeric-settings.ts';
import { readFlowsheet } from '../flowsheet/read.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import { type Axis, axisPieces, firstValue, readAxis } from '../study/axis.ts';
import { gridSize } from '../study/grid.ts';
import { Refusal, type Source, usageDiagnostic } from './refusal.ts';

/** A setting with the text of its values, and where faults in that text are told. */
export interface AxisWanted {
  readonly path: string;
  readonly text: string;
  /** a part of the text, or all of it where length is left out */
  readonly fault: (fault: Fault, offset?: number, length?: number) => Diagnostic;
  readonly source: Source;
}

export interface PlanContext {
  readonly source: Source;
  readonly set: readonly string[];
  readonly case: string | null;
}

/** Points of a grid that nobody needs to think about twice, and that nobody can mean. */
const LARGE = 1_000_000;
const TOO_LARGE = 1e12;
/** The size of the file was judged when it was opened. */
const JUDGED = Number.POSITIVE_INFINITY;
/** Corners of a grid that are tried before it is begun. */
const CORNERS = 32;

/** The settings of a sweep as the command line gives them: `PATH=VALUES`. */
export function typedAxes(over: readonly string[], commandLine: Source): AxisWanted[] {
  return over.map((word) => {
    const at = word.indexOf('=');
    const start = at + 1;
    const fault: AxisWanted['fault'] = (one, offset = -start, length = word.length) =>
      usageDiagnostic({ ...one, at: word, offset: start + offset, length });
    if (at < 1) {
      throw new Refusal(
        [
          fault({
            code: 'bad-range',
            what: `"${word}" is no setting with values.`,
            why: 'a sweep goes over PATH=VALUES',
            mend: "write e.g. --over 'condenser.temperature=-25 degC..10 degC:8'",
          }),
        ],
        commandLine,
      );
    }
    return { path: word.slice(0, at).trim(), text: word.slice(start), fault, source: commandLine };
  });
}

/**
 * Check the settings of a sweep and their values against the flowsheet, all that can be told before the first case: names,
 * units, ranges, the size of the grid, and the file read again at its corners.
 *
 * @throws Refusal
 */
export async function planAxes(
  wanted: readonly AxisWanted[],
  context: PlanContext,
  sizeIsMeant: boolean,
): Promise<readonly Axis[]> {
  refuse(repeated(wanted));
  refuse(tooManySettings(wanted));
  const flowsheet = await readAt(
    wanted,
    wanted.map(({ text }) => firstValue(text) ?? firstPiece(text)),
    context,
  );
  const settings = numericSettings(flowsheet);
  const faults: Told[] = [];
  const axes: Axis[] = [];
  for (const axis of wanted) {
    const setting = settings.find(({ path }) => path === axis.path);
    if (setting === undefined) {
      faults.push({ axis, diagnostic: axis.fault(notANumber(axis.path)) });
      continue;
    }
    const aim = flowsheet.aims.find(({ move }) => move === axis.path);
    if (aim !== undefined) faults.push({ axis, diagnostic: axis.fault(aimed(axis.path, aim.name)) });
    const read = readAxis(axis.path, axis.text, setting.dimension);
    if (!('code' in read)) axes.push(read);
    else faults.push({ axis, diagnostic: axis.fault(read, read.offset, read.length) });
  }
  refuse(faults);
  refuse(tooLarge(wanted, axes, sizeIsMeant));
  for (const corner of cornersOf(axes)) {
    await readAt(
      wanted,
      axes.map(({ numbers, unit }, a) => `${numbers[corner[a]!]!} ${unit}`.trim()),
      context,
    );
  }
  return axes;
}

interface Told {
  readonly axis: AxisWanted;
  readonly diagnostic: Diagnostic;
}

function refuse(faults: readonly Told[]): void {
  const [first] = faults;
  if (first === undefined) return;
  const same = faults.filter(({ axis }) => axis.source === first.axis.source);
  throw new Refusal(
    same.map(({ diagnostic }) => diagnostic),
    first.axis.source,
  );
}

/** Read the file with the settings at some values; what is wrong with them is told where they were written. */
async function readAt(
  wanted: readonly AxisWanted[],
  values: readonly string[],
  { source, set, case: name }: PlanContext,
): Promise<Flowsheet> {
  const changes = wanted.map(({ path }, a) => `${path}=${values[a]}`);
  const read = await readFlowsheet(source.text, {
    file: source.name,
    set: [...set, ...changes],
    case: name,
    maxBytes: JUDGED,
  });
  if (read.flowsheet !== null) return read.flowsheet;
  const errors = read.diagnostics.filter(({ severity }) => severity === 'error');
  const ours = errors.flatMap((diagnostic): Told[] => {
    const axis =
      diagnostic.where.file === SET_FILE ? wanted[diagnostic.where.line - 1 - set.length] : undefined;
    return axis === undefined ? [] : [{ axis, diagnostic: axis.fault(diagnostic) }];
  });
  refuse(ours);
  throw new Refusal(errors, source);
}

/** Each corner as one index per axis; of many axes only those where a single one is at its other end. */
function cornersOf(axes: readonly Axis[]): number[][] {
  const ends = axes.map(({ numbers, values }) => [lowest(values), highest(values), numbers.length] as const);
  if (2 ** axes.length <= CORNERS) {
    return Array.from({ length: 2 ** axes.length }, (_, c) => ends.map((end, a) => end[(c >> a) & 1]!));
  }
  const low = ends.map(([least]) => least);
  return [low, ...ends.map((end, a) => low.map((index, b) => (a === b ? end[1] : index)))];
}

function lowest(values: Float64Array): number {
  return values.reduce((best, value, k) => (value < values[best]! ? k : best), 0);
}

function highest(values: Float64Array): number {
  return values.reduce((best, value, k) => (value > values[best]! ? k : best), 0);
}

function firstPiece(text: string): string {
  return axisPieces(text)[0]!.text || '""';
}

/** More settings than a grid of any size can have two values of each. */
const MOST_SETTINGS = 30;

function tooManySettings(wanted: readonly AxisWanted[]): Told[] {
  const axis = wanted[MOST_SETTINGS];
  if (axis === undefined) return [];
  const fault = {
    code: 'grid-too-large',
    what: `a grid over ${wanted.length} settings is too large.`,
    why: `with two values of each it has more points than can ever be calculated; at most ${MOST_SETTINGS} settings are taken`,
    mend: 'sweep a few settings at a time; looptally levers tells which ones matter',
  };
  return [{ axis, diagnostic: axis.fault(fault) }];
}

function tooLarge(wanted: readonly AxisWanted[], axes: readonly Axis[], sizeIsMeant: boolean): Told[] {
  const size = gridSize(axes);
  const axis = wanted[0]!;
  const counts = axes.map(({ numbers }) => numbers.length).join(' x ');
  if (size > TOO_LARGE) {
    const what = `a grid of ${size.toPrecision(3)} points is too large.`;
    const why = `${counts} points are more than can be calculated; at most ${TOO_LARGE.toExponential(0)} are taken`;
    return [
      { axis, diagnostic: axis.fault({ code: 'grid-too-large', what, why, mend: 'take fewer values' }) },
    ];
  }
  if (size <= LARGE || sizeIsMeant) return [];
  const what = `the grid has ${size} points.`;
  const why = `${counts} points are more than a million, which is seldom meant`;
  return [
    {
      axis,
      diagnostic: axis.fault({
        code: 'grid-too-large',
        what,
        why,
        mend: 'take fewer values, or add --yes if it is meant',
      }),
    },
  ];
}

function repeated(wanted: readonly AxisWanted[]): Told[] {
  return wanted.flatMap((axis, a) => {
    if (wanted.findIndex(({ path }) => path === axis.path) === a) return [];
    const fault = {
      code: 'duplicate-name',
      what: `${axis.path} is swept twice.`,
      why: 'a setting has one value in a case',
      mend: 'write all its values behind one =',
    };
    return [{ axis, diagnostic: axis.fault(fault) }];
  });
}

function notANumber(path: string): Fault {
  return {
    code: 'unknown-setting',
    what: `${path} cannot be swept.`,
    why: 'a sweep moves settings of blocks and feeds that are one number',
    mend: 'write a path such as condenser.temperature',
  };
}

function aimed(path: string, aim: string): Fault {
  return {
    code: 'set-and-aimed',
    what: `${path} is swept here and moved by the aim ${aim}.`,
    why: 'the aim finds its value in every case',
    mend: `sweep another setting, or take the aim out of the file`,
  };
}
