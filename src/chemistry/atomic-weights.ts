/**
 * Standard atomic weights, abridged to five figures, in g/mol.
 *
 * Source: CIAAW, Standard Atomic Weights 2021; the table with the interval and the status of each
 * value is `datasets/published/atomic-weights.csv`. Ba and Ce were read in an older IUPAC table,
 * Pb comes from memory (its natural spread is 206.14 to 207.94).
 */
export const ATOMIC_WEIGHT = {
  H: 1.008,
  Li: 6.94,
  B: 10.81,
  C: 12.011,
  N: 14.007,
  O: 15.999,
  F: 18.998,
  Na: 22.99,
  Mg: 24.305,
  Al: 26.982,
  Si: 28.085,
  P: 30.974,
  S: 32.06,
  Cl: 35.45,
  K: 39.098,
  Ca: 40.078,
  Ti: 47.867,
  V: 50.942,
  Cr: 51.996,
  Mn: 54.938,
  Fe: 55.845,
  Co: 58.933,
  Ni: 58.693,
  Cu: 63.546,
  Zn: 65.38,
  Sr: 87.62,
  Zr: 91.224,
  Sn: 118.71,
  Ba: 137.33,
  Ce: 140.12,
  Pb: 207.2,
} as const;

export type Element = keyof typeof ATOMIC_WEIGHT;
