import { ETA_0 } from './constants';
import { ellipticRatio } from './elliptic';

/**
 * Impedance in air of a strip of no thickness midway between planes, ohm.
 * Source: Cohn, IRE Trans. MTT 1954; exact. Check values T-01 to T-03.
 * @param widthRatio w/b, b the distance of the planes
 */
export function thinStripline(widthRatio: number): number {
  const x = (Math.PI / 2) * widthRatio;
  return (ETA_0 / 4) * ellipticRatio(1 / Math.cosh(x), Math.tanh(x));
}

/**
 * Odd and even impedance in air of two strips of no thickness side by side midway between planes, ohm each.
 * Source: Cohn, Shielded coupled-strip transmission line, IRE Trans. MTT-3, 1955, 29-38; exact. Check values T-07, T-08, T-28.
 * @param widthRatio w/b
 * @param gapRatio s/b
 */
export function thinCoupledStripline(widthRatio: number, gapRatio: number): { odd: number; even: number } {
  const a = Math.tanh((Math.PI / 2) * widthRatio);
  const b = Math.tanh((Math.PI / 2) * (widthRatio + gapRatio));
  const k = a * b; // even
  const l = a / b; // odd
  return {
    even: (ETA_0 / 4) * ellipticRatio(Math.sqrt((1 - k) * (1 + k)), k),
    odd: (ETA_0 / 4) * ellipticRatio(Math.sqrt((1 - l) * (1 + l)), l),
  };
}

/**
 * Impedance in air of a strip of thickness t midway between planes, ohm; about 0.5 %.
 * Source: Wheeler, IEEE Trans. MTT-26, 1978. Check values T-06, T-30.
 * @param widthRatio w/b
 * @param thicknessRatio t/b, above 0, up to about 0.25
 */
export function thickStripline(widthRatio: number, thicknessRatio: number): number {
  const x = thicknessRatio;
  const m = 2 / (1 + ((2 / 3) * x) / (1 - x));
  const log = Math.log((x / (2 - x)) ** 2 + ((0.0796 * x) / (widthRatio + 1.1 * x)) ** m);
  const w = widthRatio / (1 - x) + (x / (Math.PI * (1 - x))) * (1 - 0.5 * log); // W/(b−t)
  const v = 8 / Math.PI / w;
  return 30 * Math.log(1 + (v / 2) * (v + Math.sqrt(v * v + 6.27)));
}

/** Fringing capacitance of one edge of a thick strip to one plane, over ε. Source: Cohn 1955, equation 21 and figure 5. */
function fringing(thicknessRatio: number): number {
  const x = 1 / (1 - thicknessRatio);
  const second = x > 1 ? (x - 1) * Math.log(x * x - 1) : 0;
  return (2 * x * Math.log(x + 1) - second) / Math.PI;
}

/**
 * Width over plane distance of the thin strip that has an impedance in air: {@link thinStripline} turned round by the nome
 * q = e^{−πK'/K}, k = (θ2/θ3)². Abramowitz and Stegun 17.3.17 and 16.38.
 */
export function thinStriplineWidth(ohms: number): number {
  const ratio = (4 * ohms) / ETA_0; // K/K' of sech, K'/K of tanh
  const modulus = (k: number) => {
    const q = Math.exp(-Math.PI / k);
    const theta2 = 2 * q ** 0.25 * (1 + q ** 2 + q ** 6 + q ** 12);
    const theta3 = 1 + 2 * (q + q ** 4 + q ** 9 + q ** 16);
    return (theta2 / theta3) ** 2;
  };
  const x = ratio <= 1 ? Math.acosh(1 / modulus(ratio)) : Math.atanh(modulus(1 / ratio));
  return (2 / Math.PI) * x;
}

/** How sharply the odd mode goes from one of Cohn's forms to the other; ours, fitted to boundary elements. */
const BLEND = 64;

/**
 * Odd and even impedance in air of two thick strips side by side midway between planes, ohm each.
 * Cohn's fringing capacitances scale the coupling of the thin pair. Odd mode: that form, which is best at wide gaps, and his second one
 * with the plate capacitance of the facing walls, best at narrow ones (his border is s = 5t); both give too little capacitance, so the
 * larger is taken, with a smooth passage. Even mode: the mean of Cohn's form and of the thin pair of equal strips (each as
 * wide as the thin strip of the thick one's impedance), which err to either side.
 * Source: Cohn 1955, equations 18 to 20; passage and mean are ours, measured against boundary elements: for w/b 0.35 to 0.8, s/b 0.3 to
 * 1.2, t/b 0.02 to 0.1 the odd mode within 0.9 %, the even one within 0.8 %; narrower strips and gaps up to 1.6 % and 3 %.
 * Cohn's range: w/(b−t) ≥ 0.35, t/b ≤ 0.25. Check value T-30.
 */
export function thickCoupledStripline(
  widthRatio: number,
  gapRatio: number,
  thicknessRatio: number,
): { odd: number; even: number } {
  const thinPair = thinCoupledStripline(widthRatio, gapRatio);
  if (thicknessRatio <= 0) return thinPair;
  const thin = 1 / thinStripline(widthRatio);
  const thick = 1 / thickStripline(widthRatio, thicknessRatio);
  const scale = fringing(thicknessRatio) / fringing(0);
  const wide = thick + scale * (1 / thinPair.odd - thin);
  const narrow =
    1 / thinPair.odd +
    (thick - thin) -
    (2 / ETA_0) * (fringing(thicknessRatio) - fringing(0)) +
    (2 / ETA_0) * (thicknessRatio / gapRatio);
  const [more, less] = [Math.max(wide, narrow), Math.min(wide, narrow)];
  const odd = more * (1 + (Math.max(less, 0) / more) ** BLEND) ** (1 / BLEND);
  const equal = thinStriplineWidth(1 / thick);
  const widening = equal - widthRatio;
  const equalPair = thinCoupledStripline(equal, gapRatio * Math.exp(-widening / gapRatio)); // s less the widening, above 0
  const even = (thick - scale * (thin - 1 / thinPair.even) + 1 / equalPair.even) / 2;
  return { odd: 1 / odd, even: 1 / even };
}
