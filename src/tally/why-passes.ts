import { listed } from '../blocks/checks.ts';
import { diagnose as readTrend } from '../convergence/diagnosis.ts';
import { answerText, type Finding, slowestModeText } from './why.ts';
import type { Facts } from './why-facts.ts';
import { figure } from './why-format.ts';

/** Streams agree, but any amount of one component going round would do: nothing in the loop decides how much. */
export function undetermined({ closure, names }: Facts): Finding | null {
  if (closure.reason !== 'undetermined') return null;
  const variable = names[closure.loose];
  const id = variable.split('.')[1];
  return {
    code: 'undetermined',
    what: `nothing decides how much ${id} goes round`,
    why: `the streams agree with one another at this ${variable} and at any other (the linearised recycle is singular): as much ${id} is used up or leaves as comes in, however much goes round`,
    mend: `give ${id} a way out that grows with what goes round (a purge, a leak, a solubility), or set what is left open`,
  };
}

/** The loop closes as it is: what failed is the method or the number of passes. */
export function tooFewPasses(facts: Facts): Finding | null {
  const { answer, closure, options, passes } = facts;
  if (answer === null) return null;
  const stopped = closure.reason === 'max-passes';
  const hint = answerText(facts);
  if (facts.radius !== null && facts.radius > 1)
    return {
      code: 'passes-lead-away',
      what: `each pass leads away from the answer, and ${options.method} did not get round that`,
      why: slowestModeText(facts),
      mend: hint,
    };
  return {
    code: 'too-few-passes',
    what: stopped
      ? `it was stopped after the ${passes} passes that were allowed`
      : `${options.method} made no more progress`,
    why: slowestModeText(facts) || 'nothing of the flowsheet stands in the way: it closes by another way',
    mend: hint,
  };
}

/** What trials as it is came to, none of which gave an answer of use. */
function triedText({ beyond, failing }: Facts): string {
  if (beyond === null && failing.length === 0) return '';
  return beyond === null
    ? `${failing.length === 1 ? 'a trial' : 'trials'} by --method ${listed(failing)} did not close either`
    : `a trial by --method ${beyond.method} closed with ${figure(beyond.timesFed)} times the feed going round, which is no answer of use`;
}

/** What the trace tells, where the flowsheet tells nothing. */
export function trendOnly(facts: Facts): Finding {
  const { closure, options, names, plant } = facts;
  const reading = readTrend(closure, options.tolerance);
  const variable = names[reading.worst] ?? `${facts.tag} as a whole`;
  const id = variable.split('.')[1];
  const isFlow = plant.mixture.components.some((c) => c.id === id);
  const mode = slowestModeText(facts);
  const told = (what: string, why: string, mend: string): Finding => ({
    code: 'not-closed',
    what,
    why: [why, mode, triedText(facts)].filter((text) => text !== '').join('; '),
    mend,
  });
  switch (reading.trend) {
    case 'accumulating':
      return isFlow
        ? told(
            `${variable} grows by as much in every pass`,
            `it gains ${figure(reading.gain * 3.6)} kmol/h in every pass: more ${id} enters the loop than leaves it`,
            `give ${id} a way out: a larger purge, a feed closer to the stoichiometric ratio, or less ${id} in the feed`,
          )
        : told(
            `${variable} grows by as much in every pass`,
            'something adds more heat or pressure to the loop than is taken out',
            'check the heat balance of the loop: set a temperature instead of a duty',
          );
    case 'oscillating':
      return told(
        `${variable} swings from pass to pass`,
        'guess and answer change sides from pass to pass',
        'set temperatures instead of duties, or use --method newton',
      );
    case 'converging':
      return told(
        'it was stopped on the way',
        options.method === 'direct'
          ? `it gets better by a factor of ${figure(reading.rate ?? 1)} per pass, about ${reading.passesToGo ?? 'many'} more passes to go`
          : `the passes of ${options.method} make it better, but not enough of them were allowed`,
        'raise --max-passes (or solve: max_passes in the file)',
      );
    case 'diverging':
      return told(
        `${variable} runs away`,
        `the residual gets worse by a factor of ${(reading.rate ?? 1).toPrecision(4)} per pass`,
        'check settings that feed more back than they take out (splits, recoveries, ratios, duties)',
      );
    default:
      return told(
        `${variable} gets neither better nor worse`,
        'the last passes made no progress',
        'look at --trace; move the settings away from a phase or temperature limit, or use --method newton',
      );
  }
}
