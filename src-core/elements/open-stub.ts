import { hyperbolic, transformAdmittance } from '../physics/chain';
import { type DielectricPoint, debyeThrough, wideBandLogarithm } from '../physics/laminate';
import { findRoot } from '../physics/root';

/** A short uniform stretch whose conductors cost nothing: a piece of barrel or branch, of one leg. */
export interface Stretch {
  readonly lengthMeters: number;
  /** H/m. */
  readonly inductance: number;
  /** In air, F/m. */
  readonly capacitance: number;
  readonly dielectric: DielectricPoint;
}

/** A branch that ends open. Stretches from the joint outwards; capacitance of each leg at the end. */
export interface OpenStub {
  readonly stretches: readonly Stretch[];
  readonly endFarads: number;
}

/** Numbers of a stretch that its evaluation needs; made once before the loop over frequency. */
export interface Medium {
  readonly lengthMeters: number;
  readonly inductance: number;
  readonly capacitance: number;
  readonly infinite: number;
  readonly slope: number;
}

export const mediumOf = ({ lengthMeters, inductance, capacitance, dielectric }: Stretch): Medium => ({
  lengthMeters,
  inductance,
  capacitance,
  ...debyeThrough(dielectric),
});

/**
 * cosh and sinh of a stretch (`h`) and its impedance (`z`, re and im) at ω, with the laminate's logarithm there. γ and Z both come
 * from √ε in the fourth quadrant.
 */
export function stretchAt(
  m: Medium,
  omega: number,
  logRe: number,
  logIm: number,
  h: Float64Array,
  z: Float64Array,
): void {
  const re = m.infinite + m.slope * logRe;
  const im = m.slope * logIm;
  const size = Math.sqrt(re * re + im * im);
  const rootRe = Math.sqrt((size + re) / 2);
  const rootIm = im / (2 * rootRe);
  const electrical = omega * Math.sqrt(m.inductance * m.capacitance) * m.lengthMeters;
  hyperbolic(-electrical * rootIm, electrical * rootRe, h);
  const ohms = Math.sqrt(m.inductance / m.capacitance) / size; // Z = Zair/√ε = Zair √ε*/|ε|
  z[0] = ohms * rootRe;
  z[1] = -ohms * rootIm;
}

/** Input admittance of a stub at one frequency, written to `y`; `media` from the joint outwards. */
export function stubAdmittance(
  media: readonly Medium[],
  endFarads: number,
  omega: number,
  logRe: number,
  logIm: number,
  y: Float64Array,
  h: Float64Array,
  z: Float64Array,
): void {
  y[0] = 0;
  y[1] = omega * endFarads;
  for (let i = media.length - 1; i >= 0; i--) {
    stretchAt(media[i], omega, logRe, logIm, h, z);
    transformAdmittance(y, h, z[0], z[1]);
  }
}

/** Notches above are not looked for. */
const HIGHEST_HZ = 1e12;

/**
 * Lowest frequency at which a stub, loaded at its end, shorts its joint: its input admittance B = Y0 tan φ has its first pole.
 * φ grows with frequency through every stretch, so that the root is bracketed; losses are left out, Dk moves with
 * frequency. For one stretch: tan(βl) = 1/(ω C Z0). Check values N-06, V-07.
 * @returns Hz; Infinity for a stub of no length or a notch above 1 THz
 */
export function stubNotch({ stretches, endFarads }: OpenStub): number {
  const media = stretches.filter(({ lengthMeters }) => lengthMeters > 0).map(mediumOf);
  if (media.length === 0) return Number.POSITIVE_INFINITY;
  const phase = (hz: number) => {
    const omega = 2 * Math.PI * hz;
    const [log] = wideBandLogarithm([hz]);
    let angle = 0;
    let admittance = 0;
    for (let i = media.length - 1; i >= 0; i--) {
      const { lengthMeters, inductance, capacitance, infinite, slope } = media[i];
      const dk = infinite + slope * log;
      const own = Math.sqrt((capacitance * dk) / inductance);
      if (i === media.length - 1) angle = Math.atan((omega * endFarads) / own);
      else {
        // the same admittance in the next stretch's terms, on the same branch of the tangent
        const turns = Math.round(angle / Math.PI);
        angle = Math.atan((admittance / own) * Math.tan(angle - turns * Math.PI)) + turns * Math.PI;
      }
      angle += omega * Math.sqrt(inductance * capacitance * dk) * lengthMeters;
      admittance = own;
    }
    return angle - Math.PI / 2;
  };
  const beyond = phase(HIGHEST_HZ);
  return beyond < 0 ? Number.POSITIVE_INFINITY : findRoot(phase, 0, HIGHEST_HZ, -Math.PI / 2, beyond);
}
