import type { TwoPort } from '../networks/types';
import { type DielectricPoint, debyeThrough, wideBandLogarithm } from '../physics/laminate';
import { roughnessFactor, type Surface, surfaceImpedance } from '../physics/roughness';
import { propagation, scatterLine, scatterSeries } from '../physics/transmission-line';
import { perGrid } from './per-grid';

/** Dielectrics in series between strip and plane: a share of the distance each. */
export type Layering = readonly (DielectricPoint & { readonly share: number })[];

/** One mode of one leg, per metre. */
export interface LineMode {
  /** External, H/m. */
  readonly inductance: number;
  /** In air, F/m. */
  readonly capacitance: number;
  readonly lowerShare: number;
  readonly upperShare: number;
  readonly stripPerMeter: number;
  readonly lowerPlanePerMeter: number;
  readonly upperPlanePerMeter: number;
  /** Depth of copper that makes the strip's share join the DC resistance. */
  readonly slabMeters: number;
}

/**
 * A line computed from its cross-section: series impedance of copper walls with skin effect, DC joint and roughness on top of the
 * external inductance; capacitance in a causal laminate. The strip is a slab of the depth that gives its DC resistance; planes
 * are half-spaces, whose return current at DC spreads until it costs nothing.
 */
export interface ComputedLine {
  readonly model: 'computed';
  readonly lengthMeters: number;
  readonly odd: LineMode;
  readonly even: LineMode;
  readonly alike: boolean;
  readonly lower: Layering;
  /** Dielectric of the second plane's side, or the cover; empty where there is none. */
  readonly upper: Layering;
  readonly strip: Surface;
  readonly lowerPlane: Surface;
  readonly upperPlane: Surface;
}

/** Relative permittivity of dielectrics in series, re and im. */
export function seriesPermittivity(
  layering: Layering,
  frequencies: ArrayLike<number>,
  log: Float64Array,
): Float64Array {
  const fits = layering.map((layer) => ({ ...debyeThrough(layer), share: layer.share }));
  const out = new Float64Array(log.length);
  if (fits.length === 0) {
    for (let i = 0; i < out.length; i += 2) out[i] = 1;
    return out;
  }
  if (fits.length === 1) {
    const { infinite, slope } = fits[0];
    for (let i = 0; i < out.length; i += 2) {
      out[i] = infinite + slope * log[i];
      out[i + 1] = slope * log[i + 1];
    }
    return out;
  }
  for (let i = 0; i < 2 * frequencies.length; i += 2) {
    let re = 0;
    let im = 0;
    for (const { infinite, slope, share } of fits) {
      const a = infinite + slope * log[i];
      const b = slope * log[i + 1];
      const scale = share / (a * a + b * b);
      re += a * scale;
      im -= b * scale;
    }
    const scale = 1 / (re * re + im * im);
    out[i] = re * scale;
    out[i + 1] = -im * scale;
  }
  return out;
}

const surfaceKey = ({ conductivity, roughness }: Surface) => `${conductivity} ${JSON.stringify(roughness)}`;

/** A foil's surface over the grid: its roughness once, its slab once for each depth. */
function surfaceOf(surface: Surface, depthMeters: number, frequencies: Float64Array): Float64Array {
  const key = surfaceKey(surface);
  return perGrid(frequencies, `surface ${depthMeters} ${key}`, () => {
    const factor = perGrid(frequencies, `roughness ${key}`, () => roughnessFactor(frequencies, surface));
    return surfaceImpedance(frequencies, surface, depthMeters, factor);
  });
}

/** Series impedance and shunt admittance per metre over frequency: 4 numbers each. */
function perMeter(line: ComputedLine, mode: LineMode, frequencies: Float64Array): Float64Array {
  const log = perGrid(frequencies, 'laminate-logarithm', () => wideBandLogarithm(frequencies));
  const layering = (side: Layering) =>
    perGrid(frequencies, `layering ${JSON.stringify(side)}`, () => seriesPermittivity(side, frequencies, log));
  const lower = layering(line.lower);
  const upper = layering(line.upper);
  const out = new Float64Array(4 * frequencies.length);
  const { inductance, capacitance, lowerShare, upperShare } = mode;
  for (let i = 0; i < frequencies.length; i++) {
    const omega = 2 * Math.PI * frequencies[i];
    out[4 * i + 1] = omega * inductance;
    const re = 1 + lowerShare * (lower[2 * i] - 1) + upperShare * (upper[2 * i] - 1);
    const im = lowerShare * lower[2 * i + 1] + upperShare * upper[2 * i + 1];
    out[4 * i + 2] = -omega * capacitance * im;
    out[4 * i + 3] = omega * capacitance * re;
  }
  addWalls(out, mode.stripPerMeter, () => surfaceOf(line.strip, mode.slabMeters, frequencies));
  addWalls(out, mode.lowerPlanePerMeter, () => surfaceOf(line.lowerPlane, Number.POSITIVE_INFINITY, frequencies));
  addWalls(out, mode.upperPlanePerMeter, () => surfaceOf(line.upperPlane, Number.POSITIVE_INFINITY, frequencies));
  return out;
}

function addWalls(out: Float64Array, factor: number, surface: () => Float64Array): void {
  if (factor === 0) return;
  const impedance = surface();
  for (let i = 0, j = 0; j < impedance.length; i += 4, j += 2) {
    out[i] += factor * impedance[j];
    out[i + 1] += factor * impedance[j + 1];
  }
}

/** Scattering of one mode in the leg's reference; 8 numbers a frequency. */
export function scatterComputed(
  line: ComputedLine,
  mode: 'odd' | 'even',
  frequencies: Float64Array,
  reference: number,
): TwoPort {
  const { lengthMeters } = line;
  const constants = perMeter(line, line[mode], frequencies);
  const out: TwoPort = new Float64Array(8 * frequencies.length);
  const wave = new Float64Array(4);
  for (let i = 0; i < frequencies.length; i++) {
    if (frequencies[i] === 0) {
      // no admittance at DC: the resistance alone, in series
      scatterSeries(constants[4 * i] * lengthMeters, 0, reference, out, 8 * i);
      continue;
    }
    propagation(constants[4 * i], constants[4 * i + 1], constants[4 * i + 2], constants[4 * i + 3], wave);
    scatterLine(wave[0] * lengthMeters, wave[1] * lengthMeters, wave[2], wave[3], reference, out, 8 * i);
  }
  return out;
}

/** Nepers, seconds of phase delay and impedance of one leg in one mode at a frequency above 0. */
export function computedAt(line: ComputedLine, mode: 'odd' | 'even', frequencyHz: number) {
  const frequencies = new Float64Array([frequencyHz]);
  const [zRe, zIm, yRe, yIm] = perMeter(line, line[mode], frequencies);
  const wave = new Float64Array(4);
  propagation(zRe, zIm, yRe, yIm, wave);
  return {
    nepers: wave[0] * line.lengthMeters,
    delaySeconds: (wave[1] * line.lengthMeters) / (2 * Math.PI * frequencyHz),
    impedanceOhms: wave[2],
  };
}
