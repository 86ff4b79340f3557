import { ammoniaEquilibrium, ammoniaOverCondensate } from './deviations-ammonia.ts';
import { bubblePointRows } from './deviations-bubble-points.ts';
import { chemistryRows } from './deviations-chemistry.ts';
import { convergenceCounts, tearRow } from './deviations-convergence.ts';
import { converterRows } from './deviations-converters.ts';
import { machineRows } from './deviations-machines.ts';
import { propertyRows } from './deviations-properties.ts';
import { recycleDeviations } from './deviations-recycle-examples.ts';
import { refrigerationRows } from './deviations-refrigeration.ts';
import { summaryTable } from './deviations-row.ts';

/**
 * How far Looptally's numbers lie from published ones, as Markdown: every figure is computed here and now, so that
 * what README says of it cannot grow old. tests/readme.test.ts compares, or writes it with UPDATE_README=1.
 */
export function deviations(): string {
  const summary = summaryTable([
    ...propertyRows(),
    ...bubblePointRows(),
    ...chemistryRows(),
    ...machineRows(),
    ...refrigerationRows(),
    ...converterRows(),
    {
      what: 'recycle and purge examples of textbooks, five loops',
      source:
        'Narayanan & Lakshmikutty 10.22; Ghoshal and others 3.14; Felder & Rousseau ch. 4 (from memory) and 4.7-3; a course notebook',
      unit: '%',
      deviations: recycleDeviations(),
      remark: 'answers printed to three or four digits',
    },
    tearRow(),
  ]);
  return [
    ammoniaEquilibrium(),
    ammoniaOverCondensate(),
    '**Everything else.** Mean of the sizes and worst value; % of the published value unless another unit stands there.',
    summary,
    convergenceCounts(),
  ].join('\n\n');
}
