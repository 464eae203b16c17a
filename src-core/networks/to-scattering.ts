import { identity, invert, multiply } from './complex-matrix';
import type { OptionLine } from './touchstone-option-line';

/**
 * One frequency's parameters as scattering parameters, in place. Touchstone 1 gives Z, Y, G and H normalised to the reference (F-07).
 * S = (z − 1)(z + 1)⁻¹ = (1 − y)(1 + y)⁻¹; of the hybrid forms as in any table of two-port parameters.
 */
export function toScattering(matrix: Float64Array, ports: number, parameter: OptionLine['parameter']): void {
  if (parameter === 'Z' || parameter === 'Y') fromImmittance(matrix, ports, parameter);
  else if (parameter === 'H') fromHybrid(matrix);
  else if (parameter === 'G') fromHybrid(matrix, invert(matrix, 2));
}

function fromImmittance(matrix: Float64Array, ports: number, parameter: 'Z' | 'Y'): void {
  const one = identity(ports);
  const sign = parameter === 'Z' ? 1 : -1;
  const above = matrix.map((value, i) => sign * (value - one[i]));
  const below = matrix.map((value, i) => value + one[i]);
  multiply(above, invert(below, ports), ports, matrix);
}

/**
 * With D = (h11 + 1)(h22 + 1) − h12 h21: S11 = ((h11 − 1)(h22 + 1) − h12 h21)/D, S12 = 2 h12/D, S21 = −2 h21/D,
 * S22 = ((1 + h11)(1 − h22) + h12 h21)/D.
 */
function fromHybrid(out: Float64Array, h: Float64Array = out.slice()): void {
  const [h11, h12, h21, h22] = [0, 2, 4, 6].map((i): Complex => [h[i], h[i + 1]]);
  const cross = times(h12, h21);
  const d = minus(times(plus(h11, 1), plus(h22, 1)), cross);
  const s11 = over(minus(times(plus(h11, -1), plus(h22, 1)), cross), d);
  const s12 = over([2 * h12[0], 2 * h12[1]], d);
  const s21 = over([-2 * h21[0], -2 * h21[1]], d);
  const s22 = over(minus(times(plus(h11, 1), [1 - h22[0], -h22[1]]), [-cross[0], -cross[1]]), d);
  out.set([...s11, ...s12, ...s21, ...s22]);
}

type Complex = readonly [number, number];
const plus = (a: Complex, real: number): Complex => [a[0] + real, a[1]];
const minus = (a: Complex, b: Complex): Complex => [a[0] - b[0], a[1] - b[1]];
const times = (a: Complex, b: Complex): Complex => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
const over = (a: Complex, b: Complex): Complex => {
  const square = b[0] ** 2 + b[1] ** 2;
  return [(a[0] * b[0] + a[1] * b[1]) / square, (a[1] * b[0] - a[0] * b[1]) / square];
};
