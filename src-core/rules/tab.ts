import { reportedByStages } from './reported';
import type { Rule } from './types';

export const tab: Rule = {
  name: 'tab',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `YAML does not allow a tab in an indentation: editors show it as two, four or eight columns, and the reader would have to guess. The
fix writes spaces.`,
  bad: '# written at the end\nconditions:\n	temperature: 40 degC',
  good: '# written at the end\nconditions:\n  temperature: 40 degC',
  check: reportedByStages,
};
