import { benchCommand } from './command.ts';
import { benchKernels } from './kernels.ts';
import { benchMethods } from './methods.ts';
import { benchPage } from './page.ts';
import { benchRandomLoops } from './random-loops.ts';
import { benchScale } from './scale.ts';
import { benchScipy } from './scipy.ts';
import { benchSweep } from './sweep.ts';

/**
 * Everything, or the parts named: npm run bench -- methods kernels scale command.
 * Times are of this machine at this moment; the ratios are what to compare between two runs.
 */
const parts: Readonly<Record<string, () => Promise<void>>> = {
  methods: benchMethods,
  loops: benchRandomLoops,
  kernels: benchKernels,
  scipy: benchScipy,
  scale: benchScale,
  sweep: benchSweep,
  command: benchCommand,
  page: benchPage,
};

const asked = process.argv.slice(2);
const unknown = asked.filter((name) => !(name in parts));
if (unknown.length > 0)
  throw new Error(`no part ${unknown.join(', ')}; there are ${Object.keys(parts).join(', ')}`);
for (const [name, part] of Object.entries(parts)) {
  if (asked.length === 0 || asked.includes(name)) await part();
}
