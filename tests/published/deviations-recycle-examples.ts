import { type Deviation, percent } from './deviations-statistics.ts';
import { examples, resultOf } from './recycle-examples.ts';

/** Every printed answer against the closed loop. */
export function recycleDeviations(): Deviation[] {
  return examples.flatMap((example) => {
    const result = resultOf(example);
    return example.answers.map(([what, printed, ours]) =>
      percent(`${example.name}, ${what}`, ours(result), printed),
    );
  });
}
