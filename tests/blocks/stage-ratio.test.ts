import fc from 'fast-check';
import { expect, test } from 'vitest';
import { stageRatio } from '../../src/blocks/stage-ratio.ts';
import { expectClose } from './helpers.ts';

test('equal ratios with a drop in each cooler lead to the discharge pressure', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 1e5, max: 3e6, noNaN: true }),
      fc.double({ min: 1, max: 50, noNaN: true }),
      fc.integer({ min: 1, max: 8 }),
      fc.double({ min: 0, max: 3e5, noNaN: true }),
      (inletPa, overall, stages, dropPa) => {
        const ratio = stageRatio(inletPa, inletPa * overall, stages, dropPa);
        let pressurePa = inletPa * ratio;
        for (let k = 1; k < stages; k++) {
          expect(pressurePa - dropPa).toBeGreaterThan(0);
          pressurePa = (pressurePa - dropPa) * ratio;
        }
        expectClose(pressurePa, inletPa * overall, 1e-9 * inletPa * overall);
      },
    ),
  );
});

test('without drops it is the root of the whole ratio', () => {
  expect(stageRatio(25e5, 200e5, 3, 0)).toBe(2);
});
