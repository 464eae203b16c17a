import { MU_0 } from './constants';

/**
 * Inductance of each of two round wires with opposite currents, H/m: half the loop's, μ0/2π acosh(s/d). Exact.
 * Check values T-12, V-06; by its image, T-13.
 */
export function twinWireInductance(spacingMeters: number, diameterMeters: number): number {
  return (MU_0 / (2 * Math.PI)) * Math.acosh(spacingMeters / diameterMeters);
}
