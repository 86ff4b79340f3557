import { type Finding, wayText } from './why.ts';
import type { Facts } from './why-facts.ts';
import type { ComponentFlows } from './why-flows.ts';
import { kmolPerHour, perCent } from './why-format.ts';
import { SENSIBLE_RECYCLE } from './why-trial.ts';

/** Shares tried for the advice, smallest first [-]. */
const SHARES = [0.001, 0.003, 0.01, 0.03, 0.1, 0.3];

/** This much of what enters stays in the loop: it is no remnant of the way to the answer. */
const STAYS = 0.1;

/** A share set in the file that takes a component out of the loop: a purge, or a recovery. */
interface ExitSetting {
  readonly path: string;
  readonly value: number;
}

/** The largest purge of the loop; where there is none, the largest recovery of the component. */
function exitSetting({ plant, group }: Facts, { id }: ComponentFlows): ExitSetting | null {
  const inLoop = new Set(group.blocks.map((b) => plant.blocks[b].name));
  const paths = plant.flowsheet.streams.flatMap(({ from, to }) => {
    if (!inLoop.has(from.name) || (to !== null && inLoop.has(to.name))) return [];
    if (from.port === null || from.port === 'rest') return [];
    const { kind, settings } = plant.blocks.find((b) => b.name === from.name)!;
    if (kind === 'splitter' && settings['fractions']) return [`${from.name}.fractions.${from.port}`];
    const recover = settings['recover'] as Record<string, Record<string, number>> | undefined;
    if (kind === 'separator' && recover?.[from.port]?.[id] !== undefined)
      return [`${from.name}.recover.${from.port}.${id}`];
    return [];
  });
  const settings = paths.map((path) => ({ path, value: plant.get(path) ?? 0 }));
  const rank = ({ path, value }: ExitSetting) => (path.includes('.fractions.') ? 1 : 0) + value / 2;
  return settings.sort((a, b) => rank(b) - rank(a))[0] ?? null;
}

/** The setting of the way out that is to be widened; {} leaves the message at the torn stream. */
export function placeOfExit(facts: Facts, piling: ComponentFlows): Pick<Finding, 'where'> {
  const exit = exitSetting(facts, piling);
  return exit === null ? {} : { where: facts.plant.flowsheet.placeOf(`blocks.${exit.path}`) };
}

/** A way out that is tried; where the loop has none that is set as a share, where to put one. */
export function exitAdvice(facts: Facts, piling: ComponentFlows): string {
  const exit = exitSetting(facts, piling);
  const other =
    piling.formed < 0
      ? othersStay(facts, piling)
        ? 'or more conversion in a pass: a hotter or colder reactor, more pressure, more catalyst'
        : 'or a feed closer to the stoichiometric ratio'
      : piling.enters > 0
        ? `or less ${piling.id} in the feed`
        : `or a block that takes ${piling.id} out of the recycle`;
  if (exit === null) return `put a splitter with a purge into the recycle, ${other}`;
  for (const value of SHARES) {
    if (value < 2 * exit.value) continue;
    const trial = facts.tryOut([[exit.path, value]]);
    if (trial === null || trial.recycle > SENSIBLE_RECYCLE * facts.fed) continue;
    return (
      `raise ${exit.path} from ${perCent(exit.value)} to ${perCent(value)}, by which the loop closes ${wayText(trial, facts.options)}, ` +
      `${kmolPerHour(trial.recycle)} going round with ${perCent(trial.fractions[piling.index])} ${piling.id} (tried); ${other}`
    );
  }
  return `raise ${exit.path}, now ${perCent(exit.value)}, ${other}`;
}

/** Does another reactant stay in the loop as well? Then their ratio is not what keeps them there. */
function othersStay({ flows }: Facts, { index }: ComponentFlows): boolean {
  return flows.some(
    (flow) =>
      flow.index !== index &&
      flow.formed < 0 &&
      flow.enters + flow.formed - flow.leaves > STAYS * flow.enters,
  );
}
