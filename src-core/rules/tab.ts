import { reportedByStages } from './reported';
import type { Rule } from './types';

export const tab: Rule = {
  name: 'tab',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `YAML does not allow a tab in an indentation: editors show it as two, four or eight columns, and the reader would have to guess. The
fix writes spaces.`,
  bad: '# written at the end\nlimits:\n  - eye: other\n\theight: 40 mV',
  good: '# written at the end\nlimits:\n  - eye: main\n    height: 40 mV',
  check: reportedByStages,
};
