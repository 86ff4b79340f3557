import { expect, test } from 'vitest';
import { portName } from '../../src/blocks/port-name.ts';

test.each(['bleed', 'To_header2', 'x'])('%s can be the name of an outlet', (name) => {
  expect(portName.safeParse(name).success).toBe(true);
});

test.each(['rest', '', '2nd', 'to header', 'a.b', 'a-b'])('"%s" cannot be the name of an outlet', (name) => {
  expect(portName.safeParse(name).success).toBe(false);
});
