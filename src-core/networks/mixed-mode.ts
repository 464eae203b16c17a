import type { FourPort, Network, TwoPort } from './types';

/** Conversion below this is rounding: the modes are then kept as two separate two-ports. */
const conversionFloor = 1e-9;

/**
 * Single-ended four-port to mixed mode. With d = (p − n)/√2 and c = (p + n)/√2 for waves in and out, single-ended ports of
 * reference R make a differential port of 2R and a common one of R/2.
 * @param s 32 numbers a frequency, ports in the order p1, n1, p2, n2 (1 the transmitter side; all of one reference)
 * @returns 32 numbers a frequency, ports in the order d1, c1, d2, c2
 * Source: Bockelman and Eisenstadt, IEEE Trans. MTT-43(7), 1995, 1530-1539. Check values N-12, N-13.
 */
export function toMixedMode(s: Float64Array, out: FourPort = new Float64Array(s.length)): FourPort {
  for (let at = 0; at < s.length; at += 32) {
    for (let row = 0; row < 32; row += 16) {
      for (let column = 0; column < 8; column += 4) {
        for (let part = 0; part < 2; part++) {
          const i = at + row + column + part;
          const pp = s[i];
          const pn = s[i + 2];
          const np = s[i + 8];
          const nn = s[i + 10];
          out[i] = (pp - pn - np + nn) / 2; // dd
          out[i + 2] = (pp + pn - np - nn) / 2; // dc: common in, differential out
          out[i + 8] = (pp - pn + np - nn) / 2; // cd
          out[i + 10] = (pp + pn + np + nn) / 2; // cc
        }
      }
    }
  }
  return out;
}

/** The way back: ports d1, c1, d2, c2 to p1, n1, p2, n2, each referred to half the differential reference. */
export function toSingleEnded(s: FourPort, out: Float64Array = new Float64Array(s.length)): Float64Array {
  for (let at = 0; at < s.length; at += 32) {
    for (let row = 0; row < 32; row += 16) {
      for (let column = 0; column < 8; column += 4) {
        for (let part = 0; part < 2; part++) {
          const i = at + row + column + part;
          const dd = s[i];
          const dc = s[i + 2];
          const cd = s[i + 8];
          const cc = s[i + 10];
          out[i] = (dd + dc + cd + cc) / 2; // pp
          out[i + 2] = (-dd + dc - cd + cc) / 2; // pn
          out[i + 8] = (-dd - dc + cd + cc) / 2; // np
          out[i + 10] = (dd - dc - cd + cc) / 2; // nn
        }
      }
    }
  }
  return out;
}

/** A mixed-mode four-port as a network: `full` only where the modes convert by more than rounding. */
export function networkOf(full: FourPort): Network {
  const differential = modeOf(full, 0);
  const common = modeOf(full, 1);
  return converts(full) ? { differential, common, full } : { differential, common };
}

/** The four-port of a network whose modes do not convert. */
export function fullOf(network: Network): FourPort {
  if (network.full) return network.full;
  const { differential } = network;
  const common = network.common ?? differential;
  const full: FourPort = new Float64Array(4 * differential.length);
  for (let from = 0, to = 0; from < differential.length; from += 8, to += 32) {
    putMode(differential, from, full, to);
    putMode(common, from, full, to + 10);
  }
  return full;
}

/** Diagonal block of one mode: 0 differential, 1 common. */
export function modeOf(full: FourPort, mode: 0 | 1): TwoPort {
  const out: TwoPort = new Float64Array(full.length / 4);
  for (let from = 10 * mode, to = 0; to < out.length; from += 32, to += 8) {
    for (let part = 0; part < 2; part++) {
      out[to + part] = full[from + part];
      out[to + 2 + part] = full[from + 4 + part];
      out[to + 4 + part] = full[from + 16 + part];
      out[to + 6 + part] = full[from + 20 + part];
    }
  }
  return out;
}

function putMode(mode: TwoPort, from: number, full: FourPort, to: number): void {
  for (let part = 0; part < 2; part++) {
    full[to + part] = mode[from + part];
    full[to + 4 + part] = mode[from + 2 + part];
    full[to + 16 + part] = mode[from + 4 + part];
    full[to + 20 + part] = mode[from + 6 + part];
  }
}

/** Positions, in a frequency's 32 numbers, of the entries that turn one mode into the other. */
const conversions = [2, 6, 8, 12, 18, 22, 24, 28] as const;

function converts(full: FourPort): boolean {
  for (let at = 0; at < full.length; at += 32) {
    for (const entry of conversions) {
      if (Math.abs(full[at + entry]) > conversionFloor || Math.abs(full[at + entry + 1]) > conversionFloor) return true;
    }
  }
  return false;
}
