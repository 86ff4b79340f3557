import { type ChildProcess, spawn, spawnSync } from 'node:child_process';
import {
  chmodSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { afterEach, beforeAll, describe, expect, test } from 'vitest';
import { commandLine } from './looptally.ts';

const { run, folder, program } = commandLine();
const at = (name: string) => join(folder(), name);
const shipped = (name: string) =>
  readFileSync(new URL(`../../flowsheets/${name}.yaml`, import.meta.url), 'utf8');

beforeAll(() => {
  writeFileSync(at('loop.yaml'), shipped('reference-loop'));
});

/** A sweep that does not come to its end before it is stopped: 64 x 600 cases. */
const sweep = (name: string, ...more: string[]) => [
  ...['sweep', 'loop.yaml', '--over', 'condenser.temperature=-25 degC..10 degC:64'],
  ...['--over', 'purge.fractions.bleed=0.5 %..10 %:600', '--out', name, ...more],
];
const short = (name: string, ...more: string[]) => [
  ...['sweep', 'loop.yaml', '--over', 'condenser.temperature=-25 degC..10 degC:16', '--out', name, ...more],
];

interface Ended {
  readonly code: number | null;
  readonly signal: NodeJS.Signals | null;
  readonly err: string;
}

function begin(words: readonly string[]): { readonly child: ChildProcess; readonly ended: Promise<Ended> } {
  const child = spawn(process.execPath, [program(), ...words], {
    cwd: folder(),
    stdio: ['ignore', 'ignore', 'pipe'],
  });
  let err = '';
  child.stderr!.on('data', (text) => {
    err += text;
  });
  const ended = new Promise<Ended>((resolve) =>
    child.on('close', (code, signal) => resolve({ code, signal, err })),
  );
  return { child, ended };
}

async function until(what: () => boolean): Promise<void> {
  while (!what()) await pause(5);
}

const sizeOf = (name: string) => statSync(at(name), { throwIfNoEntry: false })?.size ?? 0;

describe('Ctrl-C and a system that shuts down', () => {
  test.each([
    ['SIGINT', '1', 130, 'interrupted'],
    ['SIGTERM', '2', 143, 'asked to stop'],
  ] as const)(
    '%s to a sweep with --workers %s: it says what is kept, and can be gone on with',
    async (signal, workers, code, word) => {
      const name = `${signal}.csv`;
      const { child, ended } = begin(sweep(name, '--workers', workers));
      await until(() => sizeOf(`${name}.part`) > 20_000);
      child.kill(signal);
      expect(await ended).toEqual({
        code,
        signal: null,
        err: `looptally: ${word}: what is done so far is kept in ${name}.part; the same command with --resume goes on with it\n`,
      });
      expect(readdirSync(folder()).filter((file) => file.includes(name))).toEqual([`${name}.part`]);
      // Whole: every byte behind the head belongs to a record, as the next run finds when it cuts off what does not.
      const kept = readFileSync(at(`${name}.part`));
      const next = begin(sweep(name, '--resume', '--workers', '1'));
      await until(() => sizeOf(`${name}.part`) > kept.length);
      next.child.kill('SIGKILL');
      await next.ended;
      expect(
        readFileSync(at(`${name}.part`))
          .subarray(0, kept.length)
          .equals(kept),
      ).toBe(true);
    },
  );

  test.each(['SIGINT', 'SIGTERM'] as const)(
    '%s to a balance ends it, and nothing is left',
    async (signal) => {
      const { child, ended } = begin(['sheet', 'loop.yaml', '--out', 'ended.md', '--out', 'ended.svg']);
      child.kill(signal);
      expect(await ended).toEqual({ code: null, signal, err: '' });
      expect(readdirSync(folder()).filter((file) => file.includes('ended'))).toEqual([]);
    },
  );
});

describe('two runs that write one file', () => {
  test('the second sweep is refused while the first is at work', async () => {
    const { child, ended } = begin(sweep('held.csv', '--quiet'));
    await until(() => existsSync(at('held.csv.part')));
    const lock = JSON.parse(readFileSync(at('held.csv.part.lock'), 'utf8'));
    expect(lock.pid).toBe(child.pid);
    const { code, err } = run(sweep('held.csv', '--resume'));
    expect(code).toBe(2);
    expect(shortened(err)).toBe(`command line error held-by-another
  held.csv is being written by another run.
  why:  held.csv.part.lock says that process ${lock.pid} on ${lock.host} has it; two runs would spoil each other's work
  mend: wait for it, or name another file; if no such run is there any more, delete held.csv.part.lock

1 error
`);
    child.kill('SIGKILL');
    await ended;
    expect(existsSync(at('held.csv.part.lock'))).toBe(true);
    const next = begin(sweep('held.csv', '--resume'));
    await until(
      () => Number(existsSync(at('held.csv.part.lock'))) === 1 && lockOf('held.csv').pid === next.child.pid,
    );
    next.child.kill('SIGTERM');
    expect((await next.ended).err).toContain(
      `held.csv.part.lock was left by process ${lock.pid}, which is gone: taken over\n`,
    );
    expect(existsSync(at('held.csv.part.lock'))).toBe(false);
  });

  test('a lock of another machine, and one that cannot be read, are left alone', () => {
    for (const text of [JSON.stringify({ pid: 1, host: 'elsewhere', began: null }), '']) {
      writeFileSync(at('far.csv.part.lock'), text);
      expect(run(short('far.csv'))).toMatchObject({ code: 2, out: '' });
      expect(readFileSync(at('far.csv.part.lock'), 'utf8')).toBe(text);
    }
    rmSync(at('far.csv.part.lock'));
  });

  test('a number of a process that was given again is not taken for the run that is gone', ({ skip }) => {
    if (!existsSync('/proc/self/stat')) skip('the system does not tell when a process began');
    const { hostname } = JSON.parse(
      spawnSync(process.execPath, ['-p', 'JSON.stringify({hostname:os.hostname()})'], { encoding: 'utf8' })
        .stdout,
    );
    writeFileSync(
      at('again.csv.part.lock'),
      JSON.stringify({ pid: process.pid, host: hostname, began: '1' }),
    );
    expect(run(short('again.csv')).err).toContain('which is gone: taken over');
    expect(existsSync(at('again.csv'))).toBe(true);
  });

  test('of two sheets at once one is there, whole', async () => {
    expect(run(['sheet', 'loop.yaml', '--out', 'alone.md']).code).toBe(0);
    const both = [1, 2].map(() => begin(['sheet', 'loop.yaml', '--out', 'twice.md', '--quiet']));
    for (const { ended } of both) expect(await ended).toEqual({ code: 0, signal: null, err: '' });
    expect(readFileSync(at('twice.md'), 'utf8')).toBe(readFileSync(at('alone.md'), 'utf8'));
    expect(readdirSync(folder()).filter((file) => file.includes('twice'))).toEqual(['twice.md']);
  });
});

function lockOf(name: string): { readonly pid?: number } {
  try {
    return JSON.parse(readFileSync(at(`${name}.part.lock`), 'utf8'));
  } catch {
    return {};
  }
}

describe('a worker thread that dies', () => {
  /** The shipped command line with another worker: it works so many paths, then does something else. */
  const withWorker = (name: string, then: string) => {
    const copy = at(name);
    spawnSync('cp', ['-r', program().replace(/cli\.js$/, ''), copy]);
    const worker = join(copy, 'sweep-worker.js');
    writeFileSync(
      worker,
      `import { parentPort } from 'node:worker_threads';\nlet paths = 0;\nparentPort.on('message', () => { if (++paths > 3) { ${then} } });\n${readFileSync(worker, 'utf8').replace(/^#!.*\n/, '')}`,
    );
    const words = sweep(`${name}.csv`, '--workers', '2', '--quiet');
    // Little room, so that it is soon used up.
    const node = ['--max-old-space-size=80', join(copy, 'cli.js')];
    return spawnSync(process.execPath, [...node, ...words], { cwd: folder(), encoding: 'utf8' });
  };

  test.each([
    ['ends', 'process.exit(7)', 'it ended by itself with code 7'],
    ['hoards', 'const all = []; for (;;) all.push(new Array(1e6).fill(paths));', 'it ran out of memory'],
  ])(
    'because it %s: told with what is kept, exit code 1, and the sweep can be gone on with',
    (name, then, why) => {
      const { status, stderr } = withWorker(name, then);
      // Node itself writes of the memory.
      expect({ status, err: shortened(stderr).slice(-message(name, why).length) }).toEqual({
        status: 1,
        err: message(name, why),
      });
      expect(sizeOf(`${name}.csv.part`)).toBeGreaterThan(1000);
      expect(existsSync(at(`${name}.csv`))).toBe(false);
      expect(existsSync(at(`${name}.csv.part.lock`))).toBe(false);
    },
  );

  const message = (name: string, why: string) => `command line error worker-lost
  A thread of this sweep ended before its work was done.
  why:  ${why}; what is done so far is kept in ${name}.csv.part
  mend: repeat the command with --resume, and fewer --workers

1 error
`;
});

describe('a closed pipe', () => {
  test.each([
    'balance loop.yaml',
    'balance loop.yaml --json',
    `${short('')
      .slice(0, 4)
      .map((word) => `'${word}'`)
      .join(' ')}`,
  ])('%s | head -1 ends without a word', (words) => {
    const { stdout, stderr } = spawnSync(
      'bash',
      ['-c', `'${process.execPath}' '${program()}' ${words} | head -1`],
      {
        cwd: folder(),
        encoding: 'utf8',
      },
    );
    expect(stdout.split('\n')).toHaveLength(2);
    expect(stderr).toBe('');
  });
});

describe('places where nothing can be written', () => {
  let mounted = '';
  afterEach(() => {
    if (mounted !== '') spawnSync('umount', [mounted]);
    mounted = '';
  });
  const mount = (name: string, options: string): boolean => {
    mkdirSync(at(name), { recursive: true });
    const isThere = spawnSync('mount', ['-t', 'tmpfs', '-o', options, 'tmpfs', at(name)]).status === 0;
    if (isThere) mounted = at(name);
    return isThere;
  };

  test('a full disk: no sheet, nothing half-written, and the old one as it was', ({ skip }) => {
    if (!mount('full', 'size=12k')) skip('no small disk can be mounted here');
    writeFileSync(at('full/sheet.md'), 'the old one');
    writeFileSync(at('full/other'), Buffer.alloc(8192));
    const { code, err } = run(['sheet', 'loop.yaml', '--out', 'full/sheet.md']);
    expect({ code, err: shortened(err) }).toEqual({
      code: 2,
      err: refused('full/sheet.md', 'the disk is full'),
    });
    expect(readdirSync(at('full')).sort()).toEqual(['other', 'sheet.md']);
    expect(readFileSync(at('full/sheet.md'), 'utf8')).toBe('the old one');
  });

  test('a read-only folder is refused before any work is done', ({ skip }) => {
    if (!mount('fixed', 'ro')) skip('nothing can be mounted here');
    const why = 'it lies where nothing can be written';
    for (const words of [
      ['sheet', 'loop.yaml', '--out', 'fixed/sheet.md'],
      sweep('fixed/sheet.md'.replace('.md', '.csv')),
      ['new', 'ammonia', '--out', 'fixed/loop.yaml'],
    ]) {
      const { code, err } = run(words);
      const name = words.find((word) => word.startsWith('fixed/'))!;
      expect({ code, err: shortened(err) }).toEqual({ code: 2, err: refused(name, why) });
    }
  });

  test('a folder of somebody else is refused before any work is done', ({ skip }) => {
    if (process.getuid?.() !== 0) skip('only root can work as somebody else');
    mkdirSync(at('theirs'));
    for (const path of [folder(), program().replace(/\/cli\.js$/, '')]) chmodSync(path, 0o755);
    const words = ['sheet', 'loop.yaml', '--out', 'theirs/sheet.md'];
    const { status, stderr } = spawnSync(process.execPath, [program(), ...words], {
      cwd: folder(),
      encoding: 'utf8',
      uid: 65534,
      gid: 65534,
    });
    if (status === null) skip('the program cannot be run as somebody else here');
    expect({ status, err: shortened(stderr) }).toEqual({
      status: 2,
      err: refused('theirs/sheet.md', 'the system denies access to it'),
    });
  });

  test('a device takes what it is given, and a full one is told', ({ skip }) => {
    if (!existsSync('/dev/full')) skip('there is no device that is always full');
    symlinkSync('/dev/null', at('null.csv'));
    symlinkSync('/dev/full', at('full.csv'));
    expect(run(['sheet', 'loop.yaml', '--out', 'null.csv']).code).toBe(0);
    expect(run(short('null.csv')).code).toBe(0);
    const sheet = run(['sheet', 'loop.yaml', '--out', 'full.csv']);
    expect({ code: sheet.code, err: shortened(sheet.err) }).toEqual({
      code: 2,
      err: refused('full.csv', 'the disk is full'),
    });
    expect(run(short('full.csv'))).toMatchObject({ code: 2, out: '' });
    // What was calculated waits beside the name.
    expect(sizeOf('full.csv.part')).toBeGreaterThan(100);
    expect(statSync(at('null.csv')).isCharacterDevice()).toBe(true);
  });

  test('a link is followed, and the table stands where it leads', () => {
    mkdirSync(at('real'));
    writeFileSync(at('real/table.csv'), 'old');
    symlinkSync('real/table.csv', at('link.csv'));
    expect(run(short('link.csv')).code).toBe(0);
    expect(readFileSync(at('real/table.csv'), 'utf8')).toContain('condenser.temperature');
    expect(readdirSync(at('real'))).toEqual(['table.csv']);
  });
});

const refused = (path: string, why: string) => `command line error cannot-write
  ${path} cannot be written.
  why:  ${why}
  mend: check the folder and its permissions, or name another file; nothing was changed

1 error
`;

describe('slices', () => {
  const slices = () => {
    for (const part of ['1/2', '2/2']) expect(run(short(`s${part[0]}.csv`, '--part', part)).code).toBe(0);
  };

  test('one named twice is one error, and the sweep that would be overwritten is refused', () => {
    slices();
    const twice = run(['gather', 's1.csv', './s1.csv', '--out', 'all.csv']);
    expect({ code: twice.code, err: shortened(twice.err) }).toEqual({
      code: 2,
      err: `command line error slices-overlap
  ./s1.csv is named twice.
  why:  its rows would be in the table twice
  mend: name each slice once; perhaps another one was meant

1 error
`,
    });
    const over = run(['gather', 's1.csv', 's2.csv', '--out', 's2.csv']);
    expect(over.code).toBe(2);
    expect(over.err).toContain('s2.csv is read and would be written.');
  });

  test('a whole one with --resume is not calculated again; a whole table says nothing of its sweep', () => {
    slices();
    const before = statSync(at('s1.csv'));
    const again = run(short('s1.csv', '--part', '1/2', '--resume'));
    expect(again).toEqual({
      code: 0,
      out: '',
      err: 's1.csv is whole already: 8 cases of this sweep; nothing was calculated\n',
    });
    expect(statSync(at('s1.csv')).ino).toBe(before.ino);
    // Another flowsheet: the slice is not of that sweep.
    writeFileSync(at('loop.yaml'), shipped('reference-loop').replace('450 degC', '451 degC'));
    const other = run(short('s1.csv', '--part', '1/2', '--resume'));
    writeFileSync(at('loop.yaml'), shipped('reference-loop'));
    expect(other.err).toContain(
      's1.csv does not say that it is whole and of this sweep: it is calculated again',
    );
    expect(run(short('whole.csv')).code).toBe(0);
    const whole = readFileSync(at('whole.csv'), 'utf8');
    expect(run(short('whole.csv', '--resume')).err).toContain('whole.csv does not say that it is whole');
    expect(readFileSync(at('whole.csv'), 'utf8')).toBe(whole);
  });
});

/** A message without the long line it quotes. */
function shortened(message: string): string {
  return message.replace(/^.*\|.*\n/gm, '').replace(/^command line:\d+:\d+/gm, 'command line');
}
