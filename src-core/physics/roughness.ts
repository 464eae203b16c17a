import { MU_0 } from './constants';
import { skinDepth, slabImpedance } from './copper';

/** How rough a foil is, and by whose measure. */
export type Roughness =
  | { readonly kind: 'smooth' }
  | { readonly kind: 'rms'; readonly rmsMeters: number }
  /** `ratio`: sphere area over flat area, the sum of N·4πa² over A. */
  | { readonly kind: 'huray'; readonly radiusMeters: number; readonly ratio: number };

/**
 * Hammerstad's factor on the resistance of a rough surface: 1 + (2/π) atan(1.4 (Δ/δ)²). Saturates at 2.
 * @param ratio rms roughness over skin depth, Δ/δ
 * Holds for shallow profiles (Δ up to about 2 µm); a low-profile foil above 20 GHz may lose more than this says.
 * Source: Hammerstad and Jensen, IEEE MTT-S Digest 1980, 407-409. Check values M-10, M-11.
 */
export function hammerstadFactor(ratio: number): number {
  return 1 + (2 / Math.PI) * Math.atan(1.4 * ratio * ratio);
}

/**
 * Huray's factor for spheres of one size on a flat base: 1 + (3/2) ratio/(1 + δ/a + δ²/(2a²)).
 * @param surfaceRatio area of the spheres over the flat area, ΣN·4πa²/A
 * Source: Huray, The Foundations of Signal Integrity, Wiley 2010. Check value M-12.
 */
export function hurayFactor(skinDepthMeters: number, radiusMeters: number, surfaceRatio: number): number {
  const u = skinDepthMeters / radiusMeters;
  return 1 + (1.5 * surfaceRatio) / (1 + u + (u * u) / 2);
}

/**
 * The stack of equal spheres that stands for a foil of ten-point height Rz: 14 spheres of radius r on a base of 36 r².
 * @returns Huray's numbers: r = Rz/(2√3)/(2(1+√2)) = 0.0598 Rz and the surface ratio 14·4π/36
 * Source: Simonovich, DesignCon 2015. Check value M-13.
 */
export function cannonball(rzMeters: number): { radiusMeters: number; ratio: number } {
  return { radiusMeters: rzMeters / (2 * Math.sqrt(3)) / (2 * (1 + Math.SQRT2)), ratio: (14 * 4 * Math.PI) / 36 };
}

/**
 * The complex factor on a smooth surface impedance R(1+j) whose resistance is Hammerstad's and whose reactance belongs
 * to it by Kramers and Kronig. (The real factor times the whole impedance answers before its cause.)
 *
 * With s = jf/fr, 1/fr = 1.4 π μ0 σ Δ², the wanted resistance is Re √s · K. Its continuation to the negative real axis gives
 * the density of relaxations that makes it, all positive; their sum in closed form, z = √s:
 * K(s) = 1 + (2/π) [ln(1+z) − ½ ln(1+z²) + atan z]. It is 1 at DC, 2 far above, and analytic in the right half-plane.
 * @param scaled f/fr = 1.4 (Δ/δ)²
 * Derived here from the factor's published form; the tests compare it with a numerical Hilbert transform.
 */
export function causalHammerstad(scaled: number, out: Float64Array, at: number): void {
  const y = Math.sqrt(scaled / 2); // z = y(1+j)
  const log = 0.25 * (Math.log1p(2 * y + 2 * y * y) - Math.log1p(-2 * y + 2 * y * y));
  const below = Math.atan2(y, 1 - y);
  const above = Math.atan2(y, 1 + y);
  out[at] = 1 + (2 / Math.PI) * (log + (below + above) / 2);
  out[at + 1] = (2 / Math.PI) * (log + 1.5 * above - below / 2);
}

/**
 * The same for Huray's spheres: each term (3/2) ratio/(1 + δ/((1+j)a)). With u = δ/a, Re (1+j)/(1 + u/(1+j)) is just
 * 1/(1 + u + u²/2), so resistance is Huray's and the whole is a rational function of √(jω): causal and passive.
 * Source: as {@link hurayFactor}; complex form Bracken, DesignCon 2012.
 */
export function causalHuray(
  skinDepthMeters: number,
  radiusMeters: number,
  ratio: number,
  out: Float64Array,
  at: number,
): void {
  const h = skinDepthMeters / radiusMeters / 2; // u/(1+j) = h(1−j)
  const scale = (1.5 * ratio) / ((1 + h) * (1 + h) + h * h);
  out[at] = 1 + scale * (1 + h);
  out[at + 1] = scale * h;
}

export interface Surface {
  /** At its temperature, S/m. */
  readonly conductivity: number;
  readonly roughness: Roughness;
}

/** The causal factor of a surface's roughness over frequency: 2n numbers, re and im; 1 at DC and for smooth copper. */
export function roughnessFactor(frequencies: ArrayLike<number>, { conductivity, roughness }: Surface): Float64Array {
  const out = new Float64Array(2 * frequencies.length);
  const rms = roughness.kind === 'rms' ? roughness.rmsMeters : 0;
  const perHertz = 1.4 * Math.PI * MU_0 * conductivity * rms * rms;
  for (let i = 0; i < frequencies.length; i++) {
    const f = frequencies[i];
    out[2 * i] = 1;
    if (f <= 0) continue; // roughness does nothing at DC
    if (rms > 0) causalHammerstad(perHertz * f, out, 2 * i);
    else if (roughness.kind === 'huray' && roughness.radiusMeters > 0)
      causalHuray(skinDepth(f, conductivity), roughness.radiusMeters, roughness.ratio, out, 2 * i);
  }
  return out;
}

/**
 * Surface impedance of copper over frequency: skin effect, its joint with DC, roughness; causal and passive.
 * @param thicknessMeters depth in which current may flow; Infinity: a half-space, 0 at DC
 * @param factor that of the surface's roughness, where it is at hand already
 * @returns 2n numbers: re and im, ohm per square
 */
export function surfaceImpedance(
  frequencies: ArrayLike<number>,
  surface: Surface,
  thicknessMeters: number,
  factor: Float64Array = roughnessFactor(frequencies, surface),
): Float64Array {
  const out = new Float64Array(2 * frequencies.length);
  for (let i = 0; i < out.length; i += 2) {
    slabImpedance(frequencies[i >> 1], surface.conductivity, thicknessMeters, out, i);
    const re = out[i];
    const im = out[i + 1];
    out[i] = re * factor[i] - im * factor[i + 1];
    out[i + 1] = re * factor[i + 1] + im * factor[i];
  }
  return out;
}
