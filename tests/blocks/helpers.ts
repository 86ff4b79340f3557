import { expect } from 'vitest';
import type { BlockKind, BlockReport, KnownNames, Unit } from '../../src/blocks/block.ts';
import { blockKinds } from '../../src/blocks/registry.ts';
import { parseReaction } from '../../src/chemistry/reaction-text.ts';
import type { Component } from '../../src/model/component.ts';
import type { GasModelName } from '../../src/model/flowsheet.ts';
import type { ConstantSource, Reaction } from '../../src/model/reaction.ts';
import { copyStream, emptyStream, type StreamState } from '../../src/model/stream.ts';
import { builtInComponent } from '../../src/properties/components.ts';
import { enthalpyBasisFor } from '../../src/properties/ideal-gas.ts';
import { createMixture, type Mixture } from '../../src/properties/mixture.ts';

export const KELVIN = 273.15;
export const BAR = 1e5;

export function components(...ids: string[]): Component[] {
  return ids.map((id) => {
    const found = builtInComponent(id);
    if (!found) throw new Error(`no component ${id}`);
    return found;
  });
}

export function reaction(
  name: string,
  equation: string,
  list: readonly Component[],
  constant: ConstantSource = { kind: 'gibbs' },
): Reaction {
  const parsed = parseReaction(equation, list);
  if (!parsed.ok) throw new Error(parsed.faults.map((fault) => fault.what).join(' '));
  return { name, equation, coefficients: parsed.coefficients, constant };
}

/** A mixture of built-in components. */
export function mixtureOf(
  ids: readonly string[],
  options: { gas?: GasModelName; dissolvedGases?: boolean; reactions?: readonly Reaction[] } = {},
): Mixture {
  const list = components(...ids);
  return createMixture({
    components: list,
    gas: options.gas ?? 'srk',
    dissolvedGases: options.dissolvedGases ?? true,
    basis: enthalpyBasisFor(list, options.reactions ?? []),
  });
}

/** A settled stream; flows in mol/s by id, the rest 0. */
export function streamOf(
  mixture: Mixture,
  state: { celsius?: number; kelvin?: number; bar: number; flows: Readonly<Record<string, number>> },
): StreamState {
  const stream = emptyStream(mixture.size);
  mixture.components.forEach((c, i) => {
    stream.flowsMolPerS[i] = state.flows[c.id] ?? 0;
  });
  stream.temperatureK = state.kelvin ?? (state.celsius ?? 25) + KELVIN;
  stream.pressurePa = state.bar * BAR;
  mixture.settle(stream);
  return stream;
}

export interface Trial {
  readonly kind: BlockKind;
  /** the settings object the unit reads from; its numbers may be moved */
  readonly settings: Record<string, unknown>;
  readonly unit: Unit;
  readonly inlets: readonly StreamState[];
  readonly outlets: readonly StreamState[];
  /** one more pass with the inlets as they stand */
  pass(): BlockReport;
  readonly report: BlockReport;
}

/** Build a block from settings as a file would give them, and pass once. */
export function trial(
  kindName: string,
  raw: unknown,
  mixture: Mixture,
  inlets: readonly StreamState[],
  reactions: readonly Reaction[] = [],
): Trial {
  const kind = blockKinds.get(kindName)!;
  const settings = kind.settings.parse(raw) as Record<string, unknown>;
  const unit = kind.create(settings, { name: kindName, mixture, reactions });
  const outlets = kind.ports(settings).outlets.map(() => emptyStream(mixture.size));
  const pass = (): BlockReport => {
    unit.pass(inlets, outlets);
    return unit.report(inlets, outlets);
  };
  return { kind, settings, unit, inlets, outlets, pass, report: pass() };
}

/** Faults that a kind finds in settings written as in a file. */
export function faultsOf(kindName: string, raw: unknown, known: Partial<KnownNames> = {}) {
  const kind = blockKinds.get(kindName)!;
  const settings = kind.settings.parse(raw) as object;
  return kind.check?.(settings, { components: [], reactions: [], ...known }) ?? [];
}

