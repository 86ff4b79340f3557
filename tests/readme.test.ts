import { spawnSync } from 'node:child_process';
import { chmodSync, cpSync, existsSync, mkdirSync, readFileSync, symlinkSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { beforeAll, describe, expect, test } from 'vitest';
import { commandLine, type Outcome } from './cli/looptally.ts';
import { deviations } from './published/deviations.ts';

/** What README shows is computed, run and compared; UPDATE_README=1 has the tests write it instead. */
const root = fileURLToPath(new URL('..', import.meta.url));
const readme = join(root, 'README.md');
const update = process.env['UPDATE_README'] === '1';
const page = existsSync(readme) ? readFileSync(readme, 'utf8') : '';
const { scripts } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')) as {
  scripts: Record<string, string>;
};
const cli = commandLine();

// A copy of the project as a reader has it after npm ci: flowsheets, package.json, dist, and looptally on the path.
beforeAll(() => {
  const program = dirname(cli.program());
  cpSync(join(root, 'flowsheets'), join(cli.folder(), 'flowsheets'), { recursive: true });
  cpSync(join(root, 'package.json'), join(cli.folder(), 'package.json'));
  symlinkSync(program, join(cli.folder(), 'dist'));
  mkdirSync(join(program, 'bin'));
  const looptally = join(program, 'bin', 'looptally');
  writeFileSync(looptally, `#!/bin/sh\nexec '${process.execPath}' '${cli.program()}' "$@"\n`);
  chmodSync(looptally, 0o755);
});

describe('README', () => {
  test('shows commands, a result and the deviations', () => {
    expect(commandsOf(page).filter(({ kind }) => kind === 'run').length).toBeGreaterThan(1);
    expect(resultsOf(page).length).toBeGreaterThan(0);
    expect(between(page, deviationMarks)).not.toBeNull();
  });

  test('shows the deviations that the code has today', () => {
    const wanted = `\n\n${deviations()}\n\n`;
    if (update) rewrite((text) => fill(text, deviationMarks, wanted));
    expect(between(readFileSync(readme, 'utf8'), deviationMarks)?.inside).toBe(wanted);
  });

  // in the order of the page and in one folder, because a command may use what an earlier one wrote
  test.each(commandsOf(page))('the command works: $text', (command) => {
    expectToWork(command);
  });

  test.each(resultsOf(page).map((result, index) => ({ ...result, index })))(
    'the result shown is that of: $command',
    ({ command, index }) => {
      if (update)
        rewrite((text) => fill(text, resultsOf(text)[index]!.marks, block(resultsOf(text)[index]!)));
      const shown = resultsOf(readFileSync(readme, 'utf8'))[index]!;
      expect(shown.command).toBe(command);
      expect(shown.inside).toBe(block(shown));
    },
  );
});

describe('the flowsheet that README shows', () => {
  const [flowsheet, ...pieces] = filePieces(page);

  test('is accepted with nothing to say, and so is every piece shown later when it is put at its end', () => {
    expect(pieces.map((piece) => /^\w+/.exec(piece)?.[0])).toEqual(
      expect.arrayContaining(['ledger', 'prices', 'study', 'handles', 'spreads']),
    );
    for (const [k, piece] of ['', ...pieces].entries()) {
      const name = `shown-${k}.yaml`;
      writeFileSync(join(cli.folder(), name), `${flowsheet}\n${piece}`);
      const { code, err } = shell(`looptally check ${name}`);
      expect({ piece, code, err }).toEqual({ piece, code: 0, err: '' });
    }
  });

  test('is swept by the study shown', () => {
    const { code, out } = shell(
      `looptally sweep shown-${1 + pieces.findIndex((piece) => piece.startsWith('study:'))}.yaml`,
    );
    expect(code).toBe(0);
    expect(out).toContain('the recycle ratio is');
  });
});

