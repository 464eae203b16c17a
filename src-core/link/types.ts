/** Stage 5. Volts are peak to peak at the slicer unless said otherwise. */
export interface Link {
  /** The pulse after all linear equalisation (CTLE chosen), V per symbol of full swing. */
  readonly pulse: Float64Array;
  readonly sampleSeconds: number;
  /** Time of sample 0, from the middle of the symbol's leading edge at the transmitter: a share of a sample, so that the main cursor is on a sample. */
  readonly pulseStartSeconds?: number;
  /** The path turns the signal over, and the receiver is taken to turn it back: `pulse` is as after that. */
  readonly inverted?: boolean;
  readonly samplesPerUi: number;
  /** Sample of the main cursor. */
  readonly mainIndex: number;
  /** Cursors at whole UI from the main one, first precursor count in `precursors`; before the DFE. */
  readonly cursors: Float64Array;
  readonly precursors: number;
  readonly mainCursorVolts: number;
  readonly dfeTaps: readonly number[];
  readonly ctleDcGainDb?: number;
  readonly noiseVolts: number;
  /** Baseline wander from series capacitors over the longest run, volts (closed form). */
  readonly droopVolts: number;
  /** At the target BER; 0 where shut. The smallest of three for PAM4. */
  readonly eyeHeightVolts: number;
  readonly eyeWidthUi: number;
  /** Probability density over phase (columns, one UI centred on the sampling instant) and voltage (rows), for the picture. */
  readonly density: EyeDensity;
  /** BER against phase in UI from the sampling instant. */
  readonly bathtub: { readonly phaseUi: Float64Array; readonly ber: Float64Array };
  /** Keys not used, parts that were left out: for "without …". */
  readonly without: readonly string[];
}

export interface EyeDensity {
  readonly phases: number;
  readonly voltages: number;
  readonly lowestVolts: number;
  readonly highestVolts: number;
  /** log10 of probability a bin, row by row from the lowest voltage; -Infinity never: floor -20. */
  readonly log10: Float32Array;
  /** Eye contour at the target BER: for each phase, the lower and upper edge of each opening (NaN-free: equal where shut). */
  readonly openings: readonly { readonly lower: Float64Array; readonly upper: Float64Array }[];
}
