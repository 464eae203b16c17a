import { reportedByStages } from './reported';
import type { Rule } from './types';

export const quantity: Rule = {
  name: 'quantity',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A quantity that cannot be read: a number without its unit, a unit of another dimension, a decimal comma, a tolerance or a frequency
where none can stand. A number without a unit is never guessed: the fixes offer each unit that fits.`,
  bad: 'conditions: { temperature: 40 }',
  good: 'conditions: { temperature: 40 degC }',
  check: reportedByStages,
};
