import type { BlockReport } from '../blocks/block.ts';
import type { Reaction } from '../model/reaction.ts';
import type { Figures } from '../model/result.ts';
import type { StreamState } from '../model/stream.ts';
import type { Tallied } from './ledger.ts';
import type { Plant } from './plant.ts';
import { KMOL_H } from './stream-results.ts';

/** What the key figures are read from; each part is asked for by those that need it. */
export interface FigureSource {
  readonly plant: Plant;
  readonly tallied: () => Tallied;
  readonly reports: () => readonly BlockReport[];
}

/** A flow [mol/s], or a production [t/d], of no more than this is none: what is divided by it may be more than a number can be. */
const NOTHING = 1e-100;

type KeyFigure = Exclude<keyof Figures, 'user'>;

/** The key figures one by one, so that a study reads those it records and no others. */
export const figureReaders: { readonly [K in KeyFigure]: (source: FigureSource) => Figures[K] } = {
  per_pass_conversion: ({ plant }) => perPassConversion(plant),
  overall_conversion: ({ plant, tallied }) => overallConversion(plant, tallied()),
  overall_yield: ({ plant, tallied }) => overallYield(plant, tallied()),
  production_t_d: ({ plant }) => productionTPerD(plant),
  recycle_ratio: ({ plant, tallied }) => recycleRatio(plant, tallied),
  inerts: ({ plant }) => inerts(plant),
  purge: ({ plant, tallied }) => purge(plant, tallied()),
  power_kW: ({ plant, reports }) => powers(plant, reports()),
  specific_power_kWh_t: ({ plant, reports }) => {
    const production = productionTPerD(plant);
    return production !== null && Math.abs(production) > NOTHING
      ? (24 * powers(plant, reports())['total']) / production
      : null;
  },
  duty_kW: ({ plant, reports }) =>
    Object.fromEntries(
      plant.blocks.flatMap((b, i) => (reports()[i].dutyW === 0 ? [] : [[b.name, reports()[i].dutyW / 1e3]])),
    ),
};

/** The key figures of a closed plant; `user` is left empty. */
export function keyFigures(plant: Plant, tallied: Tallied, reports: readonly BlockReport[]): Figures {
  const source: FigureSource = { plant, tallied: () => tallied, reports: () => reports };
  const read = Object.entries(figureReaders).map(([name, reader]) => [name, reader(source)]);
  return { ...(Object.fromEntries(read) as Omit<Figures, 'user'>), user: {} };
}

function reactors({ running }: Plant): number[] {
  return running.flatMap((reactions, b) => (reactions.length > 0 ? [b] : []));
}

/** All that enters a block, the cold shots of a reactor too, per component [mol/s]. */
function fedTo(plant: Plant, block: number): Float64Array {
  const sum = new Float64Array(plant.mixture.size);
  for (const { flowsMolPerS } of plant.inlets[block])
    for (let i = 0; i < sum.length; i++) sum[i] += flowsMolPerS[i];
  return sum;
}

/** (in − out)/in over one reactor of every reactant that it takes on balance. */
function perPassConversion(plant: Plant): Figures['per_pass_conversion'] {
  return Object.fromEntries(
    reactors(plant).map((b) => {
      const inlet = fedTo(plant, b);
      const outlet = plant.outlets[b][0].flowsMolPerS;
      const reactants = idsWhere(plant, (i) => inlet[i] > outlet[i] && isReactant(plant.running[b], i));
      return [
        plant.blocks[b].name,
        Object.fromEntries(reactants.map(([id, i]) => [id, (inlet[i] - outlet[i]) / inlet[i]])),
      ];
    }),
  );
}

/** (in − out)/in over the battery limit of every reactant that is fed. */
function overallConversion(plant: Plant, { entering, leaving }: Tallied): Figures['overall_conversion'] {
  const running = reactors(plant).flatMap((b) => plant.running[b]);
  return Object.fromEntries(
    idsWhere(plant, (i) => entering[i] > NOTHING && isReactant(running, i)).map(([id, i]) => [
      id,
      (entering[i] - leaving[i]) / entering[i],
    ]),
  );
}

/** Product in the product stream per stoichiometric product of the key reactant fed. */
function overallYield(plant: Plant, { entering }: Tallied): Figures['overall_yield'] {
  const { product, reactant } = plant.flowsheet.ledger;
  if (!product || !reactant) return null;
  const p = index(plant, product.component);
  const r = index(plant, reactant);
  const reaction = yieldReaction(plant.flowsheet.reactions, p, r);
  if (!reaction || entering[r] <= NOTHING) return null;
  const possible = (entering[r] * reaction.coefficients[p]) / -reaction.coefficients[r];
  const made = state(plant, product.stream).flowsMolPerS[p] - entering[p];
  return { product: product.component, reactant, value: made / possible };
}

