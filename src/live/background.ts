import type { Flowsheet, Formula, Handle } from '../model/flowsheet.ts';
import { type TradeOff, tradeOffSteps } from '../study/trade-off.ts';

/** Works trade-offs out beside everything else, a few places at a time. */
export interface Background {
  /** begin anew, and forget what was begun */
  start(flowsheet: Flowsheet, handles: readonly Handle[], formulas: readonly Formula[]): void;
  stop(): void;
}

/** What a page may take at a time without a hand feeling it [ms]. */
const SLICE_MS = 8;

export function createBackground(done: (found: readonly TradeOff[]) => void): Background {
  let timer = 0;
  return {
    start(flowsheet, handles, formulas) {
      window.clearTimeout(timer);
      const found: TradeOff[] = [];
      let steps: ReturnType<typeof tradeOffSteps> | null = null;
      const slice = () => {
        const until = performance.now() + SLICE_MS;
        while (performance.now() < until) {
          const handle = handles[found.length];
          if (handle === undefined) {
            done(found);
            return;
          }
          steps ??= tradeOffSteps(flowsheet, handle, formulas);
          const step = steps.next();
          if (step.done) {
            found.push(step.value);
            steps = null;
          }
        }
        timer = window.setTimeout(slice);
      };
      timer = window.setTimeout(slice);
    },
    stop() {
      window.clearTimeout(timer);
    },
  };
}
