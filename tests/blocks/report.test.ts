import { expect, test } from 'vitest';
import { enthalpyAdded, quietReport } from '../../src/blocks/report.ts';
import { emptyStream } from '../../src/model/stream.ts';

test('a block that has nothing to say reports zeros', () => {
  const { curves, ...said } = quietReport();
  expect(curves()).toEqual({});
  expect(said).toEqual({
    dutyW: 0,
    powerW: 0,
    driveLossW: 0,
    refrigerationW: 0,
    details: {},
    warnings: [],
    faults: [],
    assumptions: [],
  });
  expect(quietReport({ dutyW: 5 }).dutyW).toBe(5);
});

test('the enthalpy added is what leaves less what enters', () => {
  const holding = (enthalpyW: number) => Object.assign(emptyStream(1), { enthalpyW });
  expect(enthalpyAdded([holding(3), holding(4)], [holding(10)])).toBe(3);
});
