import { expect, expectTypeOf, test } from 'vitest';
import { z } from 'zod';
import { count, flow, fraction, plainNumber, quantity } from '../../src/units/schema.ts';

const settings = z.strictObject({
  temperature: quantity('temperature', { description: 'outlet temperature' }),
  pressure_drop: quantity('pressureDifference', { min: 0 }).optional(),
  efficiency: fraction({ min: 0.05 }).default(0.75),
  stages: count({ max: 10 }).optional(),
  ratio: plainNumber({ above: 1 }).optional(),
  feed: flow().optional(),
});

test('settings come out as plain numbers in SI', () => {
  expectTypeOf<z.infer<typeof settings>['temperature']>().toEqualTypeOf<number>();
  expect(
    settings.parse({
      temperature: '450 degC',
      pressure_drop: '4 bar',
      stages: 3,
      ratio: 1.05,
      feed: '86.4 t/d',
    }),
  ).toEqual({
    temperature: 723.15,
    pressure_drop: 4e5,
    efficiency: 0.75,
    stages: 3,
    ratio: 1.05,
    feed: { value: 1, per: 'mass' },
  });
});

test.each([
  [{ temperature: 450 }, ['temperature'], 'missing-unit'],
  [{}, ['temperature'], 'missing'],
  [{ temperature: null }, ['temperature'], 'empty-value'],
  [{ temperature: ['1 K'] }, ['temperature'], 'wrong-type'],
  [{ temperature: '5 K', pressure_drop: '-1 bar' }, ['pressure_drop'], 'out-of-range'],
  [{ temperature: '5 K', efficiency: 78 }, ['efficiency'], 'out-of-range'],
  [{ temperature: '5 K', stages: 2.5 }, ['stages'], 'out-of-range'],
  [{ temperature: '5 K', ratio: '1.05 bar' }, ['ratio'], 'wrong-unit'],
  [{ temperature: '5 K', feed: '5 kml/h' }, ['feed'], 'unknown-unit'],
])('%j is faulted at %j as %s', (input, path, code) => {
  const issues = settings.safeParse(input).error?.issues ?? [];
  expect(issues).toHaveLength(1);
  expect(issues[0].path).toEqual(path);
  expect(issues[0]).toMatchObject({ code: 'custom', params: { code } });
});

test('the JSON Schema of a quantity is text with a unit, with examples', () => {
  const { properties, required } = z.toJSONSchema(settings, { io: 'input' });
  expect(required).toEqual(['temperature']);
  expect(properties?.['temperature']).toMatchObject({
    type: 'string',
    description: 'outlet temperature [degC, K, degF]',
    examples: ['450 degC', '723.15 K'],
  });
  const pattern = String((properties?.['temperature'] as { pattern?: string } | undefined)?.pattern);
  expect('450 degC').toMatch(new RegExp(pattern));
  expect('450').not.toMatch(new RegExp(pattern));
});
