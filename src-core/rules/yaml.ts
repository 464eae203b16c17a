import { reportedByStages } from './reported';
import type { Rule } from './types';

export const yaml: Rule = {
  name: 'yaml',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `The text is not YAML: an unclosed bracket or quote, a line that fits nowhere, an indentation that belongs to nothing. The entry
that it stands in is read as far as it makes sense; the others keep their figures. Half-typed text is the normal state of a file that is
being edited, so only the first fault of an entry is told.`,
  bad: '# written at the end\nconditions: { temperature: 40 degC',
  good: '# written at the end\nconditions: { temperature: 40 degC }',
  check: reportedByStages,
};
