import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { aligned, columnGroups } from '../../src/sheets/table.ts';

describe('an aligned table', () => {
  test('puts names to the left and numbers to the right, without blanks at the end', () => {
    expect(
      aligned(
        [
          ['stream', 'kmol/h'],
          ['S1', '6500.00'],
          ['S10', ''],
        ],
        { indent: 2 },
      ),
    ).toEqual(['  stream   kmol/h', '  S1      6500.00', '  S10']);
  });

  test('splits its columns into groups that fit, none lost and none twice', () => {
    fc.assert(
      fc.property(
        fc.array(fc.string({ maxLength: 30 }), { minLength: 1, maxLength: 20 }),
        fc.nat(120),
        (heads, width) => {
          const rows = [['name', ...heads]];
          const groups = columnGroups(rows, width);
          expect(groups.flatMap((group) => group.slice(1))).toEqual(heads.map((_, index) => index + 1));
          for (const group of groups) {
            const used = group.reduce((sum, column) => sum + [...rows[0]![column]!].length + 2, -2);
            expect(used <= width || group.length === 2).toBe(true);
          }
        },
      ),
    );
  });
});
