import type { Command } from 'commander';
import { command } from './common-options.ts';
import { openSlice } from './open-slice.ts';
import { usageRefusal, usageRefusals } from './refusal.ts';
import type { Slice } from './slice-file.ts';
import { isPage } from './study-page.ts';
import { writeTrouble } from './sweep-resume.ts';
import { tableKind, tableKinds, writeRenamed } from './table-file.ts';
import { printJson, say } from './terminal.ts';
import { checkOutputs, isSameFile } from './write-files.ts';

interface GatherOptions {
  readonly out: string;
  readonly json?: boolean;
  readonly quiet?: boolean;
}

/** `looptally gather SLICES --out TABLE`: the slices of a sweep joined to the table that one machine would have made. */
export function gatherCommand(): Command {
  return command('gather', 'Joins the slices of a sweep, given in any order, to the whole table.', [
    'looptally new ammonia --out loop.yaml',
    "looptally sweep loop.yaml --over 'purge.fractions.bleed=1 %..10 %:40' --part 1/2 --out p1.csv",
    "looptally sweep loop.yaml --over 'purge.fractions.bleed=1 %..10 %:40' --part 2/2 --out p2.csv",
    'looptally gather p1.csv p2.csv --out table.csv',
  ])
    .argument('<slices...>', 'files made by looptally sweep --part')
    .requiredOption('--out <file>', 'the table, of the same kind as the slices')
    .action(runGather);
}

async function runGather(paths: readonly string[], { out, json, quiet }: GatherOptions): Promise<void> {
  for (const path of paths) checkOutputs([out], path);
  checkTwice(paths);
  checkKinds(paths, out);
  const slices: Slice[] = [];
  for (const path of paths) slices.push(await openSlice(path));
  slices.sort((a, b) => a.mark.first - b.mark.first || a.mark.last - b.mark.last);
  checkFit(slices);
  try {
    if (tableKind(out) === '.parquet') {
      const { joinParquet } = await import('./parquet-slices.ts');
      await joinParquet(slices, out);
    } else {
      await writeRenamed(out, async (write) => {
        write(Buffer.from(slices[0]!.head));
        for (const slice of slices) slice.copyRows(write);
      });
    }
  } catch (error) {
    throw writeTrouble(out, error, false);
  }
  const { total } = slices[0]!.mark;
  if (json) printJson({ table: out, cases: total, slices: paths.length });
  else if (!quiet)
    say(`${out}: ${total} cases from ${paths.length} ${paths.length === 1 ? 'slice' : 'slices'}`);
}

/** One file named twice is a slip of the fingers, and the slice that was meant instead will be missing. */
function checkTwice(paths: readonly string[]): void {
  const again = paths.find((path, k) => paths.slice(0, k).some((before) => isSameFile(before, path)));
  if (again === undefined) return;
  throw usageRefusal(
    'slices-overlap',
    `${again} is named twice.`,
    'its rows would be in the table twice',
    'name each slice once; perhaps another one was meant',
    again,
  );
}

function checkKinds(paths: readonly string[], out: string): void {
  const kind = tableKind(out);
  if (isPage(out)) {
    throw usageRefusal(
      'bad-output',
      `${out} cannot be made from slices.`,
      'a page needs the flowsheet, which slices do not hold',
      'write e.g. --out table.csv; looptally sweep without --part writes the page',
      out,
    );
  }
  if (!tableKinds.has(kind)) {
    throw usageRefusal(
      'bad-output',
      `${out} has no ending that tells what to write.`,
      `a table is written as ${[...tableKinds.keys()].join(', ')}`,
      'write e.g. --out table.csv',
      out,
    );
  }
  const other = paths.find((path) => tableKind(path) !== kind);
  if (other === undefined) return;
  throw usageRefusal(
    'bad-output',
    `${other} and ${out} are not of one kind.`,
    'slices are joined as they are',
    `give --out the ending ${tableKind(other) || 'of the slices'}`,
    other,
  );
}

/** Slices of one sweep, all rows of it, none twice. */
function checkFit(slices: readonly Slice[]): void {
  const [first] = slices as [Slice];
  const stranger = slices.find(({ mark, head }) => mark.sweep !== first.mark.sweep || head !== first.head);
  if (stranger !== undefined) {
    throw usageRefusal(
      'other-sweep',
      `${stranger.path} and ${first.path} are slices of different sweeps.`,
      'they were made from another flowsheet, by other options or by another version',
      'calculate them again with one command',
      stranger.path,
    );
  }
  let next = 1;
  let before = first.path;
  const faults = [];
  for (const { path, mark } of slices) {
    if (mark.first < next) {
      faults.push({
        code: 'slices-overlap',
        what: `${path} and ${before} overlap.`,
        why: `${rows(mark.first, Math.min(next - 1, mark.last))} ${mark.first === next - 1 ? 'is' : 'are'} in both`,
        mend: 'leave one of them out',
        at: path,
      });
    } else if (mark.first > next) faults.push(missing(next, mark.first - 1, path));
    next = Math.max(next, mark.last + 1);
    before = path;
  }
  if (next <= first.mark.total) faults.push(missing(next, first.mark.total, null));
  if (faults.length > 0) throw usageRefusals(faults);
}

function missing(from: number, to: number, at: string | null) {
  return {
    code: 'slices-missing',
    what: `No slice holds ${rows(from, to)}.`,
    why: 'a table with a gap would pass for the whole',
    mend: 'name the slice that holds them, or calculate it',
    at,
  };
}

function rows(from: number, to: number): string {
  return from === to ? `row ${from}` : `rows ${from} to ${to}`;
}
