import type { Rule } from './types';

export const timeLimit: Rule = {
  name: 'time-limit',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `The time for one file was over before it was computed: what is shown is what was known by then. A path of hundreds of elements, or
Touchstone files of a hundred thousand points, take longest. Split the channel, or thin the files out.`,
  bad: '',
  good: '',
  *check({ model, timedOut }) {
    if (!timedOut) return;
    yield {
      at: { file: model.file, path: ['path'], on: 'key' },
      message: 'The time for one file was over: it is not computed to its end.',
    };
  },
};
