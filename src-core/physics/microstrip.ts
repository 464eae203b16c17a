import { ETA_0 } from './constants';

/** Impedance over a plane in air, u = w/h. Hammerstad and Jensen 1980, equations 1 and 2. */
function airImpedance(u: number): number {
  const f = 6 + (2 * Math.PI - 6) * Math.exp(-((30.666 / u) ** 0.7528));
  return (ETA_0 / (2 * Math.PI)) * Math.log(f / u + Math.sqrt(1 + (2 / u) ** 2));
}

/** Effective dielectric constant, u = w/h. Hammerstad and Jensen 1980, equations 3 to 5. */
function effectiveDk(u: number, er: number): number {
  const a = 1 + Math.log((u ** 4 + (u / 52) ** 2) / (u ** 4 + 0.432)) / 49 + Math.log(1 + (u / 18.1) ** 3) / 18.7;
  const b = 0.564 * ((er - 0.9) / (er + 3)) ** 0.053;
  return (er + 1) / 2 + ((er - 1) / 2) * (1 + 10 / u) ** (-a * b);
}

/** By how much a thick strip is wider, over h: in air, and in the dielectric. Hammerstad and Jensen 1980, equations 6 to 8. */
function thicknessWidening(u: number, thicknessRatio: number, er: number): number {
  if (thicknessRatio <= 0) return 0;
  const coth = 1 / Math.tanh(Math.sqrt(6.517 * u));
  const inAir = (thicknessRatio / Math.PI) * Math.log(1 + (4 * Math.E) / (thicknessRatio * coth * coth));
  return (inAir / 2) * (1 + 1 / Math.cosh(Math.sqrt(Math.max(0, er - 1))));
}

/**
 * Impedance (ohm) and effective dielectric constant of a strip over a plane, without dispersion.
 * @param u w/h, up to 1000
 * @param er of the dielectric, 1 to 128
 * @param thicknessRatio t/h
 * Source: Hammerstad and Jensen, IEEE MTT-S Digest 1980, 407-409; claimed Z 0.03 % in air, ε 0.2 %. Check values T-14 to
 * T-18, T-21.
 */
export function microstrip(u: number, er: number, thicknessRatio = 0): { impedance: number; effectiveDk: number } {
  const inAir = u + thicknessWidening(u, thicknessRatio, 1);
  const inDielectric = u + thicknessWidening(u, thicknessRatio, er);
  const ee = effectiveDk(inDielectric, er);
  const z = airImpedance(inDielectric);
  return { impedance: z / Math.sqrt(ee), effectiveDk: ee * (airImpedance(inAir) / z) ** 2 };
}

/**
 * Odd and even impedance (ohm each) and effective dielectric constant of two strips of no thickness over a plane.
 * @param u w/h, 0.1 to 10
 * @param g s/h, 0.1 to 10
 * @param er 1 to 18
 * Source: Kirschning and Jansen, IEEE Trans. MTT-32, 1984, 83-90, static part; within 0.5 % there. Check value T-20.
 */
export function coupledMicrostrip(u: number, g: number, er: number) {
  return { odd: oddMode(u, g, er), even: evenMode(u, g, er) };
}

interface Mode {
  readonly impedance: number;
  readonly effectiveDk: number;
}

function evenMode(u: number, g: number, er: number): Mode {
  const single = microstrip(u, er);
  const v = (u * (20 + g * g)) / (10 + g * g) + g * Math.exp(-g);
  const ee = effectiveDk(v, er);
  const scale = (single.impedance / ETA_0) * Math.sqrt(single.effectiveDk) * coupling(u, g).even;
  return { impedance: (single.impedance * Math.sqrt(single.effectiveDk / ee)) / (1 - scale), effectiveDk: ee };
}

function oddMode(u: number, g: number, er: number): Mode {
  const single = microstrip(u, er);
  const half = 0.5 * (er + 1);
  const ao = 0.7287 * (single.effectiveDk - half) * (1 - Math.exp(-0.179 * u));
  const bo = (0.747 * er) / (0.15 + er);
  const co = bo - (bo - 0.207) * Math.exp(-0.414 * u);
  const d = 0.593 + 0.694 * Math.exp(-0.562 * u);
  const ee = (half + ao - single.effectiveDk) * Math.exp(-co * g ** d) + single.effectiveDk;
  const scale = (single.impedance / ETA_0) * Math.sqrt(single.effectiveDk) * coupling(u, g).odd;
  return { impedance: (single.impedance * Math.sqrt(single.effectiveDk / ee)) / (1 - scale), effectiveDk: ee };
}

