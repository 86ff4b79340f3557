/**
 * Derivatives of the outlets of a block with respect to its inlets at the last pass. The variables of a stream are its
 * flows [mol/s], its temperature [K] and its pressure [Pa], in this order.
 */
export interface BlockSlopes {
  /** variables of a stream: components + 2 */
  readonly width: number;
  /** by outlet, then by inlet: width rows (of the outlet) of width columns (of the inlet), row by row */
  readonly of: readonly (readonly Float64Array[])[];
  /** by inlet: does anything move it? what it moves may be left out otherwise (a makeup) */
  readonly moved: readonly boolean[];
  /** those of `Unit.passFlows`: the rows of temperatures may be left at zero */
  readonly flowsOnly: boolean;
}

/**
 * Room for the derivatives of a block, all zero.
 *
 * @param moved  by inlet; all where left out
 */
export function blockSlopes(
  width: number,
  outlets: number,
  inlets: number,
  moved: readonly boolean[] = Array.from({ length: inlets }, () => true),
  flowsOnly = false,
): BlockSlopes {
  return {
    width,
    moved,
    flowsOnly,
    of: Array.from({ length: outlets }, () =>
      Array.from({ length: inlets }, () => new Float64Array(width * width)),
    ),
  };
}
