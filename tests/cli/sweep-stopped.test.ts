import { spawn, spawnSync } from 'node:child_process';
import {
  closeSync,
  existsSync,
  openSync,
  readFileSync,
  rmSync,
  statSync,
  truncateSync,
  writeFileSync,
  writeSync,
} from 'node:fs';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { beforeAll, describe, expect, test } from 'vitest';
import { commandLine } from './looptally.ts';

const { run, folder, program } = commandLine();
const at = (name: string) => join(folder(), name);
const reference = readFileSync(new URL('../../flowsheets/reference-loop.yaml', import.meta.url), 'utf8');
const sweep = (name: string, ...more: string[]) => [
  'sweep',
  'loop.yaml',
  '--over',
  'condenser.temperature=-25 degC..10 degC:64',
  '--over',
  'purge.fractions.bleed=0.5 %..10 %:40',
  '--out',
  name,
  '--quiet',
  ...more,
];
let undisturbed: Buffer;

beforeAll(() => {
  writeFileSync(at('loop.yaml'), reference);
  expect(run(sweep('undisturbed.csv')).code).toBe(0);
  undisturbed = readFileSync(at('undisturbed.csv'));
}, 120_000);

/** Numbers that look random and are the same each time. */
function createDelays(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };
}

test('killed twenty times at random moments and resumed, it makes the same bytes', async () => {
  const next = createDelays(20261201);
  let killed = 0;
  while (killed < 20) {
    const size = existsSync(at('killed.csv.part')) ? statSync(at('killed.csv.part')).size : 0;
    const workers = String(1 + (killed % 2));
    const child = spawn(
      process.execPath,
      [program(), ...sweep('killed.csv', '--resume', '--workers', workers)],
      {
        cwd: folder(),
        stdio: 'ignore',
      },
    );
    const gone = new Promise((resolve) => child.on('exit', resolve));
    // Every other time as soon as it has written something, else whenever.
    const early = killed % 3 === 0;
    const until = performance.now() + (early ? 400 * next() : 20_000);
    while (performance.now() < until && child.exitCode === null) {
      const now = existsSync(at('killed.csv.part')) ? statSync(at('killed.csv.part')).size : 0;
      if (!early && now > size) break;
      await pause(2);
    }
    if (!early) await pause(25 * next());
    child.kill('SIGKILL');
    await gone;
    expect(existsSync(at('killed.csv'))).toBe(false);
    killed++;
  }
  expect(statSync(at('killed.csv.part')).size).toBeGreaterThan(10_000);
  expect(run(sweep('killed.csv', '--resume'))).toMatchObject({ code: 0, err: '' });
  expect(readFileSync(at('killed.csv')).equals(undisturbed)).toBe(true);
  expect(existsSync(at('killed.csv.part'))).toBe(false);
}, 240_000);

