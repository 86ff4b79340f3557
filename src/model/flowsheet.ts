import type { Component } from './component.ts';
import type { Place } from './place.ts';
import type { Reaction } from './reaction.ts';
import type { Correlation, Spread } from './spread.ts';

export type GasModelName = 'ideal' | 'srk' | 'pr';
export type LiquidModelName = 'antoine' | 'eos';
export type MethodName = 'auto' | 'direct' | 'wegstein' | 'eigenvalue' | 'anderson' | 'broyden' | 'newton';

/** A stream that enters across the battery limit, as the user gave it (SI). */
export interface Feed {
  readonly name: string;
  readonly temperatureK: number;
  readonly pressurePa: number;
  /**
   * Total flow: mol/s for molar, kg/s for mass, normal m3/s (0 degC, 1.01325 bar) for normalVolume.
   * Null when the flows of the components are given one by one (then `parts` are mol/s).
   */
  readonly flow: { readonly value: number; readonly per: 'molar' | 'mass' | 'normalVolume' } | null;
  /** parts per component in declared order, not normalised (or mol/s, see flow) */
  readonly parts: Float64Array;
  /** what the parts of a composition count */
  readonly basis: 'mole' | 'mass';
}

/** One unit operation of the file: its kind and its settings in SI, checked by the schema of that kind. */
export interface BlockSpec {
  readonly name: string;
  readonly kind: string;
  /** as the kind's schema hands it over: K, Pa, W, mol/s, fractions 0–1; keys as in the file */
  readonly settings: Readonly<Record<string, unknown>>;
}

/** What flows from one port to another. An end without a block is a feed or the battery limit. */
export interface StreamSpec {
  readonly tag: string;
  /** a feed's or a block's name; port is null for a feed or for a block with a single outlet */
  readonly from: { readonly name: string; readonly port: string | null };
  /** null is the battery limit (`out` in the file) */
  readonly to: { readonly name: string; readonly port: string | null } | null;
}

/** What the key figures refer to, every default filled in. */
export interface LedgerSpec {
  /** null where the flowsheet has no product that can be told */
  readonly product: { readonly component: string; readonly stream: string } | null;
  readonly reactant: string | null;
  readonly purge: readonly string[];
  readonly recycle: string | null;
}

/** A number computed from a closed flowsheet; see flowsheet/formula-scope for what it may name. */
export interface Formula {
  readonly text: string;
  readonly evaluate: (scope: Readonly<Record<string, unknown>>) => number;
}

/** A wanted value for a figure, reached by moving one setting. */
export interface Aim {
  readonly name: string;
  /** path of the setting moved, e.g. purge.fractions.bleed */
  readonly move: string;
  /** bounds in SI, low < high */
  readonly between: readonly [number, number];
  readonly until: Formula;
  /** wanted value in the unit of the formula */
  readonly target: number;
  /** the wanted value as written, with its unit */
  readonly wanted: string;
  /** SI unit of the setting moved, '' for fractions and numbers */
  readonly unit: string;
}

export interface UserFigure {
  readonly name: string;
  readonly formula: Formula;
  /** unit shown; '%' shows the fraction times 100 */
  readonly unit: string;
}

/** What is bought or sold, with what it comes to in an hour. */
export interface PricedItem {
  /** makeup or a feed, power, refrigeration, cooling_water, product, purge */
  readonly name: string;
  /** the price as written, e.g. 60 EUR/MWh */
  readonly price: string;
  /** money per hour: what it costs, or brings where `income` is true */
  readonly perHour: Formula;
  readonly income: boolean;
}

export interface Prices {
  /** the word that stands before the unit of every price */
  readonly currency: string;
  readonly items: readonly PricedItem[];
}

/** A figure to be made as small or as large as possible. */
export interface Goal {
  readonly sense: 'minimise' | 'maximise';
  /** as written; its formula has cost and profit written out */
  readonly text: string;
  readonly formula: Formula;
  /** unit of the value, '' for a fraction or where it cannot be told */
  readonly unit: string;
}