/** Q4 (even) and Q10 (odd) of the paper. */
function coupling(u: number, g: number): { even: number; odd: number } {
  const q1 = 0.8695 * u ** 0.194;
  const q2 = 1 + 0.7519 * g + 0.189 * g ** 2.31;
  const q3 = 0.1975 + (16.6 + (8.4 / g) ** 6) ** -0.387 + Math.log(g ** 10 / (1 + (g / 3.4) ** 10)) / 241;
  const q4 = (2 * q1) / q2 / (Math.exp(-g) * u ** q3 + (2 - Math.exp(-g)) * u ** -q3);
  const q5 = 1.794 + 1.14 * Math.log(1 + 0.638 / (g + 0.517 * g ** 2.43));
  const q6 = 0.2305 + Math.log(g ** 10 / (1 + (g / 5.8) ** 10)) / 281.3 + Math.log(1 + 0.598 * g ** 1.154) / 5.1;
  const q7 = (10 + 190 * g * g) / (1 + 82.3 * g ** 3);
  const q8 = Math.exp(-6.5 - 0.95 * Math.log(g) - (g / 0.15) ** 5);
  const q9 = Math.log(q7) * (q8 + 1 / 16.5);
  return { even: q4, odd: (q2 * q4 - q5 * Math.exp(q6 * Math.log(u) * u ** -q9)) / q2 };
}

/**
 * The same for strips of thickness t: each mode with its own wider strip. The even mode's widening is the single strip's, less what
 * the neighbour shields; the odd mode's is half of the single strip's, for the free edge, and the plate capacitance 2 ε0 t/s of the
 * facing walls, in air, for the other.
 * Source: Jansen, IEEE Trans. MTT-26, 1978, 75-82 (even mode, plate capacitance), over Kirschning and Jansen 1984; that the wall stands
 * in place of its edge is Cohn's, 1955 (Jansen adds it to both and comes out 1 to 5 % low).
 * In air against boundary elements, w/h and s/h 0.5 to 2.5, t/h up to 0.47: even within 1 %; odd up to 3 % low where s ≥ 3t, 5 % at
 * s = 2.5t. In a dielectric the walls, in air, weigh about half of that.
 * @param thicknessRatio t/h
 */
export function thickCoupledMicrostrip(u: number, g: number, er: number, thicknessRatio: number) {
  if (thicknessRatio <= 0) return coupledMicrostrip(u, g, er);
  const widening = (dk: number) => {
    const single = thicknessWidening(u, thicknessRatio, dk);
    const wall = (2 * thicknessRatio) / (g * dk);
    return {
      even: u + single * (1 - 0.5 * Math.exp((-0.69 * single) / wall)),
      odd: u + single / 2 + Math.max(single / 2, wall),
    };
  };
  const here = widening(er);
  const air = widening(1);
  // ε follows from the two capacitances, with the dielectric and without, as it does for the single strip
  const joined = (mode: typeof evenMode, width: number, widthInAir: number): Mode => {
    const impedance = mode(width, g, er).impedance;
    return { impedance, effectiveDk: (mode(widthInAir, g, 1).impedance / impedance) ** 2 };
  };
  return { odd: joined(oddMode, here.odd, air.odd), even: joined(evenMode, here.even, air.even) };
}

/**
 * Effective dielectric constant of a microstrip at a frequency. Not part of the computed networks: they use the
 * quasi-TEM value; the tests tell by this how far that holds.
 * @param frequencyTimesHeight f·h in Hz·m
 * Source: Kirschning and Jansen, Electronics Letters 18, 1982, 272-273; claimed 0.6 %. Check value T-19.
 */
export function dispersedDk(u: number, er: number, staticDk: number, frequencyTimesHeight: number): number {
  const fh = frequencyTimesHeight * 1e-6; // GHz mm
  const p1 = 0.27488 + u * (0.6315 + 0.525 / (1 + 0.0157 * fh) ** 20) - 0.065683 * Math.exp(-8.7513 * u);
  const p2 = 0.33622 * (1 - Math.exp(-0.03442 * er));
  const p3 = 0.0363 * Math.exp(-4.6 * u) * (1 - Math.exp(-((fh / 38.7) ** 4.97)));
  const p4 = 1 + 2.751 * (1 - Math.exp(-((er / 15.916) ** 8)));
  return er - (er - staticDk) / (1 + p1 * p2 * ((0.1844 + p3 * p4) * fh) ** 1.5763);
}

/**
 * Share of the field above a microstrip that lies in a cover of thickness c: 1 − e^{−2c/h}.
 * Source: form of Bahl and Stuchly, IEEE Trans. MTT-28, 1980, 104-109; an interpolation between the bare strip and the
 * buried one (check value T-31), good to a few per cent.
 */
export function coverShare(coverRatio: number): number {
  return -Math.expm1(-2 * coverRatio);
}
