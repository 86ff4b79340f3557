import { expect } from 'vitest';
import type { EquilibriumCase, EquilibriumCaseResult } from '../../src/chemistry/equilibrium-case.ts';
import { solveEquilibriumCase } from '../../src/chemistry/equilibrium-case.ts';
import { parseReaction } from '../../src/chemistry/reaction-text.ts';
import type { Component } from '../../src/model/component.ts';
import type { ConstantSource, Reaction } from '../../src/model/reaction.ts';
import { builtInComponent } from '../../src/properties/components.ts';

export function builtIn(...ids: string[]): Component[] {
  return ids.map((id) => {
    const component = builtInComponent(id);
    if (component === undefined) throw new Error(`no component ${id}`);
    return component;
  });
}

export function reaction(
  equation: string,
  components: readonly Component[],
  constant: ConstantSource = { kind: 'gibbs' },
): Reaction {
  const parsed = parseReaction(equation, components);
  if (!parsed.ok) throw new Error(parsed.faults.map((f) => f.what).join(' '));
  return { name: equation, equation, coefficients: parsed.coefficients, constant };
}

export function fixedLnK(lnK: number, standardPressurePa = 1e5): ConstantSource {
  return { kind: 'formula', text: String(lnK), lnK: () => lnK, standardPressurePa };
}

/** A case from a feed by id; ideal gas at 1 bar unless said otherwise. */
export function solveCase(
  reactions: readonly (readonly [string, ConstantSource] | string)[],
  feed: Readonly<Record<string, number>>,
  rest: Partial<EquilibriumCase> & { temperatureK: number },
  extra: readonly string[] = [],
): EquilibriumCaseResult {
  const ids = [...new Set([...Object.keys(feed), ...extra])];
  const components = builtIn(...ids);
  return solveEquilibriumCase({
    components,
    reactions: reactions.map((r) =>
      typeof r === 'string' ? reaction(r, components) : reaction(r[0], components, r[1]),
    ),
    pressurePa: 1e5,
    feed: Float64Array.from(ids, (id) => feed[id] ?? 0),
    gas: 'ideal',
    approachK: 0,
    adiabatic: false,
    ...rest,
  });
}

export function expectRelative(actual: number, expected: number, tolerance: number): void {
  expect(Math.abs(actual / expected - 1), `${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);
}

export function expectWithin(actual: number, expected: number, tolerance: number): void {
  expect(Math.abs(actual - expected), `${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);
}