describe('a page of our own', () => {
  const own = [
    'Text with `looptally nonsense` in it.',
    '```sh',
    'npm ci && npm start',
    'looptally new ammonia --out own.yaml   # writes a file',
    '# a remark',
    '$ npx looptally balance own.yaml \\',
    "    --set 'condenser.temperature=-10 degC' > own.txt",
    'node dist/cli.js balance no-such-file.yaml # exit 2',
    'npm run bench',
    'looptaly balance own.yaml',
    '```',
    '```yaml',
    'looptally: 1',
    '```',
    '<!-- result: begin looptally --version -->',
    'old',
    '<!-- result: end -->',
    '<!-- result: begin lines 2-3 of: looptally data NH3 -->',
    '```txt',
    'old',
    '```',
    '<!-- result: end -->',
    '<!-- deviations: begin -->',
    'old',
    '<!-- deviations: end -->',
    'The end.',
    '',
  ].join('\n');

  test('gives the commands of its sh blocks, with what is to become of them', () => {
    const set = "looptally balance own.yaml     --set 'condenser.temperature=-10 degC' > own.txt";
    expect(commandsOf(own)).toEqual([
      { text: 'npm ci', kind: 'script', exit: 0 },
      { text: 'npm start', kind: 'run', exit: 0 },
      { text: 'looptally new ammonia --out own.yaml', kind: 'run', exit: 0 },
      { text: set, kind: 'run', exit: 0 },
      { text: 'node dist/cli.js balance no-such-file.yaml', kind: 'run', exit: 2 },
      { text: 'npm run bench', kind: 'script', exit: 0 },
      { text: 'looptaly balance own.yaml', kind: 'unknown', exit: 0 },
    ]);
  });

  test('has its commands run, and one that fails, is missing or is mistyped is found', () => {
    const [ci, start, create, balance, refused, bench, mistyped] = commandsOf(own);
    for (const command of [ci!, start!, create!, balance!, refused!, bench!]) expectToWork(command);
    expect(readFileSync(join(cli.folder(), 'own.txt'), 'utf8')).toContain('NH3');
    expect(() => expectToWork({ ...refused!, exit: 0 })).toThrow('no-such-file');
    expect(() => expectToWork({ ...bench!, text: 'npm run no-such-script' })).toThrow('no-such-script');
    expect(() => expectToWork(mistyped!)).toThrow('looptaly');
  });

  test('has its results filled in and found equal afterwards, and a changed figure is found', () => {
    const [whole, part] = resultsOf(own);
    expect(whole).toMatchObject({ command: 'looptally --version', lines: null, inside: '\nold\n' });
    expect(part).toMatchObject({ command: 'looptally data NH3', lines: [2, 3] });
    const filled = fill(fill(own, whole!.marks, block(whole!)), part!.marks, block(part!));
    for (const result of resultsOf(filled)) expect(result.inside).toBe(block(result));
    const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')) as { version: string };
    expect(filled).toContain(`--version -->\n\n\`\`\`text\n${version}\n\`\`\`\n\n<!-- result: end -->`);
    const data = shell('looptally data NH3').out.split('\n');
    expect(filled).toContain(`-->\n\n\`\`\`txt\n${data[1]}\n${data[2]}\n\`\`\`\n\n<!--`);
    expect(filled.endsWith('The end.\n')).toBe(true);
    const [changed] = resultsOf(filled.replace(version, '9.9.9'));
    expect(changed!.inside).not.toBe(block(changed!));
  });

  test('cannot show more lines than the result has, nor a result that fails', () => {
    const [whole] = resultsOf(own);
    expect(() => block({ ...whole!, lines: [1, 40] })).toThrow('has 1 line');
    expect(() => block({ ...whole!, command: 'looptally balance nothing.yaml' })).toThrow('ended with 2');
  });

  test('has its deviations filled in, and a mark without its end is found', () => {
    const filled = fill(own, deviationMarks, '\nnew\n');
    expect(between(filled, deviationMarks)?.inside).toBe('\nnew\n');
    expect(filled.replace('\nnew\n', '\nold\n')).toBe(own);
    expect(between('no marks', deviationMarks)).toBeNull();
    expect(() => between('<!-- deviations: begin -->', deviationMarks)).toThrow('deviations: end');
  });
});

/** The first block of a page is a whole flowsheet; those behind it that are no file of their own are pieces of it. */
function filePieces(text: string): string[] {
  const all = [...text.matchAll(/^```yaml\n([\s\S]*?)^```$/gm)].map(([, inside]) => inside!);
  return all.filter((inside, k) => k === 0 || !/^looptally:/m.test(inside));
}

interface Command {
  readonly text: string;
  /** `run` is run, of a `script` only the entry in package.json is looked up, `aside` is no business of ours */
  readonly kind: 'run' | 'script' | 'aside' | 'unknown';
  /** the exit code that a remark behind the command promises */
  readonly exit: number;
}

