/** Sigmas between 20 and 80 % of a Gaussian edge, 2 √2 erfinv(0.6). Check value D-04. */
export const sigmasOfRiseTime = 1.6832424671458286;

/** What the transmitter sends for one symbol. */
export interface SymbolShape {
  readonly symbolRate: number;
  /** 20 to 80 %. */
  readonly riseTimeSeconds: number;
  /** Taps of the feed-forward equaliser, one UI apart; the main one adds no delay. */
  readonly taps: readonly number[];
  readonly mainTap: number;
}

/**
 * Spectrum of one symbol of 1 V, by its length: a rectangle of one UI that begins at time 0, its edges smoothed by a Gaussian, repeated
 * by the taps: sinc(fT) e^{-jπfT} · exp(-(2πfσ)²/2) · Σ c e^{-j2πf(k - main)T}.
 * The edge's shape is ours: a Gaussian integral, σ = rise time / 1.68324. Its middle is at time 0, so it begins a little before.
 * @returns re and im in turn; 1 × the sum of taps at 0 Hz. Source: exact; check values D-04, E-02, E-09.
 */
export function symbolSpectrum(shape: SymbolShape, frequencies: Float64Array): Float64Array {
  const { symbolRate, riseTimeSeconds, taps, mainTap } = shape;
  const sigma = (2 * Math.PI * riseTimeSeconds) / sigmasOfRiseTime;
  const out = new Float64Array(2 * frequencies.length);
  for (let i = 0; i < frequencies.length; i++) {
    const x = (Math.PI * frequencies[i]) / symbolRate;
    const cos = Math.cos(x);
    const sin = Math.sin(x);
    const edge = sigma * frequencies[i];
    const size = (x === 0 ? 1 : sin / x) * Math.exp(-0.5 * edge * edge);
    let re = 0;
    let im = 0;
    for (let k = 0; k < taps.length; k++) {
      const turn = -2 * x * (k - mainTap);
      if (turn === 0) re += taps[k];
      else {
        re += taps[k] * Math.cos(turn);
        im += taps[k] * Math.sin(turn);
      }
    }
    out[2 * i] = size * (re * cos + im * sin);
    out[2 * i + 1] = size * (im * cos - re * sin);
  }
  return out;
}
