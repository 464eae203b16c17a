import { EPSILON_0, MU_0 } from './constants';

/** External inductance of a coaxial line, H/m: μ0/2π ln(outer/inner). Exact. Diameters in metres. Check values T-09 to T-11, V-04. */
export function coaxInductance(innerMeters: number, outerMeters: number): number {
  return (MU_0 / (2 * Math.PI)) * Math.log(outerMeters / innerMeters);
}

/** Capacitance of a coaxial line, F/m: 2π ε0 ε/ln(outer/inner). Exact. Diameters in metres. Check values T-09 to T-11, V-04. */
export function coaxCapacitance(innerMeters: number, outerMeters: number, dk: number): number {
  return (2 * Math.PI * EPSILON_0 * dk) / Math.log(outerMeters / innerMeters);
}
