/**
 * The first adiabatic bed of a sulphur dioxide converter: where the heat-up path meets the equilibrium.
 * @source M. King, M. Moats, W. G. Davenport, Sulfuric Acid Manufacture, 2nd ed., Elsevier 2013, ch. 12, from memory
 */
export const firstBed = {
  feedPercent: { SO2: 10, O2: 11, N2: 79 },
  inletK: 690,
  bar: 1.2,
  conversion: 0.692,
  outletK: 893,
} as const;
