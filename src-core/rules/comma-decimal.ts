import { reportedByStages } from './reported';
import type { Rule } from './types';

export const commaDecimal: Rule = {
  name: 'comma-decimal',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A decimal comma: \`3,37\` is no number here, and in a flow mapping the comma even ends the entry, so that two halves are left. One
finding stands in place of those of both halves; the fix writes a point.`,
  bad: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100,5 mm, impedance: 100 ohm }]',
  good: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100.5 mm, impedance: 100 ohm }]',
  check: reportedByStages,
};
