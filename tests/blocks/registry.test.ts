import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { blockKinds } from '../../src/blocks/registry.ts';
import { emptyStream, type StreamState } from '../../src/model/stream.ts';
import { cases, feed, feedsOf, ids, mixture, reactions, scaledTo10 } from './block-cases.ts';
import { copyOf, enthalpySize, expectBalances, expectClose, mixtureOf, trial } from './helpers.ts';

test('every kind of block is tried here', () => {
  expect(new Set(cases.map((one) => one.kind))).toEqual(new Set(blockKinds.keys()));
});

describe.each(cases)(
  '$name',
  ({ kind, raw, inlets = 1, step = 11, adiabatic, moves, meantFor = (value) => value }) => {
    const anyFeed = feed.map((value) => meantFor(scaledTo10(value)));

    test('keeps mass, atoms and energy', () => {
      fc.assert(
        fc.property(anyFeed, (value) => {
          expectBalances(
            trial(kind, raw, mixture, feedsOf(mixture, inlets, value, step), reactions),
            mixture,
          );
        }),
        { numRuns: 60 },
      );
    });

    test('gives nothing where nothing enters, and no NaN', () => {
      const empty = feedsOf(mixture, inlets, { celsius: 25, bar: 50, flows: ids.map(() => 0) });
      const { outlets, report } = trial(kind, raw, mixture, empty, reactions);
      for (const out of outlets) {
        expect([...out.flowsMolPerS]).toEqual(ids.map(() => 0));
        expect([...out.liquidMolPerS]).toEqual(ids.map(() => 0));
        expect(out.enthalpyW).toBe(0);
        expect(out.vapourFraction).not.toBeNaN();
        expect(Number.isFinite(out.temperatureK) && Number.isFinite(out.pressurePa)).toBe(true);
      }
      expect(report.dutyW).toBe(0);
      expect(report.powerW).toBe(0);
      expect(JSON.stringify(report)).not.toMatch(/NaN|Infinity/);
    });

    test('gives the same bytes when the same is done again', () => {
      fc.assert(
        fc.property(anyFeed, (value) => {
          const run = () => {
            const own = mixtureOf(ids, { reactions });
            return trial(kind, raw, own, feedsOf(own, inlets, value, step), reactions);
          };
          const [first, second] = [run(), run()];
          expect(second.outlets).toEqual(first.outlets);
          const said = ({ report }: typeof first) => ({ ...report, curves: report.curves() });
          expect(said(second)).toEqual(said(first));
        }),
        { numRuns: 10 },
      );
    });

    test('stays where it is when passed again', () => {
      fc.assert(
        fc.property(anyFeed, (value) => {
          const t = trial(kind, raw, mixture, feedsOf(mixture, inlets, value, step), reactions);
          const before = t.outlets.map(copyOf);
          t.pass();
          t.outlets.forEach((out, k) => {
            const old = before[k]!;
            expectClose(out.temperatureK, old.temperatureK, 1e-6, 'temperature');
            // of 10 mol/s; what boils within rounding of one temperature parts by the last digit
            expectClose(out.enthalpyW, old.enthalpyW, 1e-8 * enthalpySize(t.inlets, mixture), 'enthalpy');
            out.flowsMolPerS.forEach((flow, i) => {
              expectClose(flow, old.flowsMolPerS[i]!, 1e-6, 'flow');
            });
          });
        }),
        { numRuns: 20 },
      );
    });

    test('takes a moved setting at the next pass, as if built with it', () => {
      const value = meantFor({ celsius: 60, bar: 150, flows: [5, 2, 2, 0.3, 0.5, 0.2] });
      const t = trial(kind, raw, mixture, feedsOf(mixture, inlets, value, step), reactions);
      const before = JSON.stringify([t.outlets, t.report]);
      moveNumber(t.settings, moves[0], moves[1]);
      t.unit.pass(t.inlets, t.outlets);
      const after = JSON.stringify([t.outlets, t.unit.report(t.inlets, t.outlets)]);
      expect(after).not.toBe(before);
      const fresh = blockKinds.get(kind)!.create(t.settings, { name: kind, mixture, reactions });
      const outlets = t.outlets.map(copyOf);
      fresh.pass(t.inlets, outlets);
      outlets.forEach((out, k) => {
        expectClose(
          out.enthalpyW,
          t.outlets[k]!.enthalpyW,
          1e-8 * enthalpySize([out], mixture) + 1e-9,
          'enthalpy',
        );
        expectClose(out.temperatureK, t.outlets[k]!.temperatureK, 1e-6, 'temperature');
      });
    });

    test('hands on what it says without the heat of its inlets', () => {
      const { asksForHeat } = blockKinds.get(kind)!;
      fc.assert(
        fc.property(anyFeed, (value) => {
          const t = trial(kind, raw, mixture, feedsOf(mixture, inlets, value, step), reactions);
          const before = t.outlets.map(copyOf);
          if (t.unit.passFlows) {
            const flows = t.outlets.map(() => emptyStream(mixture.size));
            t.unit.passFlows(t.inlets, flows);
            flows.forEach((out, k) => {
              expectSameFlows(out, before[k]!);
            });
            t.pass();
          }
          const asks = (asked: boolean) => asksForHeat?.(t.settings, asked) ?? true;
          if (asks(false)) return;
          for (const inlet of t.inlets) {
            inlet.temperatureK += 7;
            mixture.settle(inlet);
          }
          const told = JSON.stringify(t.unit.report(t.inlets, t.outlets));
          t.pass();
          t.outlets.forEach((out, k) => {
            expectSameFlows(out, before[k]!);
          });
          if (asks(true)) return;
          t.outlets.forEach((out, k) => {
            expect(out.temperatureK).toBe(before[k]!.temperatureK);
          });
          expect(numbersOf(JSON.stringify(t.unit.report(t.inlets, t.outlets)))).toEqual(
            numbersOf(told).map((number) => expect.closeTo(number, 4)),
          );
        }),
        { numRuns: 10 },
      );
    });

    if (!adiabatic) return;
    test('never lets entropy fall', () => {
      fc.assert(
        fc.property(anyFeed, (value) => {
          const { inlets: from, outlets } = trial(
            kind,
            raw,
            mixture,
            feedsOf(mixture, inlets, value, step),
            reactions,
          );
          const before = from.reduce((sum, s) => sum + mixture.entropy(s), 0);
          const after = outlets.reduce((sum, s) => sum + mixture.entropy(s), 0);
          expect(after - before).toBeGreaterThanOrEqual(-1e-9 * Math.abs(before));
        }),
        { numRuns: 60 },
      );
    });
  },
);

function expectSameFlows(out: StreamState, before: StreamState): void {
  expect(out.pressurePa).toBe(before.pressurePa);
  out.flowsMolPerS.forEach((flow, i) => {
    expectClose(flow, before.flowsMolPerS[i]!, 1e-8, 'flow');
  });
}

function numbersOf(json: string): number[] {
  return (json.match(/-?\d+(?:\.\d+)?(?:e[-+]?\d+)?/g) ?? []).map(Number);
}

function moveNumber(settings: Record<string, unknown>, path: readonly string[], to: number): void {
  const last = path.length - 1;
  let place = settings;
  for (const key of path.slice(0, last)) place = place[key] as Record<string, unknown>;
  place[path[last]!] = to;
}
