import type { AimsOutcome } from '../convergence/aims.ts';
import type { AimTask } from './aim-task.ts';

/** Why an aim was not reached, in one sentence or two. */
export function notesOf(
  outcome: AimsOutcome,
  { aims, low, high }: AimTask,
  achieved: readonly number[],
): (a: number) => string {
  return (a) => {
    const { singular, trouble, evaluations } = outcome;
    const parts: string[] = [];
    if (singular?.includes(a)) {
      const others = singular.filter((i) => i !== a);
      const named = others.map((i) => `${aims[i].name} (which has ${digits(achieved[i])})`).join(' and ');
      if (others.length === 0) parts.push(`no setting moves ${aims[a].until.text}, ${digits(achieved[a])}`);
      else parts.push(`it cannot be met along with the aim ${named}: the settings move them alike`);
    }
    const bounds = outcome.limit < 0 ? [] : boundsMet();
    if (bounds.length > 0) parts.push(`stopped at the ${bounds.join(' and the ')}`);
    if (parts.length > 0) return parts.join('; ');
    if (trouble) return `the loop does not close on the way: ${trouble.message}`;
    return `between the bounds it came no nearer in ${evaluations} tries`;
  };

  function boundsMet(): string[] {
    return aims.flatMap(({ move }, a) => {
      if (outcome.values[a] === low[a]) return [`lower bound of ${move}`];
      return outcome.values[a] === high[a] ? [`upper bound of ${move}`] : [];
    });
  }
}

function digits(value: number): string {
  return String(Number(value.toPrecision(6)));
}