describe('a stopped sweep', () => {
  test('that may not write any further says so, keeps what is done and goes on where there is room', () => {
    // The limit on the size of a file stands in for a disk that is full: a write ends in the middle of a record.
    const words = sweep('full.csv', '--workers', '1')
      .map((word) => `'${word}'`)
      .join(' ');
    const full = (more: string) =>
      spawnSync('bash', ['-c', `ulimit -f 60; exec '${process.execPath}' '${program()}' ${words} ${more}`], {
        cwd: folder(),
        encoding: 'utf8',
      });
    const { status, stderr } = full('');
    expect({ status, made: existsSync(at('full.csv')) }).toEqual({ status: 2, made: false });
    expect(stderr.replace(/ {3}1 \| .*\n.*\n/, '')).toMatchInlineSnapshot(`
      "command line:1:131 error cannot-write
        full.csv.part cannot be written.
        why:  a file may not grow any larger here; what is done so far is kept
        mend: make room and repeat the command with --resume

      1 error
      "
    `);
    expect(statSync(at('full.csv.part')).size).toBeGreaterThan(50 * 1024);
    expect(full('--resume').status).toBe(2);
    expect(run(sweep('full.csv', '--resume'))).toMatchObject({ code: 0, err: '' });
    expect(readFileSync(at('full.csv')).equals(undisturbed)).toBe(true);
  });

  test('on a full disk does the same', ({ skip }) => {
    const disk = at('disk');
    spawnSync('mkdir', [disk]);
    if (spawnSync('mount', ['-t', 'tmpfs', '-o', 'size=96k', 'tmpfs', disk]).status !== 0)
      skip('no small disk can be mounted here');
    try {
      const small = run(sweep('disk/full.csv'));
      expect(small.code).toBe(2);
      expect(small.err).toContain('There is no room for disk/full.csv.');
      expect(existsSync(at('disk/full.csv.part'))).toBe(false);
    } finally {
      spawnSync('umount', [disk]);
    }
  });

  const stop = (name: string) => {
    const { status } = spawnSync(
      'bash',
      [
        '-c',
        `ulimit -f 40; exec '${process.execPath}' '${program()}' ${sweep(name)
          .map((word) => `'${word}'`)
          .join(' ')}`,
      ],
      { cwd: folder() },
    );
    expect(status).toBe(2);
  };

  test('is not begun anew by mistake', () => {
    stop('again.csv');
    const before = readFileSync(at('again.csv.part'));
    const { code, err } = run(sweep('again.csv'));
    expect(code).toBe(2);
    expect(shortened(err)).toMatchInlineSnapshot(`
      "command line error unfinished-sweep
        again.csv.part holds a sweep that was not finished.
        why:  it would be lost
        mend: add --resume to go on with it, or delete it to begin anew

      1 error
      "
    `);
    expect(readFileSync(at('again.csv.part')).equals(before)).toBe(true);
  });

  test('of another flowsheet or with other options is refused, and which they are is said', () => {
    stop('other.csv');
    writeFileSync(at('loop.yaml'), reference.replace('450 degC', '451 degC'));
    const flowsheet = run(sweep('other.csv', '--resume'));
    writeFileSync(at('loop.yaml'), reference);
    expect(flowsheet.code).toBe(2);
    expect(shortened(flowsheet.err)).toMatchInlineSnapshot(`
      "command line error other-sweep
        other.csv.part belongs to another sweep.
        why:  the flowsheet has changed since
        mend: repeat the command with the flowsheet and options it was begun with, or delete it to begin anew

      1 error
      "
    `);
    const options = run(
      sweep('other.csv', '--resume', '--record', 'figures.recycle_ratio', '--set', 'gas=pr'),
    );
    expect(options.code).toBe(2);
    expect(shortened(options.err)).toMatchInlineSnapshot(`
      "command line error other-sweep
        other.csv.part belongs to another sweep.
        why:  --set was nothing, and is gas=pr; --record was figures.production_t_d, figures.overall_yield.value, figures.recycle_ratio, figures.purge.fraction_of_makeup, figures.power_kW.total, and is figures.recycle_ratio
        mend: repeat the command with the flowsheet and options it was begun with, or delete it to begin anew

      1 error
      "
    `);
  });

  test('whose side file was damaged in the middle loses only what stands behind the damage', () => {
    stop('damaged.csv');
    const file = openSync(at('damaged.csv.part'), 'r+');
    writeSync(file, Buffer.from('damage'), 0, 6, 20_000);
    closeSync(file);
    expect(run(sweep('damaged.csv', '--resume')).code).toBe(0);
    expect(readFileSync(at('damaged.csv')).equals(undisturbed)).toBe(true);
  });

  test.each([0, 1, 100])('after %i bytes begins anew', (bytes) => {
    stop('begun.csv');
    truncateSync(at('begun.csv.part'), bytes);
    expect(run(sweep('begun.csv', '--resume'))).toMatchObject({ code: 0, err: '' });
    expect(readFileSync(at('begun.csv')).equals(undisturbed)).toBe(true);
  });

  test('whose side file is something else is left alone', () => {
    writeFileSync(at('strange.csv.part'), 'my own notes\n');
    const { code, err } = run(sweep('strange.csv', '--resume'));
    expect(code).toBe(2);
    expect(shortened(err)).toMatchInlineSnapshot(`
      "command line error other-sweep
        strange.csv.part is no unfinished sweep.
        why:  it does not begin as one
        mend: delete it, or give --out another name

      1 error
      "
    `);
    expect(readFileSync(at('strange.csv.part'), 'utf8')).toBe('my own notes\n');
    rmSync(at('strange.csv.part'));
  });
});

/** A message without the long line it quotes. */
function shortened(message: string): string {
  return message.replace(/^.*\|.*\n/gm, '').replace(/^command line:\d+:\d+/gm, 'command line');
}
