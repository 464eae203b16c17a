/**
 * A line's propagation constant and characteristic impedance from its constants per metre, at ω.
 * γ = √((R+jωL)(G+jωC)), Zc = √((R+jωL)/(G+jωC)); both in the right half-plane.
 * @returns re and im of γ (1/m), re and im of Zc (ohm). Check value T-26.
 */
export function lineConstants(
  r: number,
  l: number,
  g: number,
  c: number,
  omega: number,
): [alpha: number, beta: number, resistance: number, reactance: number] {
  const out = new Float64Array(4);
  propagation(r, omega * l, g, omega * c, out);
  return [out[0], out[1], out[2], out[3]];
}

/** {@link lineConstants} from series impedance and shunt admittance per metre, without allocation; the admittance not 0. */
export function propagation(zRe: number, zIm: number, yRe: number, yIm: number, out: Float64Array): void {
  // roots of Z and Y apart (both in the first quadrant): their product and quotient keep every digit
  const zSize = Math.sqrt(zRe * zRe + zIm * zIm);
  const ySize = Math.sqrt(yRe * yRe + yIm * yIm);
  const a = Math.sqrt((zSize + zRe) / 2);
  const b = a > 0 ? zIm / (2 * a) : 0;
  const c = Math.sqrt((ySize + yRe) / 2);
  const d = yIm / (2 * c);
  out[0] = a * c - b * d;
  out[1] = a * d + b * c;
  out[2] = (a * c + b * d) / ySize;
  out[3] = (b * c - a * d) / ySize;
}

/**
 * Scattering of a line between equal references, from e^{−γl} so that long lossy lines stay exact:
 * s11 = Γ(1−P²)/(1−Γ²P²), s21 = P(1−Γ²)/(1−Γ²P²), Γ = (Zc−Z0)/(Zc+Z0), P = e^{−γl}.
 * Writes 8 numbers (s11, s12, s21, s22) at `at`. Source: Pozar, Microwave Engineering, signal flow of a line. Check values N-03, N-04.
 */
export function scatterLine(
  alphaLength: number,
  betaLength: number,
  zRe: number,
  zIm: number,
  reference: number,
  out: Float64Array,
  at: number,
): void {
  const size = Math.exp(-alphaLength);
  const pRe = size * Math.cos(betaLength);
  const pIm = -size * Math.sin(betaLength);
  const sum = zRe + reference;
  const scale = 1 / (sum * sum + zIm * zIm);
  const gRe = ((zRe - reference) * sum + zIm * zIm) * scale;
  const gIm = 2 * zIm * reference * scale;
  const g2Re = gRe * gRe - gIm * gIm;
  const g2Im = 2 * gRe * gIm;
  const p2Re = pRe * pRe - pIm * pIm;
  const p2Im = 2 * pRe * pIm;
  const dRe = 1 - (g2Re * p2Re - g2Im * p2Im);
  const dIm = -(g2Re * p2Im + g2Im * p2Re);
  const over = 1 / (dRe * dRe + dIm * dIm);
  // s11
  let nRe = gRe * (1 - p2Re) + gIm * p2Im;
  let nIm = gIm * (1 - p2Re) - gRe * p2Im;
  const s11Re = (nRe * dRe + nIm * dIm) * over;
  const s11Im = (nIm * dRe - nRe * dIm) * over;
  // s21
  nRe = pRe * (1 - g2Re) + pIm * g2Im;
  nIm = pIm * (1 - g2Re) - pRe * g2Im;
  const s21Re = (nRe * dRe + nIm * dIm) * over;
  const s21Im = (nIm * dRe - nRe * dIm) * over;
  out[at] = out[at + 6] = s11Re;
  out[at + 1] = out[at + 7] = s11Im;
  out[at + 2] = out[at + 4] = s21Re;
  out[at + 3] = out[at + 5] = s21Im;
}

/** Scattering of a resistance in series between equal references; 8 numbers at `at`. Pozar, Table 4.1. */
export function scatterSeries(ohms: number, reactance: number, reference: number, out: Float64Array, at: number): void {
  const a = 2 * reference + ohms;
  const scale = 1 / (a * a + reactance * reactance);
  const s21Re = 2 * reference * a * scale;
  const s21Im = -2 * reference * reactance * scale;
  out[at] = out[at + 6] = 1 - s21Re;
  out[at + 1] = out[at + 7] = -s21Im;
  out[at + 2] = out[at + 4] = s21Re;
  out[at + 3] = out[at + 5] = s21Im;
}
