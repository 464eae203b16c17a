import { EPSILON_0, ETA_0, MU_0 } from './constants';

/** Impedance of a coaxial line, ohm: η0/(2π√ε) ln(outer/inner). Exact. Check values T-09 to T-11, V-04. */
export function coaxImpedance(innerMeters: number, outerMeters: number, dk: number): number {
  return (ETA_0 / (2 * Math.PI * Math.sqrt(dk))) * Math.log(outerMeters / innerMeters);
}

/** External inductance of a coaxial line, H/m. Exact. Diameters in metres. */
export function coaxInductance(innerMeters: number, outerMeters: number): number {
  return (MU_0 / (2 * Math.PI)) * Math.log(outerMeters / innerMeters);
}

/** Capacitance of a coaxial line, F/m. Exact. Diameters in metres. */
export function coaxCapacitance(innerMeters: number, outerMeters: number, dk: number): number {
  return (2 * Math.PI * EPSILON_0 * dk) / Math.log(outerMeters / innerMeters);
}
