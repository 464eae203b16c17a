import { ETA_0, MU_0 } from './constants';

/** Differential impedance of two round wires, ohm: η0/(π√ε) acosh(s/d). Exact. Check values T-12, V-06. */
export function twinWireImpedance(spacingMeters: number, diameterMeters: number, dk: number): number {
  return (ETA_0 / (Math.PI * Math.sqrt(dk))) * Math.acosh(spacingMeters / diameterMeters);
}

/** Inductance of each of two wires with opposite currents, H/m: half the loop's. Exact. */
export function twinWireInductance(spacingMeters: number, diameterMeters: number): number {
  return (MU_0 / (2 * Math.PI)) * Math.acosh(spacingMeters / diameterMeters);
}

/** Impedance of a round wire over a plane, ohm: η0/(2π√ε) acosh(h/a), h to its centre. Exact. Check value T-13. */
export function wireOverPlane(heightMeters: number, radiusMeters: number, dk: number): number {
  return (ETA_0 / (2 * Math.PI * Math.sqrt(dk))) * Math.acosh(heightMeters / radiusMeters);
}
