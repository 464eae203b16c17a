import { reportedByStages } from './reported';
import type { Rule } from './types';

export const duplicateKey: Rule = {
  name: 'duplicate-key',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `The same key twice in one mapping: YAML readers silently keep one of the two, and not all the same one. Both places are shown. Remove
the one that is not meant.`,
  bad: '# written at the end\ntitle: another',
  good: '# written at the end\nconditions: { temperature: 40 degC }',
  check: reportedByStages,
};
