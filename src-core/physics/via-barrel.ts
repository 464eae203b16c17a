import { coaxCapacitance, coaxInductance } from './coax';
import { EPSILON_0 } from './constants';
import { twinWireInductance } from './twin-wire';

/** Least ratio of antipad to hole and of pitch to hole for which the barrel's formulas say anything. */
export const LEAST_RATIO = 1.05;

/**
 * A plated barrel in a stack of planes, per metre and leg, in air: capacitance that of a coaxial line out to the antipad's edge;
 * inductance of a pair that of two round wires, of a single barrel the coaxial line's.
 * A pair's impedance is then the geometric mean of two bounds: twice the coaxial line's (planes without distance) and the pair's in
 * open dielectric (no planes). It rises with antipad and pitch, falls with the hole, and the wave on it is slower than in the
 * laminate, as planes load it. Common mode: the return stands at one pitch, where ground holes usually are (common practice), so that
 * both modes are alike. For antipads beyond twice the pitch the coaxial inductance is the larger and is taken.
 * @param pitchMeters centre to centre; absent for a single barrel
 * Source: Simonovich, Bogatin and Cao, Method of Modeling Differential Vias, 2011 (twin-rod inductance, coaxial capacitance).
 * A planning estimate: planes far apart raise the true impedance, close ground holes lower it, some 10 to 15 %.
 * Bounds: check values V-04 and V-06.
 */
export function barrelPerMeter(holeMeters: number, antipadMeters: number, pitchMeters?: number) {
  const outer = Math.max(antipadMeters, LEAST_RATIO * holeMeters);
  const coaxial = coaxInductance(holeMeters, outer);
  const pair =
    pitchMeters === undefined ? 0 : twinWireInductance(Math.max(pitchMeters, LEAST_RATIO * holeMeters), holeMeters);
  return { inductance: Math.max(coaxial, pair), capacitance: coaxCapacitance(holeMeters, outer, 1) };
}

/**
 * What a pad adds to the barrel's own capacitance: a coaxial line of the pad's diameter in its antipad, less the barrel's, over the
 * pad's thickness and, on each side, as far as its edge field reaches (half the clearance's width, or the next layer).
 * @param reachMeters thickness and reach together
 * @param dk of the laminate around it
 * Source: the narrow-clearance form of the same is Johnson and Graham's via capacitance, High-Speed Digital Design, 1993,
 * 1.41 ε T D1/(D2 − D1) pF in inches (check values V-01, V-03); how far the field reaches is our estimate.
 */
export function padCapacitance(
  padMeters: number,
  holeMeters: number,
  antipadMeters: number,
  reachMeters: number,
  dk: number,
): number {
  const outer = Math.max(antipadMeters, LEAST_RATIO * Math.max(padMeters, holeMeters));
  if (padMeters <= holeMeters) return 0;
  const excess = 1 / Math.log(outer / padMeters) - 1 / Math.log(outer / holeMeters);
  return 2 * Math.PI * EPSILON_0 * dk * reachMeters * excess;
}

/** Johnson and Graham's capacitance of a via through a board, farads; lengths in metres. As published: see {@link padCapacitance}. */
export function johnsonCapacitance(
  dk: number,
  boardMeters: number,
  padMeters: number,
  clearanceMeters: number,
): number {
  const inches = (meters: number) => meters / 0.0254;
  return (1.41e-12 * dk * inches(boardMeters) * inches(padMeters)) / (inches(clearanceMeters) - inches(padMeters));
}