/** The commands of the sh blocks of a page, in order. */
function commandsOf(text: string): Command[] {
  return [...text.matchAll(/^```sh\n([\s\S]*?)^```$/gm)].flatMap(([, lines]) =>
    lines!
      .replace(/\\\n/g, '')
      .split('\n')
      .map((line) => line.replace(/^\s*\$ /, '').trim())
      .filter((line) => line !== '' && !line.startsWith('#'))
      .flatMap((line) => {
        const exit = Number(/# exit (\d+)/.exec(line)?.[1] ?? 0);
        const bare = line.replace(/\s+#.*$/, '').replace(/\bnpx looptally\b/g, 'looptally');
        return bare.split(' && ').map((text) => ({ text, kind: kindOf(text), exit }));
      }),
  );
}

function kindOf(command: string): Command['kind'] {
  const bare = command.replace(/^([A-Z_]+=\S+ )+/, '');
  if (/^(looptally|node dist\/cli\.js|npm start)\b/.test(bare)) return 'run';
  if (/^npm (ci|test|run)\b/.test(bare)) return 'script';
  if (/^(git clone|cd|npx (vitest|tsc|biome))\b/.test(bare)) return 'aside';
  return 'unknown';
}

function expectToWork({ text, kind, exit }: Command): void {
  if (kind === 'unknown') throw new Error(`this test does not know what to do with the command: ${text}`);
  if (kind === 'script') {
    const [, verb, name] = /npm (\w+)(?: (?:--\S+ )*([\w:-]+))?/.exec(text)!;
    const script = verb === 'ci' ? 'prepare' : verb === 'test' ? 'test' : name!;
    expect(scripts[script], `package.json has no script ${script}`).toBeTruthy();
  } else if (kind === 'run') {
    const { code, err } = shell(text);
    expect(code, `${text}\n${err}`).toBe(exit);
  }
}

interface Shown {
  readonly command: string;
  /** first and last line shown, counted from 1; null for all */
  readonly lines: readonly [number, number] | null;
  readonly marks: Marks;
  readonly inside: string;
}

/** The stretches of a page that show the result of a command. */
function resultsOf(text: string): Shown[] {
  return [...text.matchAll(/<!-- result: begin (?:lines (\d+)-(\d+) of: )?(.*?) -->/g)].map((found) => {
    const [begin, from, to, command] = found;
    const marks = { begin, end: '<!-- result: end -->', from: found.index };
    const lines = from === undefined ? null : ([Number(from), Number(to)] as const);
    return { command: command!, lines, marks, inside: between(text, marks)!.inside };
  });
}

/** What is to stand between the marks of a result: its lines as a block, whose language the page may choose. */
function block({ command, lines, inside }: Shown): string {
  const promised = Number(/# exit (\d+)$/.exec(command)?.[1] ?? 0);
  const { code, out, err } = shell(command.replace(/\bnpx looptally\b/g, 'looptally'));
  if (code !== promised) throw new Error(`${command} ended with ${code}\n${err}`);
  const all = out.replace(/\n+$/, '').split('\n');
  const [from, to] = lines ?? [1, all.length];
  if (from < 1 || from > to || to > all.length) {
    throw new Error(`lines ${from}-${to} are asked for; the result of ${command} has ${all.length} line(s)`);
  }
  const language = /```(\w+)\n/.exec(inside)?.[1] ?? 'text';
  return `\n\n\`\`\`${language}\n${all.slice(from - 1, to).join('\n')}\n\`\`\`\n\n`;
}

interface Marks {
  readonly begin: string;
  readonly end: string;
  /** where to look for the begin mark */
  readonly from?: number;
}
const deviationMarks: Marks = { begin: '<!-- deviations: begin -->', end: '<!-- deviations: end -->' };

/** The text between two marks and where it stands; null when the page has no such marks. */
function between(text: string, { begin, end, from = 0 }: Marks) {
  const mark = text.indexOf(begin, from);
  if (mark < 0) return null;
  const start = mark + begin.length;
  const stop = text.indexOf(end, start);
  if (stop < 0) throw new Error(`${begin} is never followed by ${end}`);
  return { start, stop, inside: text.slice(start, stop) };
}

function fill(text: string, marks: Marks, inside: string): string {
  const found = between(text, marks);
  if (!found) throw new Error(`the page has no ${marks.begin}`);
  return text.slice(0, found.start) + inside + text.slice(found.stop);
}

function rewrite(change: (text: string) => string): void {
  writeFileSync(readme, change(readFileSync(readme, 'utf8')));
}

/** A command line as a reader would type it, in the copy of the project. */
function shell(command: string): Outcome {
  const { status, stdout, stderr } = spawnSync('sh', ['-c', command], {
    cwd: cli.folder(),
    env: {
      ...process.env,
      PATH: `${join(dirname(cli.program()), 'bin')}:${process.env['PATH']}`,
      NO_COLOR: '1',
      npm_config_update_notifier: 'false',
    },
    encoding: 'utf8',
  });
  return { code: status, out: stdout, err: stderr };
}
