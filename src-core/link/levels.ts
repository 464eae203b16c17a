/** What differs between the modulations, for symbols of full swing ±1/2. */
export interface Levels {
  readonly count: 2 | 4;
  /** A symbol is a sum of these, each times ±1, all signs equally likely: ±1/2, or ±1/3 ± 1/6. */
  readonly halves: readonly number[];
  /** Mean square of symbols of largest level 1: IEEE 802.3 Annex 93A's σX². Check value S-09. */
  readonly meanSquare: number;
  /** Pairs of neighbouring levels, the eye between them, from the lowest. */
  readonly eyes: readonly (readonly [number, number])[];
  /**
   * Bit errors for the two tails into one eye, F(upper level falls below) + F(lower level rises above): NRZ each level is sent half of the time.
   * PAM4 each a quarter, and a symbol error is one of two bits (Gray): an eighth an eye.
   */
  readonly bitErrorShare: number;
}

const nrz: Levels = {
  count: 2,
  halves: [1 / 2],
  meanSquare: 1,
  eyes: [[-1 / 2, 1 / 2]],
  bitErrorShare: 1 / 2,
};

const pam4: Levels = {
  count: 4,
  halves: [1 / 3, 1 / 6],
  meanSquare: 5 / 9,
  eyes: [
    [-1 / 2, -1 / 6],
    [-1 / 6, 1 / 6],
    [1 / 6, 1 / 2],
  ],
  bitErrorShare: 1 / 8,
};

export const levelsOf = (modulation: 'NRZ' | 'PAM4'): Levels => (modulation === 'NRZ' ? nrz : pam4);
