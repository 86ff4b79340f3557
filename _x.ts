import { readFileSync } from 'node:fs';
import { readFlowsheet } from './src/flowsheet/read.ts';
import { createPlant } from './src/tally/plant.ts';
import { closePlant } from './src/tally/close-plant.ts';
for (const f of process.argv.slice(2)) {
  const { flowsheet } = await readFlowsheet(readFileSync(f,'utf8'), { file: f });
  for (const m of ['newton','auto'] as const) {
  const plant = createPlant(flowsheet!);
  const c = closePlant(plant, { method: m, tolerance: 1e-9, maxPasses: 200 });
  console.log(f, m, c.converged, c.passes, c.history.map(h=>h.residual.toExponential(1)+(h.note?`[${h.note}]`:'')).join(' '));
  }
}
