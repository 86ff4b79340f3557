import { blocksSection, ledgerSection } from './balance-sections.ts';
import { convertersSection, heatCurvesSection, passesSection } from './chart-sections.ts';
import { figuresSection, storySection } from './figure-sections.ts';
import {
  assumptionsSection,
  cautionsSection,
  settingsSection,
  sourcesSection,
  warningsSection,
} from './note-sections.ts';
import { streamsSection } from './stream-section.ts';
import { tradeOffSection } from './trade-off-section.ts';
import type { PagePart } from './view.ts';

/** The sections that stand before the flow diagram. */
export const partsBefore: readonly PagePart[] = [
  { id: 'loop', heading: 'The loop in numbers', render: storySection, figures: true },
  { id: 'warnings', heading: 'Warnings', render: warningsSection, figures: true },
];

/** The sections behind it, in their order. */
export const partsAfter: readonly PagePart[] = [
  { id: 'streams', heading: 'Streams', render: streamsSection, figures: true },
  { id: 'ledger', heading: 'Ledger and closure', render: ledgerSection, figures: true },
  { id: 'trade-offs', heading: 'Trade-offs', render: tradeOffSection, figures: true },
  { id: 'converters', heading: 'Converters', render: convertersSection, figures: true },
  { id: 'heat', heading: 'Heat curves', render: heatCurvesSection, figures: true },
  { id: 'blocks', heading: 'Blocks', render: blocksSection, figures: true },
  { id: 'figures', heading: 'Key figures', render: figuresSection, figures: true },
  { id: 'settings', heading: 'Settings', render: settingsSection, figures: false },
  { id: 'passes', heading: 'Passes of the solver', render: passesSection, figures: false },
  { id: 'assumptions', heading: 'Assumptions', render: assumptionsSection, figures: false },
  { id: 'sources', heading: 'Sources', render: sourcesSection, figures: false },
  { id: 'cautions', heading: 'Cautions', render: cautionsSection, figures: false },
];

export const drawingPart = { id: 'diagram', heading: 'Flow diagram' } as const;
