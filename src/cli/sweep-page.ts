import type { Flowsheet } from '../model/flowsheet.ts';
import { sweepPage } from '../sheets/study-page/sweep-page.ts';
import type { StudyReading } from '../study/reading.ts';
import type { PathTable } from '../study/sweep.ts';
import { joinedPaths } from '../study/swept-table.ts';
import { type Refusal, usageRefusal } from './refusal.ts';
import { pageOptions } from './study-page.ts';
import type { SweepJob } from './sweep-job.ts';
import type { TableSink, Write } from './table-file.ts';

export interface PageWanted {
  readonly flowsheet: Flowsheet;
  readonly job: SweepJob;
  readonly heads: readonly string[];
  /** limits whose figures are recorded though nobody asked */
  readonly added: readonly string[];
  readonly reading: StudyReading;
  /** of the first case */
  readonly warnings: readonly string[];
  readonly out: string;
  readonly write: Write;
}

/** Takes the pieces of a table and writes the page when all are there. */
export function createPageSink(wanted: PageWanted): TableSink {
  const { flowsheet, job, heads, added, reading, warnings, out, write } = wanted;
  const paths: PathTable[] = [];
  return {
    add: (path) => paths.push(path),
    end() {
      const swept = joinedPaths(job.axes, job.record, paths);
      const lines = [...reading.lines(), ...warnings.map((one) => `Warning of the first case: ${one}.`)];
      const content = { flowsheet, swept, heads, reading: lines, addedLimits: added };
      write(Buffer.from(sweepPage(content, pageOptions(out))));
    },
  };
}

export function noPageOfPart(path: string): Refusal {
  return usageRefusal(
    'bad-output',
    `${path} cannot hold a slice.`,
    'a page shows the whole of a sweep, and slices are joined as tables',
    'write the slices as --out p1.csv, or the page without --part',
    path,
  );
}
