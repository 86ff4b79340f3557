import type { ZodType } from 'zod';
import type { Component } from '../model/component.ts';
import type { Reaction } from '../model/reaction.ts';
import type { StreamState } from '../model/stream.ts';
import type { Role } from '../properties/component-roles.ts';
import type { Mixture } from '../properties/mixture.ts';
import type { BlockSlopes } from './slopes.ts';

/** Ports of a block with given settings. */
export interface Ports {
  /** names of the inlets; 'any' is any number (one or more) of nameless inlets */
  readonly inlets: readonly string[] | 'any';
  /** names of the outlets; a single outlet needs no name in the file */
  readonly outlets: readonly string[];
}

/** Names that settings may refer to; used by `BlockKind.check` while the file is read. */
export interface KnownNames {
  readonly components: readonly Component[];
  readonly reactions: readonly Reaction[];
}

/** A fault in the settings that the schema alone cannot see; `path` is relative to the block. */
export interface SettingsFault {
  readonly path: readonly (string | number)[];
  readonly code: string;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
}

/** What a unit operation needs from its surroundings. */
export interface BlockContext {
  readonly name: string;
  readonly mixture: Mixture;
  readonly reactions: readonly Reaction[];
}

/** What stands between a block as it was calculated and the block that its settings ask for. */
export interface BlockFault {
  readonly code: string;
  /** leads to the setting that asks for it, relative to the block; left out: the block as a whole */
  readonly path?: readonly string[];
  readonly what: string;
  readonly why: string;
  readonly mend: string;
}

/** What a block says of itself after a pass. Duty is positive when heat is added to the process. */
export interface BlockReport {
  readonly dutyW: number;
  /** power drawn by the driver of a machine, drive losses included [W]; negative when power is delivered */
  readonly powerW: number;
  /** the part of `powerW` that does not reach the process [W] */
  readonly driveLossW: number;
  /** electrical or shaft power of refrigeration that belongs to this block [W] */
  readonly refrigerationW: number;
  /** JSON values, units in the key names */
  readonly details: Readonly<Record<string, unknown>>;
  readonly warnings: readonly { readonly code: string; readonly message: string }[];
  /**
   * What a block held back during the passes, because a guess may ask for the impossible on the way to an
   * answer that does not. Where one is left when the plant has closed, it counts as not closed.
   */
  readonly faults: readonly BlockFault[];
  readonly assumptions: readonly string[];
  /**
   * Plot-ready curves, in the same form as `details`. Worked out when asked for: a curve takes longer than a pass,
   * and the figures of an aim or a sweep need none.
   */
  readonly curves: () => Readonly<Record<string, unknown>>;
}

/** A block made ready to be evaluated pass after pass; it keeps its own work space and warm starts. */
export interface Unit {
  /**
   * One pass: read the inlets, write every outlet.
   * @throws PassTrouble when the block cannot be evaluated at these inlets
   */
  pass(inlets: readonly StreamState[], outlets: readonly StreamState[]): void;
  /**
   * The same for flows and pressures alone, where nobody asks for the heat of an outlet (`BlockKind.asksForHeat`):
   * temperature, phases and enthalpy of the outlets may be left as they are. Left out: `pass` does it.
   * @throws PassTrouble
   */
  passFlows?(inlets: readonly StreamState[], outlets: readonly StreamState[]): void;
  /**
   * Write one outlet from the one inlet that it needs (`BlockKind.needs`), before the others are known. The
   * pass that follows writes it again.
   * @throws PassTrouble
   */
  passAhead?(outlet: string, inlets: readonly StreamState[], outlets: readonly StreamState[]): void;
  /**
   * Write the derivatives of the outlets of the last pass; `slopes` comes filled with zeros. Left out, or false where
   * it has none at this point (a kink, a limit that holds): then they are taken by differences of passes.
   */
  slopes?(inlets: readonly StreamState[], outlets: readonly StreamState[], slopes: BlockSlopes): boolean;
  /**
   * How often what a pass spends its time on has been evaluated since the unit was made (a rate law along a bed):
   * a count, not a time, so that what is bounded by it ends at the same place everywhere. Left out: a pass takes little.
   */
  evaluations?(): number;
  /** Heat, power and details for the inlets and outlets of the last pass. */
  report(inlets: readonly StreamState[], outlets: readonly StreamState[]): BlockReport;
}

/**
 * A kind of unit operation. `settings` checks and converts what the file says (quantities become SI numbers,
 * keys stay as in the file). `create` gets the settings object itself and must read numbers from it at each
 * pass, so that aims and sweeps can move a setting without building the block again.
 */
export interface BlockKind<S extends object = object> {
  readonly kind: string;
  readonly summary: string;
  readonly settings: ZodType<S>;
  ports(settings: S): Ports;
  check?(settings: S, known: KnownNames): SettingsFault[];
  /**
   * May a component leave by an outlet? Left out: every component leaves by every outlet. Asked before solving,
   * to find a component that can enter a loop and has no way out of it.
   */
  passes?(settings: S, outlet: string, component: Component, role: Role): boolean;
  /** Does what enters by an inlet leave by an outlet? Left out: it does, as all inlets are mixed. */
  through?(inlet: string, outlet: string): boolean;
  /** The one inlet that an outlet can be calculated from; null, or left out: it needs all of them. */
  needs?(settings: S, outlet: string): string | null;
  /**
   * Does what a block hands on depend on the heat of its inlets, that is on their temperature, phases and enthalpy? What
   * it hands on is flows and pressures, and the heat of its outlets where that is `asked` for. Left out: it does. A block
   * that answers no without being asked must read the heat of its inlets in `report` alone.
   */
  asksForHeat?(settings: S, asked: boolean): boolean;
  /** May it hold something back during the passes, to be told among the faults of its report? Left out: never. */
  mayHoldBack?(settings: S): boolean;
  /** names of the reactions that run in this block */
  reactionsIn?(settings: S): readonly string[];
  /** those of them that run to equilibrium */
  equilibriaIn?(settings: S): readonly string[];
  /** models and sources of this block beside the state functions that all share, in plain words */
  models?(settings: S): readonly string[];
  create(settings: S, context: BlockContext): Unit;
}
