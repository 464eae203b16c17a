import { invert, multiply } from './complex-matrix';

/**
 * Scattering data referred to other real resistances: S' = (Q + P S)(P + Q S)⁻¹ with, a port, s = √(from/to), P = (s + 1/s)/2 and
 * Q = (s − 1/s)/2, which follow from voltage and current being the same. The same object comes back where nothing changes.
 * @param s n ports: 2n² numbers a frequency
 * @param from, to ohm a port
 * Check value N-09 (there by way of the impedance matrix).
 */
export function renormalise(s: Float64Array, from: readonly number[], to: readonly number[]): Float64Array {
  const n = from.length;
  if (from.every((ohm, port) => ohm === to[port])) return s;
  const p = from.map((ohm, port) => (Math.sqrt(ohm / to[port]) + Math.sqrt(to[port] / ohm)) / 2);
  const q = from.map((ohm, port) => (Math.sqrt(ohm / to[port]) - Math.sqrt(to[port] / ohm)) / 2);
  const size = 2 * n * n;
  const out = new Float64Array(s.length);
  const above = new Float64Array(size);
  const below = new Float64Array(size);
  for (let at = 0; at < s.length; at += size) {
    for (let row = 0; row < n; row++) {
      for (let i = 2 * n * row; i < 2 * n * (row + 1); i++) {
        above[i] = p[row] * s[at + i];
        below[i] = q[row] * s[at + i];
      }
      above[2 * (n * row + row)] += q[row];
      below[2 * (n * row + row)] += p[row];
    }
    out.set(multiply(above, invert(below, n), n), at);
  }
  return out;
}
