import { MU_0 } from './constants';

/** Change of copper's resistivity per kelvin, from 20 °C. Source: NBS Handbook 100 (1966); IEC 60028. Check value M-03. */
const RESISTIVITY_PER_KELVIN = 0.00393;

/** Conductivity of annealed copper at 20 °C, S/m. Source: NBS Handbook 100 (1966). Check value M-02. */
export const COPPER_CONDUCTIVITY = 58e6;

/** Conductivity, S/m, at a temperature, from that at 20 °C. Holds from about −55 to 150 °C. Check value M-03. */
export function conductivityAt(conductivity: number, celsius: number): number {
  return conductivity / (1 + RESISTIVITY_PER_KELVIN * (celsius - 20));
}

/** Skin depth, m: 1/√(π f μ0 σ). Source: any textbook. Check values M-04 to M-06. */
export function skinDepth(frequencyHz: number, conductivity: number): number {
  return 1 / Math.sqrt(Math.PI * frequencyHz * MU_0 * conductivity);
}

/** Resistance of a thick smooth surface, ohm per square: √(π f μ0/σ). Check value M-07. */
export function surfaceResistance(frequencyHz: number, conductivity: number): number {
  return Math.sqrt((Math.PI * frequencyHz * MU_0) / conductivity);
}

/**
 * Surface impedance of a slab with field on one side: it joins the DC resistance 1/(σt) and the DC internal inductance
 * μ0 t/3 to the skin effect. Zs = (1+j)/(σδ) coth((1+j) t/δ).
 * @param thicknessMeters Infinity gives the half-space, which is 0 at DC
 * @returns re and im, ohm per square, written to `out` at `at`
 * Source: Ramo, Whinnery, Van Duzer, Fields and Waves, plane conductor of finite depth. Check value M-08.
 */
export function slabImpedance(
  frequencyHz: number,
  conductivity: number,
  thicknessMeters: number,
  out: Float64Array = new Float64Array(2),
  at = 0,
): Float64Array {
  const rs = surfaceResistance(frequencyHz, conductivity);
  const x = thicknessMeters === Number.POSITIVE_INFINITY ? 12 : thicknessMeters * rs * conductivity; // t/δ
  if (x >= 12) {
    out[at] = rs;
    out[at + 1] = rs;
  } else if (x < 1e-4) {
    out[at] = 1 / (conductivity * thicknessMeters);
    out[at + 1] = (2 * Math.PI * frequencyHz * MU_0 * thicknessMeters) / 3;
  } else {
    // coth((1+j)x) = (sinh 2x − j sin 2x)/(cosh 2x − cos 2x), both multiplied by 2e^{−2x} so that nothing overflows
    const oneLess = x < 0.1 ? -Math.expm1(-2 * x) : 1 - Math.exp(-2 * x);
    const e = 1 - oneLess;
    const sine = Math.sin(x);
    const scale = rs / (oneLess * oneLess + 4 * e * sine * sine);
    const re = oneLess * (1 + e);
    const im = -4 * e * sine * Math.cos(x);
    out[at] = scale * (re - im);
    out[at + 1] = scale * (re + im);
  }
  return out;
}

/**
 * Impedance of a round wire over its DC resistance, re and im: (γa/2) I0(γa)/I1(γa) with γ = (1+j)/δ.
 * @param radiusInSkinDepths a/δ from 0 to some hundreds
 * Source: Ramo, Whinnery, Van Duzer, round wire. Check value M-09.
 */
export function roundWireRatio(radiusInSkinDepths: number): [re: number, im: number] {
  const a = radiusInSkinDepths;
  if (a < 1e-6) return [1, 0];
  // r_n = I_n/I_{n−1} = 1/(2n/z + r_{n+1}), backwards from where r is negligible; z = a(1+j), 1/z = (1−j)/(2a)
  let re = 0;
  let im = 0;
  for (let n = Math.ceil(30 + 3 * a); n >= 1; n--) {
    const dRe = n / a + re;
    const dIm = -n / a + im;
    const scale = 1 / (dRe * dRe + dIm * dIm);
    re = dRe * scale;
    im = -dIm * scale;
  }
  const scale = a / 2 / (re * re + im * im); // (z/2)/r_1
  return [scale * (re + im), scale * (re - im)];
}
