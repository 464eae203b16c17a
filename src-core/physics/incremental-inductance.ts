import { MU_0 } from './constants';

/**
 * How much surface impedance a conductor's walls bring into the line, per metre of line: (1/μ0) dL/dn, where n is the
 * depth by which those walls recede. Times the surface impedance (ohm per square) it is the series impedance per metre.
 * @param inductance H/m of the line whose walls receded by n metres; smooth near 0
 * @param step n, small against every dimension
 * Source: Wheeler, Proc. IRE 30, 1942, 412-424. Holds where the skin depth is small against thickness and curvature.
 * Check values T-22, T-23.
 */
export function wallFactor(inductance: (recession: number) => number, step: number): number {
  return (inductance(step) - inductance(-step)) / (2 * step * MU_0);
}
