import { describe, expect, test } from 'vitest';
import { commandLine } from './looptally.ts';

const { run } = commandLine();

describe('data', () => {
  test('without a name lists components and published constants', () => {
    const { code, out, err } = run(['data']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toMatch(/\n {2}NH3 +NH3 +ammonia +7664-41-7 +17\.031 /);
    expect(out).toContain('gillespie-beattie-1930');
  });

  test('the list as JSON has the units in its keys', () => {
    const { components, constants } = JSON.parse(run(['data', '--json']).out);
    expect(components.find((line: { id: string }) => line.id === 'H2O').molar_mass_g_mol).toBeCloseTo(
      18.015,
      3,
    );
    expect(constants[0]).toMatchObject({ name: 'gillespie-beattie-1930', standard_pressure_bar: 1.01325 });
  });

  test('of a component shows every number with the number of its source, and the source below', () => {
    const { out } = run(['data', 'NH3']);
    const numbers = [...out.matchAll(/ \[(\d+)\]$/gm)].map((match) => Number(match[1]));
    const listed = [...out.slice(out.indexOf('\nSources\n')).matchAll(/^ {2}\[(\d+)\] /gm)].map((match) =>
      Number(match[1]),
    );
    expect(numbers.length).toBeGreaterThan(10);
    expect([...new Set(numbers)].sort((a, b) => a - b)).toEqual(listed);
  });

  test('of a published constant shows all reactions it is for', () => {
    expect(run(['data', 'graaf-1986']).out.match(/^ {2}graaf-1986 /gm)).toHaveLength(3);
    expect(JSON.parse(run(['data', 'moe-1962', '--json']).out).constants).toHaveLength(1);
  });
});

describe('schema', () => {
  test('is a JSON Schema', () => {
    const { code, out, err } = run(['schema']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(JSON.parse(out)).toMatchObject({ type: 'object' });
  });
});
