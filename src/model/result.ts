import type { Phase } from './stream.ts';

/** One pass of the solver, for `--trace`. */
export interface TraceEntry {
  readonly pass: number;
  /**
   * scaled residual of the tears after this pass; of method aims the largest of what tears and aims leave open; null where
   * a block could not be evaluated
   */
  readonly residual: number | null;
  /** name of the worst tear variable, e.g. S8.Ar, or of the aim */
  readonly worst: string;
  /** the method that made the guess of this pass */
  readonly method: string;
  /** what the driver did and why, empty when nothing is worth saying */
  readonly note: string;
}

export interface StreamResult {
  readonly from: string;
  readonly to: string;
  readonly temperature_K: number;
  readonly pressure_bar: number;
  readonly phase: Phase;
  readonly vapour_fraction: number;
  readonly flow_kmol_h: number;
  readonly mass_kg_h: number;
  readonly normal_m3_h: number;
  readonly enthalpy_kW: number;
  readonly entropy_kW_K: number;
  readonly density_kg_m3: number | null;
  readonly components_kmol_h: Readonly<Record<string, number>>;
  readonly mole_fraction: Readonly<Record<string, number>>;
}

export interface BlockResult {
  readonly kind: string;
  readonly duty_kW: number;
  readonly power_kW: number;
  readonly details: Readonly<Record<string, unknown>>;
}

export interface Figures {
  readonly per_pass_conversion: Readonly<Record<string, Readonly<Record<string, number>>>>;
  readonly overall_conversion: Readonly<Record<string, number>>;
  readonly overall_yield: {
    readonly product: string;
    readonly reactant: string;
    readonly value: number;
  } | null;
  readonly production_t_d: number | null;
  readonly recycle_ratio: number | null;
  readonly inerts: Readonly<Record<string, number>>;
  readonly purge: {
    /** tags of the streams that count as lost */
    readonly streams: readonly string[];
    readonly flow_kmol_h: number;
    readonly fraction_of_makeup: number;
    readonly lost_kmol_h: Readonly<Record<string, number>>;
    readonly lost_fraction: Readonly<Record<string, number>>;
    readonly lhv_MW: number;
  } | null;
  readonly power_kW: Readonly<Record<string, number>>;
  readonly specific_power_kWh_t: number | null;
  readonly duty_kW: Readonly<Record<string, number>>;
  readonly user: Readonly<Record<string, number | null>>;
}

export interface LedgerEntry {
  readonly in: number;
  readonly formed: number;
  readonly consumed: number;
  readonly out: Readonly<Record<string, number>>;
  readonly closure: number;
}

export interface Warning {
  readonly code: string;
  readonly where: string;
  readonly message: string;
}

export interface AimResult {
  readonly reached: boolean;
  readonly setting: string;
  /** value of the setting in `unit` (SI; 0–1 for fractions) */
  readonly value: number;
  readonly unit: string;
  readonly target: number;
  /** the aim as written: formula = wanted value with its unit */
  readonly until: string;
  readonly achieved: number;
  readonly note: string | null;
}

/** What a solved flowsheet hands back: the JSON contract of `looptally balance --json`. */
export interface Result {
  readonly looptally: 1;
  readonly title: string;
  readonly case: string | null;
  readonly convergence: {
    readonly converged: boolean;
    readonly method: string;
    /** all that were made, for aims as well; with several recycles those of the one that took most */
    readonly passes: number;
    /** null where no pass came to its end */
    readonly residual: number | null;
    readonly tears: readonly string[];
    readonly history: readonly TraceEntry[];
  };
  readonly streams: Readonly<Record<string, StreamResult>>;
  readonly blocks: Readonly<Record<string, BlockResult>>;
  readonly figures: Figures;
  /** kmol/h per component */
  readonly ledger: Readonly<Record<string, LedgerEntry>>;
  readonly closure: {
    readonly mass: number;
    readonly atoms: Readonly<Record<string, number>>;
    readonly energy: number;
  };
  readonly aims: Readonly<Record<string, AimResult>>;
  readonly warnings: readonly Warning[];
  readonly assumptions: readonly string[];
}
