// Builds dist/: the command line (dist/cli.js, commands and mathjs in chunks of their own that load on demand),
// the library (dist/index.js) and its type declarations. The same sources give the same bytes.
import { execFileSync } from 'node:child_process';
import { chmodSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const root = fileURLToPath(new URL('..', import.meta.url));
const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));

// zod brings its messages in fifty languages; ours are written by Looptally itself, so one is enough.
const oneLanguage = {
  name: 'one-language',
  setup(bundler) {
    bundler.onLoad({ filter: /[\\/]zod[\\/]v4[\\/]locales[\\/]index\.js$/ }, ({ path }) => ({
      contents: "export { default as en } from './en.js';",
      resolveDir: dirname(path),
    }));
  },
};

const shared = {
  absWorkingDir: root,
  bundle: true,
  splitting: true,
  format: 'esm',
  platform: 'node',
  target: 'node20',
  minify: true,
  legalComments: 'none',
  charset: 'utf8',
  define: { LOOPTALLY_VERSION: JSON.stringify(version) },
  plugins: [oneLanguage],
  logLevel: 'warning',
};

// commander is CommonJS and asks for Node's own modules by require(), which a module does not have. The banner
// stands in the chunks too, where it does no harm.
const banner = `#!/usr/bin/env node
import { createRequire as looptallyCreateRequire } from 'node:module';
const require = looptallyCreateRequire(import.meta.url);`;

// The page knows the units of our own table; mathjs and the layout engine are larger than all the rest of it.
const pageStaysSmall = {
  name: 'page-stays-small',
  setup(bundler) {
    bundler.onResolve({ filter: /^mathjs$/ }, ({ path }) => ({ path, namespace: 'no-further-units' }));
    bundler.onLoad({ filter: /.*/, namespace: 'no-further-units' }, () => ({
      contents: 'export const unitDependencies = {}; export const create = () => ({});',
    }));
    bundler.onResolve({ filter: /^elkjs/ }, ({ importer }) => ({
      errors: [{ text: `elkjs does not belong into the page (${importer})` }],
    }));
  },
};

/** Bundle the script of live pages into a folder: live.js, one file that asks for nothing. */
export async function buildLive(folder) {
  const { metafile } = await build({
    absWorkingDir: root,
    bundle: true,
    format: 'iife',
    platform: 'browser',
    target: 'es2022',
    minify: true,
    legalComments: 'none',
    charset: 'utf8',
    define: { LOOPTALLY_VERSION: JSON.stringify(version) },
    plugins: [oneLanguage, pageStaysSmall],
    logLevel: 'warning',
    entryPoints: { live: 'src/live/main.ts' },
    outdir: folder,
    metafile: true,
  });
  return metafile;
}

/** Bundle the command line into a folder: cli.js, the worker of sweeps, the script of pages and chunks beside it. */
export async function buildCli(folder) {
  const live = buildLive(folder);
  const { metafile } = await build({
    ...shared,
    entryPoints: { cli: 'src/cli/main.ts', 'sweep-worker': 'src/cli/sweep-worker.ts' },
    outdir: folder,
    chunkNames: 'chunks/[name]-[hash]',
    banner: { js: banner },
    metafile: true,
  });
  const { inputs } = await live;
  chmodSync(join(folder, 'cli.js'), 0o755);
  await buildPageScripts(folder);
  return { ...metafile, inputs: { ...metafile.inputs, ...inputs } };
}

/** What runs in the browser: one file each, which the command line writes into its pages. */
export async function buildPageScripts(folder) {
  await build({
    ...shared,
    splitting: false,
    format: 'iife',
    platform: 'browser',
    target: 'es2022',
    entryPoints: { 'study-page': 'src/live/study/main.ts' },
    outdir: folder,
  });
}

async function buildLibrary(folder) {
  const { metafile } = await build({
    ...shared,
    entryPoints: { index: 'src/index.ts' },
    outdir: folder,
    chunkNames: 'chunks/[name]-[hash]',
    metafile: true,
  });
  return metafile;
}

/** The licences of the packages that went into the bundles, as they ask for: name, licence, source and its whole text. */
function collectLicences(folder, metafiles) {
  const homes = new Map();
  for (const file of metafiles.flatMap(({ inputs }) => Object.keys(inputs))) {
    // A package may bring packages of its own: the last folder is the one whose file it is.
    const match = /^(.*\/)?node_modules\/((?:@[^/]+\/)?[^/]+)\//.exec(file);
    if (match !== null) homes.set(match[2], join(root, match[0]));
  }
  const texts = [...homes]
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([name, home]) => {
      const { license, version, repository, homepage, author } = JSON.parse(
        readFileSync(join(home, 'package.json'), 'utf8'),
      );
      if (typeof license !== 'string') throw new Error(`${name} does not say its licence`);
      const title = `${name} ${version}`;
      const source = (typeof repository === 'object' ? repository.url : repository) ?? homepage;
      const file = readdirSync(home).find((entry) => /^(licen[cs]e|copying)/i.test(entry));
      const text =
        file === undefined
          ? `The package brings no text of its licence; by ${author?.name ?? author}.`
          : readFileSync(join(home, file), 'utf8').trim();
      return `${title}\n${'='.repeat(title.length)}\nlicence: ${license}\nsource: ${source}\n\n${text}\n`;
    });
  writeFileSync(join(folder, 'THIRD-PARTY-LICENSES.txt'), texts.join('\n\n'));
}

// zod is bundled: who installs the package has no types of it, and needs none.
const ZOD_TYPE = '/** a schema of zod */\ninterface ZodType<T> { parse(value: unknown): T; }';

function declareTypes(folder) {
  const compiler = createRequire(import.meta.url).resolve('typescript/bin/tsc');
  execFileSync(process.execPath, [compiler, '-p', join(root, 'tsconfig.build.json'), '--outDir', folder], {
    stdio: 'inherit',
  });
  for (const entry of readdirSync(folder, { recursive: true, withFileTypes: true })) {
    if (!entry.isFile() || !entry.name.endsWith('.d.ts')) continue;
    const file = join(entry.parentPath, entry.name);
    const text = readFileSync(file, 'utf8')
      .replace(/((?:from|import\()\s*'\.[^']*)\.ts'/g, "$1.js'")
      .replace("import type { ZodType } from 'zod';", ZOD_TYPE);
    writeFileSync(file, text);
  }
}

/** All that is shipped of dist/, into a folder made anew: command line, library, types and licences. */
export async function buildAll(folder) {
  rmSync(folder, { recursive: true, force: true });
  collectLicences(folder, [await buildCli(folder), await buildLibrary(folder)]);
  declareTypes(join(folder, 'types'));
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await buildAll(join(root, 'dist'));
