import { printedSweep } from '../sheets/printed-sweep.ts';
import { sweepJsonRows } from '../sheets/sweep.ts';
import type { PathTable } from '../study/sweep.ts';
import { print } from './terminal.ts';

/** What stands behind the rows. */
interface End {
  readonly cases: number;
  readonly not_converged: number;
  readonly note: readonly string[];
}

/** The table on standard output, as it comes: aligned for reading, or one JSON value. */
export function printedTable(heads: readonly string[], settings: number, json: boolean) {
  return json ? asJson(heads) : asText(heads, settings);
}

/** On a terminal the table fits its width; what is piped into something else has its names in the heads. */
function asText(heads: readonly string[], settings: number) {
  const width = process.stdout.isTTY === true ? process.stdout.columns : Number.POSITIVE_INFINITY;
  const printed = printedSweep(heads, settings, width);
  print(printed.before);
  return {
    add: (table: PathTable) => print(printed.rows(table)),
    end: ({ note }: End) => {
      print(printed.after());
      if (note.length > 0) print(`\n${note.map((line) => `${line}\n`).join('')}`);
    },
  };
}

function asJson(heads: readonly string[]) {
  let between = '\n    ';
  print(`{\n  "columns": ${JSON.stringify(heads)},\n  "rows": [`);
  return {
    add(table: PathTable) {
      for (const row of sweepJsonRows(table)) {
        print(`${between}${row}`);
        between = ',\n    ';
      }
    },
    end(end: End) {
      const rest = JSON.stringify(end, null, 2).slice(1);
      print(`\n  ],${rest}\n`);
    },
  };
}
