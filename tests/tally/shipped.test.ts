import { describe, expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';
import { shipped, shippedText } from './shipped.ts';

test('at least four flowsheets are shipped', () => {
  expect(shipped.length).toBeGreaterThanOrEqual(4);
});

describe.each(shipped)('%s', (name) => {
  test('mass, atoms, every component and energy close to 1e-9', async () => {
    const { result, diagnosis } = balance(await read(shippedText(name)));
    expect(diagnosis).toBeNull();
    const open = [
      result.closure.mass,
      result.closure.energy,
      ...Object.values(result.closure.atoms),
      ...Object.values(result.ledger).map((entry) => entry.closure),
    ];
    expect(Math.max(...open.map(Math.abs))).toBeLessThan(1e-9);
  });

  test('it says that its case is invented', () => {
    expect(shippedText(name)).toMatch(/invented/i);
  });

  test('direct substitution, Wegstein, Anderson and auto give the same streams to 1e-7', async () => {
    const flowsheet = await read(shippedText(name));
    const reference = balance(flowsheet, { method: 'auto', tolerance: 1e-10 }).result;
    for (const method of ['direct', 'wegstein', 'anderson'] as const) {
      const { result, diagnosis } = balance(flowsheet, { method, maxPasses: 5000 });
      expect(diagnosis, method).toBeNull();
      for (const [tag, stream] of Object.entries(reference.streams)) {
        const other = result.streams[tag];
        const size = stream.flow_kmol_h;
        for (const [id, flow] of Object.entries(stream.components_kmol_h)) {
          expect(Math.abs(other.components_kmol_h[id] - flow), `${method} ${tag}.${id}`).toBeLessThanOrEqual(
            1e-7 * size,
          );
        }
        expect(Math.abs(other.temperature_K - stream.temperature_K), `${method} ${tag}`).toBeLessThan(
          1e-7 * 300,
        );
      }
    }
  });

  test('its cases solve', async () => {
    const flowsheet = await read(shippedText(name));
    for (const one of flowsheet.cases) {
      const { result } = balance(await read(shippedText(name), { case: one }));
      expect(result.convergence.converged, one).toBe(true);
      expect(result.case).toBe(one);
    }
  });

  test('the same file gives the same bytes', async () => {
    const once = JSON.stringify(balance(await read(shippedText(name))).result);
    expect(JSON.stringify(balance(await read(shippedText(name))).result)).toBe(once);
  });
});

describe('the ammonia loop', () => {
  const name = 'ammonia-loop.yaml';

  test('closes in at most 15 passes with auto, where direct substitution takes hundreds', async () => {
    const flowsheet = await read(shippedText(name));
    expect(balance(flowsheet, { method: 'auto' }).result.convergence.passes).toBeLessThanOrEqual(15);
    const direct = balance(flowsheet, { method: 'direct', maxPasses: 5000 }).result.convergence;
    expect(direct.converged).toBe(true);
    expect(direct.passes).toBeGreaterThan(200);
  });

  // Plausibility bands, common practice: EFMA booklet 1 (2000), Appl, Ammonia (Wiley-VCH); from memory.
  test('lies where such loops lie', async () => {
    const { figures, streams } = balance(await read(shippedText(name))).result;
    expect(figures.production_t_d).toBeGreaterThan(950);
    expect(figures.production_t_d).toBeLessThan(1050);
    expect(figures.per_pass_conversion['converter']['H2']).toBeGreaterThan(0.2);
    expect(figures.per_pass_conversion['converter']['H2']).toBeLessThan(0.35);
    expect(figures.recycle_ratio).toBeGreaterThan(2.3);
    expect(figures.recycle_ratio).toBeLessThan(5.5);
    expect(streams['S4'].mole_fraction['NH3']).toBeGreaterThan(0.02);
    expect(streams['S4'].mole_fraction['NH3']).toBeLessThan(0.045);
    expect(streams['S5'].mole_fraction['NH3']).toBeGreaterThan(0.12);
    expect(streams['S5'].mole_fraction['NH3']).toBeLessThan(0.2);
    expect(figures.inerts['converter']).toBeLessThan(0.15);
  });

  test('plain Raoult and an ideal gas tell another story', async () => {
    const real = balance(await read(shippedText(name))).result;
    const ideal = balance(await read(shippedText(name), { set: ['gas=ideal'] })).result;
    const slip = (r: typeof real) => r.streams['S6'].mole_fraction['NH3'];
    expect(slip(ideal)).toBeLessThan(0.65 * slip(real));
  });

  test('renaming a block changes no number', async () => {
    const text = shippedText(name);
    const renamed = text.replaceAll('circulator', 'fan');
    expect(renamed).not.toBe(text);
    const a = balance(await read(text)).result;
    const b = balance(await read(renamed)).result;
    expect(JSON.stringify(b).replaceAll('fan', 'circulator')).toBe(JSON.stringify(a));
  });
});

test('the conversion loop gives its closed-form answer to 1e-9', async () => {
  const { streams, figures } = balance(await read(shippedText('conversion-loop.yaml')), {
    tolerance: 1e-12,
  }).result;
  const X = 0.25;
  const p = 0.04;
  const N = 24.75 / (1 - (1 - X) * (1 - p));
  const A = 1 / p;
  const purge = p * ((1 - X) * 4 * N + A);
  const near = (value: number, wanted: number) => expect(Math.abs(value / wanted - 1)).toBeLessThan(1e-9);
  near(streams['S2'].components_kmol_h['N2'], N);
  near(streams['S2'].components_kmol_h['H2'], 3 * N);
  near(streams['S2'].components_kmol_h['Ar'], A);
  near(streams['S5'].components_kmol_h['NH3'], 2 * X * N);
  near(streams['S7'].flow_kmol_h, purge);
  near(streams['S8'].flow_kmol_h, ((1 - p) / p) * purge);
  near(figures.overall_conversion['N2'], X / (1 - (1 - X) * (1 - p)));
  near(figures.overall_yield?.value ?? 0, X / (1 - (1 - X) * (1 - p)));
});
