import { readFlowsheet } from '../src/flowsheet/read.ts';
import type { MethodName } from '../src/model/flowsheet.ts';
import { balance } from '../src/tally/balance.ts';
import { column, title } from './measure.ts';
import { randomNumbers } from './random-numbers.ts';

const LOOPS = 2000;
const SEED = 20_260_101;
const METHODS: readonly MethodName[] = ['auto', 'anderson', 'newton'];

/** Closed or not, and at what cost, over random ammonia loops from hopeless to easy. */
export async function benchRandomLoops(): Promise<void> {
  const draw = randomNumbers(SEED);
  const texts = Array.from({ length: LOOPS }, () => ammoniaLoop(draw));
  title(`Random ammonia loops (srk), ${LOOPS} of them, from own start values to 1e-9`);
  for (const method of METHODS) {
    const passes: number[] = [];
    const failures = new Map<string, number>();
    let ms = 0;
    for (const [k, text] of texts.entries()) {
      const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'random.yaml' });
      if (!flowsheet) throw new Error(diagnostics.map((d) => d.what).join('\n'));
      const start = performance.now();
      const { result, diagnosis } = balance(flowsheet, { method });
      ms += performance.now() - start;
      if (result.convergence.converged) passes.push(result.convergence.passes);
      else failures.set(diagnosis?.code ?? '?', (failures.get(diagnosis?.code ?? '?') ?? 0) + 1);
      if (diagnosis !== null && process.env['SHOW_FAILURES'])
        console.log(`  loop ${k}: ${diagnosis.what}\n${text}`);
    }
    passes.sort((a, b) => a - b);
    const mean = passes.reduce((sum, n) => sum + n, 0) / passes.length;
    const at = (share: number) => passes[Math.min(Math.floor(share * passes.length), passes.length - 1)];
    const failed = [...failures].map(([code, n]) => `${n} ${code}`).join(', ');
    console.log(
      `  ${method.padEnd(10)} closed ${column((100 * passes.length) / LOOPS, 7)} %   passes: mean ${column(mean, 6)}` +
        `   95 % ${at(0.95)}   99 % ${at(0.99)}   most ${passes.at(-1)}   ${column(ms / LOOPS, 6)} ms each` +
        `${failed === '' ? '' : `   failed: ${failed}`}`,
    );
  }
}

/**
 * An isothermal equilibrium loop: 300-550 degC, 50-300 bar, purge 0.05-30 % (even in its logarithm), condenser
 * −35…45 degC, 0-10 % inerts, hydrogen to nitrogen 2.9-3.1, dissolved gases on or off.
 */
export function ammoniaLoop(draw: () => number): string {
  const between = (low: number, high: number) => low + (high - low) * draw();
  const reactor = between(300, 550);
  const bar = between(50, 300);
  const purge = 0.05 * 600 ** draw();
  const condenser = between(-35, 45);
  const inerts = between(0, 10);
  const argon = inerts * draw();
  const hydrogen = between(2.9, 3.1);
  const rest = 100 - inerts;
  const dissolved = draw() < 0.5;
  return `looptally: 1
title: random ammonia loop
components: [H2, N2, NH3, Ar, CH4]
gas: srk
liquid: antoine
dissolved_gases: ${dissolved}
reactions:
  synthesis: N2 + 3 H2 <=> 2 NH3
feeds:
  makeup:
    flow: 1000 kmol/h
    temperature: 40 degC
    pressure: ${bar} bar
    composition: {H2: ${(rest * hydrogen) / (1 + hydrogen)}, N2: ${rest / (1 + hydrogen)}, Ar: ${argon}, CH4: ${inerts - argon}}
blocks:
  mixer: {kind: mixer}
  converter: {kind: reactor, reactions: {synthesis: {}}, temperature: ${reactor} degC}
  condenser: {kind: condenser, temperature: ${condenser} degC}
  purge: {kind: splitter, fractions: {bleed: ${purge} %}}
  circulator: {kind: compressor, pressure: ${bar} bar}
streams:
  S1: makeup -> mixer
  S2: mixer -> converter
  S3: converter -> condenser
  S4: condenser.gas -> purge
  S5: condenser.liquid -> out
  S6: purge.bleed -> out
  S7: purge.rest -> circulator
  S8: circulator -> mixer
ledger: {product: NH3 in S5, reactant: H2, purge: [S6], recycle: S8}
`;
}
