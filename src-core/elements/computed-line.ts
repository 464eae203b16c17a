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

/** What a mode's constants are made of, each over the grid: 2n numbers. */
function ingredients(line: ComputedLine, mode: LineMode, frequencies: Float64Array) {
  const log = perGrid(frequencies, 'laminate-logarithm', () => wideBandLogarithm(frequencies));
  const layering = (side: Layering) =>
    perGrid(frequencies, `layering ${JSON.stringify(side)}`, () => seriesPermittivity(side, frequencies, log));
  const walls = (factor: number, surface: Surface, depthMeters: number) =>
    factor === 0
      ? perGrid(frequencies, 'no walls', () => new Float64Array(2 * frequencies.length))
      : surfaceOf(surface, depthMeters, frequencies);
  return {
    lower: layering(line.lower),
    upper: layering(line.upper),
    strip: walls(mode.stripPerMeter, line.strip, mode.slabMeters),
    lowerPlane: walls(mode.lowerPlanePerMeter, line.lowerPlane, Number.POSITIVE_INFINITY),
    upperPlane: walls(mode.upperPlanePerMeter, line.upperPlane, Number.POSITIVE_INFINITY),
  };
}

/** Writes series impedance and shunt admittance per metre at frequency `i` to `out`: 4 numbers. */
function perMeter(
  mode: LineMode,
  from: ReturnType<typeof ingredients>,
  i: number,
  omega: number,
  out: Float64Array,
): void {
  const { lower, upper, strip, lowerPlane, upperPlane } = from;
  const re = 2 * i;
  const im = re + 1;
  out[0] =
    mode.stripPerMeter * strip[re] +
    mode.lowerPlanePerMeter * lowerPlane[re] +
    mode.upperPlanePerMeter * upperPlane[re];
  out[1] =
    omega * mode.inductance +
    mode.stripPerMeter * strip[im] +
    mode.lowerPlanePerMeter * lowerPlane[im] +
    mode.upperPlanePerMeter * upperPlane[im];
  out[2] = -omega * mode.capacitance * (mode.lowerShare * lower[im] + mode.upperShare * upper[im]);
  out[3] = omega * mode.capacitance * (1 + mode.lowerShare * (lower[re] - 1) + mode.upperShare * (upper[re] - 1));
}

/** Scattering of one mode in the leg's reference; 8 numbers a frequency. */
export function scatterComputed(
  line: ComputedLine,
  mode: 'odd' | 'even',
  frequencies: Float64Array,
  reference: number,
): TwoPort {
  const { lengthMeters } = line;
  const from = ingredients(line, line[mode], frequencies);
  const out: TwoPort = new Float64Array(8 * frequencies.length);
  const constants = new Float64Array(4);
  const wave = new Float64Array(4);
  for (let i = 0; i < frequencies.length; i++) {
    perMeter(line[mode], from, i, 2 * Math.PI * frequencies[i], constants);
    if (frequencies[i] === 0) {
      // no admittance at DC: the resistance alone, in series
      scatterSeries(constants[0] * lengthMeters, 0, reference, out, 8 * i);
      continue;
    }
    propagation(constants[0], constants[1], constants[2], constants[3], wave);
    scatterLine(wave[0] * lengthMeters, wave[1] * lengthMeters, wave[2], wave[3], reference, out, 8 * i);
  }
  return out;
}

/** Nepers, seconds of phase delay and impedance of one leg in one mode at a frequency above 0. */
export function computedAt(line: ComputedLine, mode: 'odd' | 'even', frequencyHz: number) {
  const constants = new Float64Array(4);
  const wave = new Float64Array(4);
  const from = ingredients(line, line[mode], Float64Array.of(frequencyHz));
  perMeter(line[mode], from, 0, 2 * Math.PI * frequencyHz, constants);
  propagation(constants[0], constants[1], constants[2], constants[3], wave);
  return {
    nepers: wave[0] * line.lengthMeters,
    delaySeconds: (wave[1] * line.lengthMeters) / (2 * Math.PI * frequencyHz),
    impedanceOhms: wave[2],
  };
}
