/** Stage 4: what one symbol makes at the slicer's input before CTLE and DFE choices of stage 5 change it. Volts at the receiver for a swing of 1 V peak to peak times the taps. */
export interface Time {
  /** Seconds between samples; a whole number of them makes a UI. */
  readonly sampleSeconds: number;
  readonly samplesPerUi: number;
  /** Single-bit response: transmitter's edge and taps, terminations, path, receiver filter, declared CTLE. Without transmitter or receiver: defaults, swing 1 V. */
  readonly pulse: Float64Array;
  /** With `ctle: auto` the pulse is that before the CTLE, and these are its two parts through it: flat × DC gain (a ratio) + rising. */
  readonly ctleParts?: { readonly flat: Float64Array; readonly rising: Float64Array };
  /** TDR: impedance against time looking in from the transmitter and from the receiver. */
  readonly tdr?: {
    readonly transmitter: Float64Array;
    readonly receiver: Float64Array;
    readonly sampleSeconds: number;
  };
}
