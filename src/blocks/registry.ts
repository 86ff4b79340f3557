import type { BlockKind } from './block.ts';
import { compressor } from './compressor.ts';
import { condenser } from './condenser.ts';
import { exchanger } from './exchanger.ts';
import { expander } from './expander.ts';
import { flash } from './flash.ts';
import { heater } from './heater.ts';
import { kineticBed } from './kinetic-bed.ts';
import { mixer } from './mixer.ts';
import { pump } from './pump.ts';
import { reactor } from './reactor.ts';
import { separator } from './separator.ts';
import { splitter } from './splitter.ts';
import { valve } from './valve.ts';

/** Every kind of block by the name it has in a file. A new kind needs its file, its test and one line here. */
export const blockKinds: ReadonlyMap<string, BlockKind> = new Map(
  [
    mixer,
    splitter,
    reactor,
    kineticBed,
    condenser,
    flash,
    heater,
    exchanger,
    compressor,
    expander,
    pump,
    valve,
    separator,
  ].map(
    // Each kind takes only its own settings; the reader checks them against the kind's schema first.
    (kind) => [kind.kind, kind as unknown as BlockKind],
  ),
);
