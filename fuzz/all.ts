import { fork } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { availableParallelism, tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { makeCase } from './cases.ts';
import { readCorpus } from './corpus.ts';
import { createTables } from './judge-tables.ts';
import { runCases } from './run-cases.ts';
import { nothing, type Summary, together, withCase } from './summary.ts';

/**
 * npm run fuzz -- [--minutes M | --cases N] [--seed S] [--keep FOLDER] [--processes P]
 *
 * Each process makes every P-th case, with a watchdog of its own. Exit code 1 where the contract was broken.
 */
const { values } = parseArgs({
  options: {
    minutes: { type: 'string' },
    cases: { type: 'string', default: '2000' },
    seed: { type: 'string', default: '20261201' },
    keep: { type: 'string', default: 'fuzz-findings' },
    processes: { type: 'string', default: String(availableParallelism()) },
    share: { type: 'string' },
  },
});
const FLOWSHEETS = 'flowsheets';
const seed = Number(values.seed);
const processes = Number(values.processes);
const scratch = mkdtempSync(join(tmpdir(), 'looptally-fuzz-'));
try {
  if (values.share === undefined) await lead();
  else await follow(Number(values.share));
} finally {
  rmSync(scratch, { recursive: true, force: true });
}

/** One of the processes: its share of the cases, and what they came to for the process above. */
async function follow(share: number): Promise<void> {
  const until = performance.now() + 60e3 * Number(values.minutes ?? Number.POSITIVE_INFINITY);
  const most =
    values.minutes === undefined
      ? Math.ceil((Number(values.cases) - share) / processes)
      : Number.POSITIVE_INFINITY;
  let summary: Summary = nothing;
  await runCases({
    entry: fileURLToPath(new URL('./worker.mjs', import.meta.url)),
    flowsheets: FLOWSHEETS,
    scratch,
    seed,
    from: share,
    step: processes,
    more: (done) => done < most && performance.now() < until,
    take: (judged) => {
      summary = withCase(summary, judged);
      if (judged.finding !== null) console.error(`case ${judged.index}: ${judged.finding.split('\n')[0]}`);
    },
  });
  process.send!(summary);
}

async function lead(): Promise<void> {
  const shares = Array.from({ length: processes }, (_, share) => share);
  const parts = await Promise.all(shares.map(summaryOf));
  const all = parts.reduce(together, nothing);
  console.log(`${all.cases} cases, seed ${seed}`);
  for (const [name, count] of Object.entries(all.outcomes).sort())
    console.log(`  ${name.padEnd(30)} ${count}`);
  if (all.slowest)
    console.log(`slowest: case ${all.slowest.index} (${all.slowest.kind}), ${all.slowest.ms.toFixed(0)} ms`);
  console.log(`${all.findings.length} findings`);
  if (all.findings.length === 0) return;
  await keep(all);
  process.exitCode = 1;
}

function summaryOf(share: number): Promise<Summary> {
  return new Promise((resolve, reject) => {
    const child = fork(fileURLToPath(import.meta.url), [...process.argv.slice(2), '--share', String(share)]);
    let summary: Summary | null = null;
    child.on('message', (message) => {
      summary = message as Summary;
    });
    child.on('exit', (code) =>
      summary === null ? reject(new Error(`a process ended with ${code}`)) : resolve(summary),
    );
  });
}

/** Each finding as the file it was found with, and beside it what happened. */
async function keep({ findings }: Summary): Promise<void> {
  mkdirSync(values.keep, { recursive: true });
  const bench = { corpus: readCorpus(FLOWSHEETS), tables: await createTables(scratch), scratch };
  for (const { index, finding, ms } of findings) {
    const { kind, content, ending, beside } = makeCase(bench, seed, index);
    const name = join(values.keep, `${seed}-${index}`);
    writeFileSync(`${name}${ending}`, content);
    writeFileSync(`${name}.finding`, `${kind} ${beside}\n${ms.toFixed(0)} ms\n${finding}\n`);
  }
  console.log(`kept in ${values.keep}`);
}