/**
 * The reaction that says how much product a key reactant can make: of those that turn the one into the other, the one
 * that makes most of it, so that the order in which they are written does not matter.
 */
export function yieldReaction(
  reactions: readonly Reaction[],
  product: number,
  reactant: number,
): Reaction | null {
  let best: Reaction | null = null;
  let most = 0;
  for (const reaction of reactions) {
    const { coefficients } = reaction;
    if (!(coefficients[product] > 0 && coefficients[reactant] < 0)) continue;
    const share = coefficients[product] / -coefficients[reactant];
    if (share > most) {
      best = reaction;
      most = share;
    }
  }
  return best;
}

/** Mol that goes round per mol that is fed; null where nothing is. */
function recycleRatio(plant: Plant, tallied: () => Tallied): number | null {
  const { recycle } = plant.flowsheet.ledger;
  if (!recycle) return null;
  const fed = sumOf(tallied().entering);
  return fed > 0 ? total(state(plant, recycle)) / fed : null;
}

/** Mass of the product component in the product stream [t/d]. */
function productionTPerD(plant: Plant): number | null {
  const { product } = plant.flowsheet.ledger;
  if (!product) return null;
  const p = index(plant, product.component);
  const molarMass = plant.mixture.components[p].molarMassKgPerMol;
  return state(plant, product.stream).flowsMolPerS[p] * molarMass * 86.4;
}

/** Mole fraction at each reactor's inlet of what takes no part in its reactions. */
function inerts(plant: Plant): Figures['inerts'] {
  return Object.fromEntries(
    reactors(plant).map((b) => {
      const inlet = fedTo(plant, b);
      let idle = 0;
      for (let i = 0; i < inlet.length; i++) if (!takesPart(plant.running[b], i)) idle += inlet[i];
      const all = sumOf(inlet);
      return [plant.blocks[b].name, all > 0 ? idle / all : 0];
    }),
  );
}

function purge(plant: Plant, { entering }: Tallied): Figures['purge'] {
  const tags = plant.flowsheet.ledger.purge;
  // Of a plant that is fed with nothing no part can be lost.
  if (tags.length === 0 || sumOf(entering) === 0) return null;
  const lost = new Float64Array(plant.mixture.size);
  for (const tag of tags) {
    const { flowsMolPerS } = state(plant, tag);
    for (let i = 0; i < lost.length; i++) lost[i] += flowsMolPerS[i];
  }
  const everything = idsWhere(plant, () => true);
  return {
    streams: tags,
    flow_kmol_h: sumOf(lost) * KMOL_H,
    fraction_of_makeup: sumOf(lost) / sumOf(entering),
    lost_kmol_h: Object.fromEntries(everything.map(([id, i]) => [id, lost[i] * KMOL_H])),
    lost_fraction: Object.fromEntries(
      everything.filter(([, i]) => entering[i] > NOTHING).map(([id, i]) => [id, lost[i] / entering[i]]),
    ),
    lhv_MW: everything.reduce(
      (sum, [, i]) => sum + (lost[i] * plant.mixture.components[i].lowerHeatingJPerMol) / 1e6,
      0,
    ),
  };
}

function powers(plant: Plant, reports: readonly BlockReport[]): Record<string, number> {
  const machines = plant.blocks.flatMap((b, i): [string, number][] =>
    reports[i].powerW === 0 ? [] : [[b.name, reports[i].powerW / 1e3]],
  );
  const refrigeration = reports.reduce((sum, report) => sum + report.refrigerationW, 0) / 1e3;
  const sum = machines.reduce((all, [, kW]) => all + kW, refrigeration);
  return { ...Object.fromEntries(machines), refrigeration, total: sum };
}

function takesPart(reactions: readonly Reaction[], i: number): boolean {
  for (const { coefficients } of reactions) if (coefficients[i] !== 0) return true;
  return false;
}

function isReactant(reactions: readonly Reaction[], i: number): boolean {
  return reactions.some((reaction) => reaction.coefficients[i] < 0);
}

function idsWhere(plant: Plant, holds: (i: number) => boolean): [string, number][] {
  return plant.mixture.components.flatMap((c, i): [string, number][] => (holds(i) ? [[c.id, i]] : []));
}

function index(plant: Plant, id: string): number {
  return plant.mixture.components.findIndex((c) => c.id === id);
}

function state(plant: Plant, tag: string): StreamState {
  return plant.streams[plant.flowsheet.streams.findIndex((s) => s.tag === tag)];
}

function total(stream: StreamState): number {
  return sumOf(stream.flowsMolPerS);
}

function sumOf(flows: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < flows.length; i++) sum += flows[i];
  return sum;
}
