import { reportedByStages } from './reported';
import type { Rule } from './types';

export const implausibleQuantity: Rule = {
  name: 'implausible-quantity',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `A value that is possible and hardly meant: 42 m of trace, a dielectric constant of 15, a drill of 4 mm. Mostly a slip of the unit's prefix or
case. The bounds are wide and stand in the format's reference.`,
  bad: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100 mm, impedance: 100 ohm, skew: 200 ps }]',
  good: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100 mm, impedance: 100 ohm, skew: 2 ps }]',
  check: reportedByStages,
};
