import { reportedByStages } from './reported';
import type { Rule } from './types';

export const limit: Rule = {
  name: 'limit',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `The file is larger or deeper than what is read: 1 MiB of text, 64 levels of nesting, 1,000 nodes made by aliases, 500 elements; of a
Touchstone file 64 MiB, 100,000 points, 4 ports. The limits keep a broken or hostile text from stopping the editor. Beyond 200 findings the
rest is counted.`,
  bad: '# written at the end\nx-deep: [[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]',
  good: '# written at the end\nx-deep: [[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]',
  check: reportedByStages,
};
