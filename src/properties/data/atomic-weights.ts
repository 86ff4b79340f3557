/** Standard atomic weights [g/mol]. @source IUPAC abridged standard atomic weights 2021 */
export const checkedAtomicWeights: Readonly<Record<string, number>> = {
  H: 1.008,
  He: 4.0026,
  C: 12.011,
  N: 14.007,
  O: 15.999,
  S: 32.06,
  Ar: 39.95,
};

/**
 * Atomic weights [g/mol] of further elements that a custom component may contain.
 * @source IUPAC abridged standard atomic weights 2021, from memory
 */
export const furtherAtomicWeights: Readonly<Record<string, number>> = {
  Li: 6.94,
  B: 10.81,
  F: 18.998,
  Ne: 20.18,
  Na: 22.99,
  Mg: 24.305,
  Al: 26.982,
  Si: 28.085,
  P: 30.974,
  Cl: 35.45,
  K: 39.098,
  Ca: 40.078,
  Ti: 47.867,
  Cr: 51.996,
  Mn: 54.938,
  Fe: 55.845,
  Co: 58.933,
  Ni: 58.693,
  Cu: 63.546,
  Zn: 65.38,
  Br: 79.904,
  Kr: 83.798,
  I: 126.9,
  Xe: 131.29,
};
