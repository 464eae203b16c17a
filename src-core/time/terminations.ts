import type { Network } from '../networks/types';
import { convertingTransfer } from './converting-transfer';

/** One end of the path as one mode sees it: a resistance, and a capacitance across it. */
export interface Termination {
  readonly ohms: number;
  readonly farads: number;
}

/** Both ends of one mode, and the reference its scattering data have. */
export interface ModeEnds {
  readonly source: Termination;
  readonly load: Termination;
  readonly referenceOhms: number;
}

/**
 * Voltage at the receiver's pads for a source whose swing into a matched load is 1 V, at each frequency.
 *
 * With Γs, Γl the reflections of resistance and capacitance at both ends, H = t (1 - Γs) S21 (1 + Γl) / (1 - S11 Γs - S22 Γl + Γs Γl ΔS),
 * t = 1/(1 + jω R C) the divider of the source's own capacitance: an ideal through between equal resistances gives 1.
 * Where the modes convert (`network.full`), the common mode ends in its own terminations and comes back.
 * @returns re and im in turn
 * Source: Pozar, Microwave Engineering, two-port between source and load; IEEE 802.3 Annex 93A, form of H21. Check value S-11.
 */
export function transfer(
  network: Network,
  frequencies: Float64Array,
  differential: ModeEnds,
  common: ModeEnds,
): Float64Array {
  if (network.full) return convertingTransfer(network.full, frequencies, differential, common);
  const { source, load, referenceOhms: Z0 } = differential;
  const S = network.differential;
  const H = new Float64Array(2 * frequencies.length);
  for (let i = 0; i < frequencies.length; i++) {
    const w = 2 * Math.PI * frequencies[i];
    const o = 8 * i;
    const s11r = S[o + 0];
    const s11i = S[o + 1];
    const s12r = S[o + 2];
    const s12i = S[o + 3];
    const s21r = S[o + 4];
    const s21i = S[o + 5];
    const s22r = S[o + 6];
    const s22i = S[o + 7];
    // e = R - Z0 (1 + jωRC) over d = R + Z0 (1 + jωRC), kept apart: H = 4 Z0 Rl S21 / (ds dl - S11 es dl - S22 el ds + es el ΔS)
    const xs = Z0 * w * source.ohms * source.farads;
    const xl = Z0 * w * load.ohms * load.farads;
    const ds = source.ohms + Z0;
    const es = source.ohms - Z0;
    const dl = load.ohms + Z0;
    const el = load.ohms - Z0;
    const ddr = ds * dl - xs * xl;
    const ddi = ds * xl + dl * xs;
    const edr = es * dl + xs * xl;
    const edi = es * xl - dl * xs;
    const der = ds * el + xs * xl;
    const dei = el * xs - ds * xl;
    const eer = es * el - xs * xl;
    const eei = -es * xl - el * xs;
    const deltaR = s11r * s22r - s11i * s22i - s12r * s21r + s12i * s21i;
    const deltaI = s11r * s22i + s11i * s22r - s12r * s21i - s12i * s21r;
    const re = ddr - (s11r * edr - s11i * edi) - (s22r * der - s22i * dei) + (eer * deltaR - eei * deltaI);
    const im = ddi - (s11r * edi + s11i * edr) - (s22r * dei + s22i * der) + (eer * deltaI + eei * deltaR);
    const scale = (4 * Z0 * load.ohms) / (re * re + im * im);
    H[2 * i] = scale * (s21r * re + s21i * im);
    H[2 * i + 1] = scale * (s21i * re - s21r * im);
  }
  return H;
}