/** A setting that may be moved between bounds [SI]. */
export interface Move {
  readonly path: string;
  readonly between: readonly [number, number];
  /** SI unit of the setting, '' for fractions and numbers */
  readonly unit: string;
  /** unit that the bounds are written in; '' where there is none */
  readonly written: string;
}

/** A figure that must stay below or above a value. */
export interface FigureLimit {
  /** as written, e.g. figures.inerts.converter < 14 % */
  readonly text: string;
  readonly formula: Formula;
  readonly side: 'below' | 'above';
  /** in the unit of the formula */
  readonly bound: number;
}

/** What `optimise` is asked: one goal, or two for a trade-off front. */
export interface Objective {
  readonly goals: readonly Goal[];
  readonly moves: readonly Move[];
  readonly limits: readonly FigureLimit[];
}

export interface SolveSpec {
  readonly method: MethodName;
  readonly tolerance: number;
  readonly maxPasses: number;
  /** tags of prescribed tears, empty: chosen by Looptally */
  readonly tear: readonly string[];
}

/** A place in a sentence about a sweep where a number of its table goes. */
export interface StudyBlank {
  /** first, last: row of the table; least, most: of the column; ratio: last to first; at least, at most: of another column */
  readonly which: 'first' | 'last' | 'least' | 'most' | 'ratio' | 'at least' | 'at most';
  /** path of a setting that is swept, or an expression that is recorded */
  readonly column: string;
  /** the other column of `at least` and `at most`, else the same */
  readonly of: string;
  /** shown behind the number; % multiplies a fraction by 100 */
  readonly unit: string;
}

/** A sweep that is written down in the file. */
export interface StudySpec {
  readonly over: readonly {
    readonly path: string;
    /** the values as written */
    readonly text: string;
    /** where a part of that text stands in the file */
    readonly placeInside: (offset: number, length: number) => Place;
  }[];
  readonly record: readonly Formula[];
  /** sentences that are printed after the table: text and blanks by turns */
  readonly note: readonly (readonly (string | StudyBlank)[])[];
}

/** A setting that a live page lets its reader move, and how far. */
export interface Handle {
  readonly path: string;
  /** ends of the range [SI] */
  readonly between: readonly [number, number];
  /** unit in which the range is written; '' where there is none */
  readonly unit: string;
  /** value [SI] = (number in that unit + offset) × factor */
  readonly scale: { readonly factor: number; readonly offset: number };
  /** places of a slider over the range, both ends among them */
  readonly places: number;
}

/** A checked flowsheet: every name resolved, every value in SI. */
export interface Flowsheet {
  readonly file: string;
  readonly title: string;
  readonly notes: string;
  /** the case that was applied, if any */
  readonly caseName: string | null;
  readonly components: readonly Component[];
  readonly gas: GasModelName;
  readonly liquid: LiquidModelName;
  readonly dissolvedGases: boolean;
  readonly reactions: readonly Reaction[];
  readonly feeds: readonly Feed[];
  readonly blocks: readonly BlockSpec[];
  readonly streams: readonly StreamSpec[];
  readonly ledger: LedgerSpec;
  readonly aims: readonly Aim[];
  readonly cases: readonly string[];
  readonly figures: readonly UserFigure[];
  readonly spreads: readonly Spread[];
  readonly correlations: readonly Correlation[];
  readonly prices: Prices | null;
  readonly objective: Objective | null;
  readonly solve: SolveSpec;
  /** null where the file has no study */
  readonly study: StudySpec | null;
  /** empty where the file names none */
  readonly handles: readonly Handle[];
  /** defaults that were filled in while reading, in plain sentences */
  readonly assumptions: readonly string[];
  /** where a part of the flowsheet stands in the file: `blocks.condenser.temperature`, `streams.S2`, ... */
  readonly placeOf: (path: string) => Place;
}
