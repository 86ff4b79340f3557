import { dewPointK } from './dew-point.ts';
import { answerText, type Finding, slowestModeText, wayText } from './why.ts';
import type { Facts } from './why-facts.ts';
import { bar, degC, figure, kmolPerHour, perCent } from './why-format.ts';
import { SENSIBLE_RECYCLE, type Trial } from './why-trial.ts';
import { phasesIn, type Vessel, vesselsOf } from './why-vessels.ts';

/** Below the dew point by so much is tried for the advice [K]. */
const BELOW_DEW_K = [5, 15, 30, 50, 80];
/** The loop has another way out than the condensate that is fast enough where less than this comes back. */
const SLOW = 0.9;

/** Nothing condenses where the product is to be taken out, so that it goes round. */
export function nothingCondenses(facts: Facts): Finding | null {
  const { plant, group, onward, answer, beyond, radius, flows } = facts;
  if (answer !== null && (radius === null || radius < SLOW)) return null;
  const vessels = vesselsOf(plant, group).filter((vessel) => plant.mixture.total(vessel.inlet) > 0);
  if (vessels.length === 0 || vessels.some((vessel) => phasesIn(vessel) !== 'gas')) return null;
  const staysDry = ({ name }: Vessel) =>
    answer === null
      ? onward.length > 0 && onward.every((pass) => pass.vessels.get(name)?.phases === 'gas')
      : answer.dry.has(name);
  if (!vessels.every(staysDry)) return null;
  const vessel = vessels.reduce((a, b) => (b.gas.temperatureK < a.gas.temperatureK ? b : a));
  const product = flows
    .filter(
      ({ index, enters, formed }) => vessel.mixture.roles[index] === 'condensable' && enters + formed > 0,
    )
    .sort((a, b) => b.enters + b.formed - (a.enters + a.formed))[0];
  if (product === undefined) return null;
  const { temperatureK, pressurePa } = vessel.gas;
  const share = vessel.inlet.flowsMolPerS[product.index] / plant.mixture.total(vessel.inlet);
  const dewK = dewPointK(vessel.mixture, pressurePa, vessel.inlet.flowsMolPerS, temperatureK);
  const dew =
    dewK === null ? 'does not condense at any temperature' : `has its dew point at ${degC(dewK)}, below that`;
  const others = product.exits
    .filter(({ flow }) => flow > 0)
    .map(({ tag, flow }) => `${kmolPerHour(flow)} by ${tag}`);
  const left =
    others.length === 0
      ? `no ${product.id} leaves`
      : `${product.id} leaves by other ways only (${others.join(', ')})`;
  // With a recycle beyond all use it may condense after all: then that is said.
  const late = beyond !== null && !beyond.dry.has(vessel.name);
  const path = `${vessel.name}.temperature`;
  const setting = plant.get(path);
  return {
    code: 'nothing-condenses',
    isOfDirectPasses: true,
    what: `nothing condenses in ${vessel.name}${late ? ' before the recycle has grown beyond all use' : ''}, so ${product.id} has no way out there`,
    why: [
      `${vessel.name} stands at ${degC(temperatureK)} and ${bar(pressurePa)}, and the gas in it (${perCent(share)} ${product.id}) ${dew}; ${left}`,
      answer === null ? whatTrialsSay(facts, late) : '',
      slowestModeText(facts),
    ]
      .filter((text) => text !== '')
      .join('; '),
    mend: [
      setting === undefined || dewK === null
        ? `cool further in ${vessel.name}, or raise the pressure of the loop`
        : colder(facts, vessel, path, dewK),
      answerText(facts),
    ]
      .filter((text) => text !== '')
      .join('; '),
    where: plant.flowsheet.placeOf(setting === undefined ? `blocks.${vessel.name}` : `blocks.${path}`),
  };
}

/** What was tried of a loop that closes by no method with a recycle of use. */
function whatTrialsSay({ beyond, onward }: Facts, late: boolean): string {
  if (beyond === null) return `nor does anything condense in ${onward.length} further direct passes`;
  const there = late ? 'and only then something condenses' : 'and even then nothing condenses';
  return `by --method ${beyond.method} the loop closes with ${figure(beyond.timesFed)} times the feed going round, ${there} (tried)`;
}

/** A temperature below the dew point by which the loop closes with condensate and, where one does, a small recycle. */
function colder(facts: Facts, { name }: Vessel, path: string, dewK: number): string {
  let best: { readonly kelvin: number; readonly trial: Trial } | null = null;
  for (const below of BELOW_DEW_K) {
    const kelvin = Math.floor(dewK - below - 273.15) + 273.15;
    const trial = facts.tryOut([[path, kelvin]]);
    if (trial === null || trial.dry.has(name)) continue;
    if (best === null || trial.recycle < best.trial.recycle) best = { kelvin, trial };
    if (trial.recycle <= SENSIBLE_RECYCLE * facts.fed) break;
  }
  if (best === null) return `set ${path} below ${degC(dewK)}, or raise the pressure of the loop`;
  const { kelvin, trial } = best;
  const more = trial.recycle > SENSIBLE_RECYCLE * facts.fed ? '; a larger purge is needed besides' : '';
  return `set ${path} to ${degC(kelvin)}, by which the loop closes ${wayText(trial, facts.options)}, ${kmolPerHour(trial.recycle)} going round (tried); or raise the pressure of the loop${more}`;
}