/** Is a raw setting turned down by the schema of the kind? */
export function refusedBySchema(kindName: string, raw: unknown): boolean {
  return !blockKinds.get(kindName)!.settings.safeParse(raw).success;
}

export function copyOf(stream: StreamState): StreamState {
  const copy = emptyStream(stream.flowsMolPerS.length);
  copyStream(stream, copy);
  return copy;
}

/** Mole fraction of a component in all that flows. */
export function fractionOf(stream: StreamState, mixture: Mixture, id: string): number {
  return flowOf(stream, mixture, id) / mixture.total(stream);
}

export function flowOf(stream: StreamState, mixture: Mixture, id: string): number {
  return stream.flowsMolPerS[mixture.components.findIndex((c) => c.id === id)]!;
}

/** Mass, atoms and energy over a block, and every outlet's enthalpy that of its own state. */
export function expectBalances(t: Trial, mixture: Mixture): void {
  const sum = (streams: readonly StreamState[], of: (s: StreamState) => number) =>
    streams.reduce((total, s) => total + of(s), 0);
  const massIn = sum(t.inlets, mixture.mass);
  expectClose(sum(t.outlets, mixture.mass), massIn, 1e-12 * massIn, 'mass');
  const elements = new Set(mixture.components.flatMap((c) => Object.keys(c.elements)));
  for (const element of elements) {
    const atoms = (s: StreamState) =>
      mixture.components.reduce((n, c, i) => n + s.flowsMolPerS[i]! * (c.elements[element] ?? 0), 0);
    const atomsIn = sum(t.inlets, atoms);
    expectClose(sum(t.outlets, atoms), atomsIn, 1e-12 * atomsIn, `atoms of ${element}`);
  }
  const { dutyW, powerW, driveLossW } = t.report;
  const size = enthalpySize([...t.inlets, ...t.outlets], mixture) + Math.abs(dutyW) + Math.abs(powerW);
  const added = sum(t.outlets, (s) => s.enthalpyW) - sum(t.inlets, (s) => s.enthalpyW);
  expectClose(added, dutyW + powerW - driveLossW, 1e-12 * size, 'energy');
  for (const out of t.outlets) {
    const again = copyOf(out);
    mixture.settlePhases(again);
    // A nearly pure fluid boils within rounding of one temperature, and its share of vapour there hangs on the last
    // digit: the two sides of that digit are mixed to meet the enthalpy. Else the two agree to 1e-12.
    expectClose(again.enthalpyW, out.enthalpyW, 1e-6 * size, 'enthalpy of an outlet');
    out.liquidMolPerS.forEach((liquid, i) => {
      expect(liquid).toBeGreaterThanOrEqual(0);
      expect(liquid).toBeLessThanOrEqual(out.flowsMolPerS[i]!);
    });
  }
}

/** Sum of the sizes of the terms that an enthalpy is made of: formation enthalpies cancel between them. */
export function enthalpySize(streams: readonly StreamState[], mixture: Mixture): number {
  const h = new Float64Array(mixture.size);
  let size = 0;
  for (const stream of streams) {
    mixture.idealGas.enthalpies(stream.temperatureK, h);
    h.forEach((value, i) => {
      size += stream.flowsMolPerS[i]! * (Math.abs(value) + 1e4);
    });
  }
  return size;
}

export function expectClose(actual: number, wanted: number, allowed: number, what = ''): void {
  expect(
    Math.abs(actual - wanted),
    `${what}: ${actual} against ${wanted}, allowed ${allowed}`,
  ).toBeLessThanOrEqual(allowed);
}

/** What a pass throws: the code of the PassTrouble. */
export function troubleOf(run: () => unknown): string {
  try {
    run();
  } catch (error) {
    return (error as { code?: string }).code ?? `not a PassTrouble: ${error}`;
  }
  return 'none';
}
