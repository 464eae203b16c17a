import type { Grid, Network } from '../networks/types';
import { inverseReal } from './fourier';
import { sigmasOfRiseTime } from './symbol-spectrum';

/**
 * Response to a step, from a transfer or a reflection on the grid: exact for what the grid holds.
 * Σ X/(jω) e^{jωt} over all but 0 Hz, and X(0) t for that; the constant is set where the response has not begun, `quietSeconds` before 0.
 * @param spectrum re and im in turn of frequencies i × stepHz, the edge's own spectrum included
 * @param samples a power of two; the samples are 1/(samples × stepHz) apart
 * @returns half as many, from time 0 on: the other half of the period is the time before the step
 */
export function stepResponse(
  spectrum: Float64Array,
  stepHz: number,
  samples: number,
  quietSeconds: number,
): Float64Array {
  const integrated = new Float64Array(spectrum.length);
  for (let i = 1; i < spectrum.length / 2; i++) {
    // X/(jω) df = -j X / (2π i)
    integrated[2 * i] = spectrum[2 * i + 1] / (2 * Math.PI * i);
    integrated[2 * i + 1] = -spectrum[2 * i] / (2 * Math.PI * i);
  }
  const periodic = inverseReal(integrated, samples);
  const rising = spectrum[0] / samples;
  const quiet = Math.max(1, Math.round(quietSeconds * stepHz * samples));
  const constant = periodic[samples - quiet] - rising * quiet;
  const out = new Float64Array(samples / 2);
  for (let n = 0; n < out.length; n++) out[n] = periodic[n] + rising * n - constant;
  return out;
}

/** Impedance against time, from both ends. */
export interface Tdr {
  readonly transmitter: Float64Array;
  readonly receiver: Float64Array;
  readonly sampleSeconds: number;
}

/**
 * Impedance that a step sees looking in from either end, the other end matched: Z = Z0 (1 + ρ)/(1 - ρ), ρ the reflected step.
 * Time is there and back, from the middle of the step's edge. Multiple reflections are not taken out: what lies behind a step of
 * impedance is shown as an instrument shows it. Check values D-01 to D-06.
 * @param riseTimeSeconds 20 to 80 % of the Gaussian step; made slower where the grid's end would ring
 */
export function tdr(network: Network, grid: Grid, referenceOhms: number, riseTimeSeconds: number): Tdr {
  const end = grid.frequencies[grid.points - 1];
  // 40 dB down at the grid's end: the step then overshoots by less than 0.1 %
  const sigma = Math.max(riseTimeSeconds / sigmasOfRiseTime, Math.sqrt(2 * Math.log(100)) / (2 * Math.PI * end));
  const samples = 4 * (grid.points - 1);
  const seen = (offset: number): Float64Array => {
    const spectrum = new Float64Array(2 * grid.points);
    for (let i = 0; i < grid.points; i++) {
      const edge = Math.exp(-0.5 * (2 * Math.PI * grid.frequencies[i] * sigma) ** 2);
      spectrum[2 * i] = edge * network.differential[8 * i + offset];
      spectrum[2 * i + 1] = edge * network.differential[8 * i + offset + 1];
    }
    const reflected = stepResponse(spectrum, grid.stepHz, samples, 6 * sigma);
    return reflected.map((value) => {
      const rho = Math.max(-0.9999, Math.min(0.9999, value));
      return (referenceOhms * (1 + rho)) / (1 - rho);
    });
  };
  return { transmitter: seen(0), receiver: seen(6), sampleSeconds: 1 / (samples * grid.stepHz) };
}
