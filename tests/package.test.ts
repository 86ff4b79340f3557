import { execFileSync, spawnSync } from 'node:child_process';
import {
  copyFileSync,
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildAll } from '../scripts/build.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
let folder = '';
let home = '';
let files: string[] = [];
const npm = (...words: string[]) => ['--no-audit', '--no-fund', '--offline', ...words];

// Packed from a copy of what is not built, beside a dist/ of its own: what the newcomer's own dist/ holds does not count.
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'looptally-pack-'));
  const source = join(folder, 'source');
  mkdirSync(source);
  for (const name of ['package.json', 'README.md', 'LICENSE', 'CHANGELOG.md', 'DEVELOPERS.md'])
    copyFileSync(join(root, name), join(source, name));
  for (const name of ['flowsheets', 'src', 'tests/units', 'bench', 'fuzz'])
    cpSync(join(root, name), join(source, name), { recursive: true });
  await buildAll(join(source, 'dist'));
  for (const name of ['bench', 'docs', 'fuzz']) {
    mkdirSync(join(source, 'dist', name));
    writeFileSync(join(source, 'dist', name, 'all.js'), '// made by another command');
  }
  const told = execFileSync('npm', ['pack', '--json', '--ignore-scripts', '--pack-destination', folder], {
    cwd: source,
    encoding: 'utf8',
  });
  const [packed] = JSON.parse(told) as [{ filename: string; files: { path: string }[] }];
  files = packed.files.map(({ path }) => path);
  home = join(folder, 'empty');
  mkdirSync(home);
  writeFileSync(join(home, 'package.json'), '{"private": true, "type": "module"}');
  execFileSync('npm', ['install', ...npm(join(folder, packed.filename))], { cwd: home });
}, 240_000);
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('the package', () => {
  test('holds what it needs and no more', () => {
    const kinds: Readonly<Record<string, RegExp>> = {
      papers: /^(package\.json|README\.md|CHANGELOG\.md|LICENSE|dist\/THIRD-PARTY-LICENSES\.txt)$/,
      flowsheets: /^flowsheets\/[\w-]+\.yaml$/,
      programs: /^dist\/[\w-]+\.js$/,
      chunks: /^dist\/chunks\/[\w.-]+\.js$/,
      types: /^dist\/types\/[\w/.-]+\.d\.ts$/,
    };
    expect(files.filter((file) => !Object.values(kinds).some((kind) => kind.test(file)))).toEqual([]);
    for (const kind of Object.values(kinds)) expect(files.some((file) => kind.test(file))).toBe(true);
    expect(files.filter((file) => kinds['papers']!.test(file))).toHaveLength(5);
    expect(files.filter((file) => kinds['flowsheets']!.test(file))).toHaveLength(
      readdirSync(join(root, 'flowsheets')).length,
    );
  });

  test('installed without network into an empty folder brings nothing else with it', () => {
    expect(readdirSync(join(home, 'node_modules')).filter((name) => !name.startsWith('.'))).toEqual([
      'looptally',
    ]);
  });

  test('runs as a command', () => {
    const command = join(home, 'node_modules', '.bin', 'looptally');
    const run = (...words: string[]) => spawnSync(command, words, { cwd: home, encoding: 'utf8' });
    expect(run('--version').stdout).toBe(`${version}\n`);
    expect(run('new', 'ammonia', '--out', 'loop.yaml').status).toBe(0);
    const { status, stdout, stderr } = run('balance', 'loop.yaml');
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    expect(stdout).toContain('closed in');
    expect(run('sheet', 'loop.yaml', '--out', 'loop.svg', '--out', 'loop.xlsx').status).toBe(0);
  });

  test('is a module', () => {
    writeFileSync(
      join(home, 'use.mjs'),
      `import { readFileSync } from 'node:fs';
import { balance, readFlowsheet } from 'looptally';
const text = readFileSync('node_modules/looptally/flowsheets/conversion-loop.yaml', 'utf8');
const { flowsheet } = await readFlowsheet(text, { file: 'loop.yaml' });
console.log(balance(flowsheet).result.convergence.converged);
`,
    );
    expect(execFileSync(process.execPath, ['use.mjs'], { cwd: home, encoding: 'utf8' })).toBe('true\n');
  });

  test('has types that a strict compiler takes, without packages of ours', () => {
    writeFileSync(
      join(home, 'use.ts'),
      `import { balance, formatDiagnostics, readFlowsheet, type Result, sweepCases } from 'looptally';
const { flowsheet, diagnostics } = await readFlowsheet('', { file: 'loop.yaml' });
if (flowsheet === null) throw new Error(formatDiagnostics(diagnostics, { texts: {} }));
const result: Result = balance(flowsheet).result;
export const ratio: number | null = result.figures.recycle_ratio;
for await (const { recorded } of sweepCases(flowsheet, { over: { 'condenser.temperature': '1 K..2 K:2' }, record: [] })) console.log(recorded);
// @ts-expect-error a flowsheet is no text
balance('loop.yaml');
`,
    );
    mkdirSync(join(home, 'node_modules', '@types'), { recursive: true });
    symlinkSync(join(root, 'node_modules', '@types', 'node'), join(home, 'node_modules', '@types', 'node'));
    const compiler = join(root, 'node_modules', 'typescript', 'bin', 'tsc');
    const options = [
      '--noEmit',
      '--strict',
      '--module',
      'nodenext',
      '--target',
      'es2022',
      '--lib',
      'es2023',
      '--types',
      'node',
    ];
    const { status, stdout } = spawnSync(process.execPath, [compiler, ...options, 'use.ts'], {
      cwd: home,
      encoding: 'utf8',
    });
    expect({ status, stdout }).toEqual({ status: 0, stdout: '' });
  });

  test('lists the licence of everything that is bundled', () => {
    const shipped = join(home, 'node_modules', 'looptally', 'dist');
    const text = readFileSync(join(shipped, 'THIRD-PARTY-LICENSES.txt'), 'utf8');
    const listed = [...text.matchAll(/^(\S+) (\d\S*)\n=+\nlicence: (.+)\nsource: (.+)\n\n/gm)].map(
      ([, name, , licence]) => `${name} ${licence}`,
    );
    expect(listed.length).toBeGreaterThan(10);
    const words = new Set(listed.map((line) => line.slice(line.indexOf(' ') + 1)));
    expect(
      [...words].filter(
        (licence) =>
          ![
            'MIT',
            'ISC',
            'BSD-2-Clause',
            'BSD-3-Clause',
            'Apache-2.0',
            'EPL-2.0 OR GPL-3.0-or-later',
          ].includes(licence),
      ),
    ).toEqual([]);
    expect(listed).toContain('elkjs EPL-2.0 OR GPL-3.0-or-later');
    expect(text).toContain('Eclipse Public License - v 2.0');
    // What src/ imports of packages, types aside, is in the bundles.
    const sources = readdirSync(join(root, 'src'), { recursive: true })
      .map(String)
      .filter((name) => /\.m?ts$/.test(name) && !name.endsWith('.d.ts'));
    const imported = new Set(
      sources.flatMap((name) =>
        [
          ...readFileSync(join(root, 'src', name), 'utf8').matchAll(
            /(?:^import (?!type)[^;]*?from |import\()'((?:@[\w-]+\/)?[\w-]+)[^']*'/gm,
          ),
        ].map((match) => match[1]!),
      ),
    );
    const packages = [...imported].filter(
      (name) => !name.startsWith('node:') && existsSync(join(root, 'node_modules', name)),
    );
    expect(packages.length).toBeGreaterThan(5);
    for (const name of packages)
      expect(
        listed.some((line) => line.startsWith(`${name} `)),
        name,
      ).toBe(true);
    // Tools of the makers are none of it.
    for (const tool of ['playwright-core', 'axe-core', 'vitest', 'typescript'])
      expect(text).not.toContain(`\n${tool} `);
  });

  test('needs no package at run time: an audit of those finds nothing', () => {
    const { dependencies, optionalDependencies, peerDependencies } = JSON.parse(
      readFileSync(join(root, 'package.json'), 'utf8'),
    );
    expect({ dependencies, optionalDependencies, peerDependencies }).toEqual({});
  });

  test('says what changed, this version first', () => {
    const changes = readFileSync(join(home, 'node_modules', 'looptally', 'CHANGELOG.md'), 'utf8');
    expect(/^## (\S+?),? /m.exec(changes)?.[1]).toBe(version);
  });
});
