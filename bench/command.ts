import { spawnSync } from 'node:child_process';
import { column, median, timeMs, title } from './measure.ts';
import { AMMONIA } from './shipped.ts';

const PAIRS = 15;
const CLI = 'dist/bench/command/cli.js';
/** What `balance` of the ammonia loop may take of the time of an empty node. */
const ALLOWED = 5;
const BALANCE = ['balance', AMMONIA];
const commands: readonly (readonly string[])[] = [
  ['--version'],
  ['--help'],
  ['data', 'NH3'],
  ['check', AMMONIA],
  BALANCE,
];
/** Prints the peak memory of a process when it ends [kB]. */
const PEAK = `data:text/javascript,process.on('exit',()=>console.error('peak '+process.resourceUsage().maxRSS))`;

/** Whole commands against an empty node, in pairs so that a busy machine troubles both alike; then their peak memory. */
export async function benchCommand(): Promise<void> {
  title(`Whole commands against node -e 0, median of ${PAIRS} pairs`);
  console.log(`  ${'command'.padEnd(44)}       ms  node ms    ratio`);
  for (const words of commands) {
    const pairs = Array.from({ length: PAIRS }, () => {
      const empty = timeMs(() => runNode(['-e', '0']));
      const full = timeMs(() => runNode([CLI, ...words]));
      return { empty, full, ratio: full / empty };
    });
    const of = (pick: (pair: (typeof pairs)[number]) => number) => median(pairs.map(pick));
    const ratio = of((pair) => pair.ratio);
    const verdict =
      words === BALANCE ? `  (at most ${ALLOWED}: ${ratio <= ALLOWED ? 'kept' : 'MISSED'})` : '';
    console.log(
      `  ${`looptally ${words.join(' ')}`.padEnd(44)} ${column(
        of((pair) => pair.full),
        8,
      )} ` +
        `${column(
          of((pair) => pair.empty),
          8,
        )} ${column(ratio, 8)}${verdict}`,
    );
  }
  title('Peak memory of a command');
  const empty = peakMB(['-e', '0']);
  const full = peakMB([CLI, ...BALANCE]);
  console.log(
    `  ${`looptally ${BALANCE.join(' ')}`.padEnd(44)} ${column(full, 5)} MB, node -e 0 ${column(empty, 5)} MB`,
  );
}

function runNode(words: readonly string[]): void {
  const { status } = spawnSync(process.execPath, words, { stdio: 'ignore' });
  if (status !== 0) throw new Error(`node ${words.join(' ')} ended with ${status}`);
}

function peakMB(words: readonly string[]): number {
  const { stderr } = spawnSync(process.execPath, ['--import', PEAK, ...words], { encoding: 'utf8' });
  const kB = /^peak (\d+)$/m.exec(stderr);
  if (!kB) throw new Error(`node ${words.join(' ')} did not tell its memory: ${stderr}`);
  return Number(kB[1]) / 1024;
}
