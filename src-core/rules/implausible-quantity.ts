import { reportedByStages } from './reported';
import type { Rule } from './types';

export const implausibleQuantity: Rule = {
  name: 'implausible-quantity',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `A value that is possible and hardly meant: 42 m of trace, a dielectric constant of 15, a drill of 4 mm. Mostly a slip of the unit's prefix or
case. The bounds are wide and stand in the format's reference.`,
  bad: 'conditions: { temperature: 200 degC }',
  good: 'conditions: { temperature: 60 degC }',
  check: reportedByStages,
};
