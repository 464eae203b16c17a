import type { Levels } from './levels';

/** What an equaliser setting leaves at the sampling instant; volts for symbols of full swing. */
export interface Merit {
  readonly mainCursor: number;
  /** Sum of squares of all other cursors after the DFE. */
  readonly interferenceSquared: number;
  /** Sum of squares of the slopes at every cursor, volts per UI. */
  readonly slopesSquared: number;
  /** Root of deterministic (half of peak to peak) and random (rms) jitter squared and added, UI. */
  readonly jitterUi: number;
  readonly noiseVolts: number;
}

/**
 * Signal against the power of what disturbs it, dB: 10 log10(As² / (σISI² + σJ² + σN²)).
 * As = half the main cursor over levels - 1; interference and jitter carry the symbols' mean square. Infinite where nothing disturbs.
 * Source: IEEE 802.3 Annex 93A, figure of merit, without its transmitter noise and crosstalk terms. Check value S-14.
 */
export function figureOfMeritDb(
  { mainCursor, interferenceSquared, slopesSquared, jitterUi, noiseVolts }: Merit,
  levels: Levels,
) {
  const signal = mainCursor / 2 / (levels.count - 1);
  const symbols = levels.meanSquare / 4; // cursors are for full swing, levels are half of it
  const disturbance = symbols * (interferenceSquared + jitterUi ** 2 * slopesSquared) + noiseVolts ** 2;
  return 10 * Math.log10(signal ** 2 / disturbance);
}
