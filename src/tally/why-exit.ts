import { answerText, type Finding, slowestModeText } from './why.ts';
import { exitAdvice, placeOfExit } from './why-exit-advice.ts';
import type { Facts } from './why-facts.ts';
import type { ComponentFlows } from './why-flows.ts';
import { figure, kmolPerHour, perCent } from './why-format.ts';

/** Of what goes round, a smaller share than this that leaves is no way out but on paper. */
const NO_EXIT = 1e-6;
/** A smaller share than this that leaves makes the loop slow and its recycle huge. */
const SMALL_EXIT = 1e-3;
/** The same where the loop closes by no method: what mostly stays in it is then why. */
const OPEN_EXIT = 2e-2;
/** What comes into the loop and stays in it is of no account below this share of all that enters. */
const NOTHING = 1e-9;
/** What makes up more than this of a recycle is what it has grown by. */
const MOST_OF_IT = 0.5;
/** Most of what is supplied to the loop stays in it: it piles up. */
const STAYS = 0.3;

/** A recycle this many times the feed has run away rather than not yet closed. */
const RUNAWAY = 1000;

/** A component that can leave on paper and in fact does not. */
export function noRealExit(facts: Facts): Finding | null {
  const piling = pilingUp(facts, 0, NO_EXIT);
  if (piling === null) return null;
  return {
    code: 'exit-too-small',
    isOfDirectPasses: true,
    what: `${piling.id} has no way out to speak of`,
    why: `${supplyText(piling)}, and ${piling.leaves > 0 ? `only ${kmolPerHour(piling.leaves)} leave (${exitsText(piling)}): to leave as fast as it comes, ${kmolPerHour(needed(piling))} of it would have to go round` : `none leaves (${exitsText(piling)})`}`,
    mend: exitAdvice(facts, piling),
    ...placeOfExit(facts, piling),
  };
}

/** A purge by which the loop closes in principle, after very many passes and with a huge recycle. */
export function smallPurge(facts: Facts): Finding | null {
  const piling = pilingUp(facts, NO_EXIT, facts.answer === null ? OPEN_EXIT : SMALL_EXIT);
  if (piling === null) return null;
  const { answer } = facts;
  const there =
    answer === null
      ? `by that share, ${kmolPerHour(needed(piling))} of it would have to go round before as much leaves`
      : `closed, ${kmolPerHour(answer.recycle)} go round with ${perCent(answer.fractions[piling.index])} ${piling.id} in it`;
  const sentences = [
    `${supplyText(piling)}, and ${perCent(piling.leaves / piling.round)} of what goes round leaves in a pass (${exitsText(piling)})`,
    slowestModeText(facts),
    there,
  ].filter((text) => text !== '');
  return {
    code: 'small-purge',
    isOfDirectPasses: true,
    what: `the way out for ${piling.id} is too small for the passes allowed`,
    why: sentences.join('; '),
    mend: [exitAdvice(facts, piling), answerText(facts)].filter((text) => text !== '').join('; '),
    ...placeOfExit(facts, piling),
  };
}

/** The recycle has grown out of all proportion and closes by no method: an exit that cannot take what comes. */
export function overfullExit(facts: Facts): Finding | null {
  const { fed, answer } = facts;
  const { flows, recycle } = facts.last;
  if (answer !== null || !(recycle > RUNAWAY * fed)) return null;
  const piling = flows.find(({ round }) => round > MOST_OF_IT * recycle);
  if (piling === undefined || !(supplyOf(piling) > Math.max(piling.leaves, NOTHING * fed))) return null;
  return {
    code: 'exit-too-small',
    what: `more ${piling.id} comes into the loop than its ways out carry`,
    why: `the recycle has grown to ${kmolPerHour(recycle)}, ${figure(recycle / fed)} times the feed, and is ${perCent(Math.min(piling.round / recycle, 1))} ${piling.id}: ${supplyText(piling)}, and even so only ${kmolPerHour(piling.leaves)} leave (${exitsText(piling)})`,
    mend: exitAdvice(facts, piling),
    ...placeOfExit(facts, piling),
  };
}

/** What the loop gets of a component in a pass, less what its reactions take [mol/s]. */
function supplyOf({ enters, formed }: ComponentFlows): number {
  return enters + formed;
}

/** The component of the largest supply that mostly stays in the loop while a share within bounds leaves. */
function pilingUp(facts: Facts, from: number, below: number): ComponentFlows | null {
  const found = facts.flows.filter((flow) => {
    const share = flow.leaves / flow.round;
    const supply = supplyOf(flow);
    if (!(flow.round > 0 && share >= from && share < below && supply > NOTHING * facts.fed)) return false;
    if (supply - flow.leaves < STAYS * supply) return false;
    // What reacts is short or in excess while the loop is on its way: only steady growth is no such thing.
    return flow.formed === 0 || growsSteadily(facts, flow.index, supply);
  });
  return found.sort((a, b) => supplyOf(b) - supplyOf(a))[0] ?? null;
}

/** Does it grow by as much in the first and in the second half of further direct passes, and by most of its supply? */
function growsSteadily({ onward, onwardFails }: Facts, index: number, supply: number): boolean {
  if (onwardFails) return false;
  const half = Math.floor((onward.length - 1) / 2);
  const [first, middle, last] = [0, half, 2 * half].map((k) => onward[k].back[index]);
  const early = (middle - first) / half;
  const late = (last - middle) / half;
  return late > STAYS * supply && Math.abs(late - early) < 0.3 * late;
}

/** The flow that would have to go round for as much to leave as comes in, at the share that leaves now [mol/s]. */
function needed(flow: ComponentFlows): number {
  return (supplyOf(flow) * flow.round) / flow.leaves;
}

function supplyText({ enters, formed, id }: ComponentFlows): string {
  if (formed === 0) return `${kmolPerHour(enters)} of ${id} enter the loop in every pass`;
  if (enters === 0) return `${kmolPerHour(formed)} of ${id} are formed in every pass`;
  return formed > 0
    ? `${kmolPerHour(enters)} of ${id} enter and ${kmolPerHour(formed)} are formed in every pass`
    : `${kmolPerHour(enters)} of ${id} enter and ${kmolPerHour(-formed)} are taken up in every pass`;
}

function exitsText({ exits }: ComponentFlows): string {
  return exits.map(({ tag, flow }) => `${kmolPerHour(flow)} by ${tag}`).join(', ');
}
