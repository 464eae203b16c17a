import type { FormatProblem } from './problem';

/** What one conductor has not. */
const pairKeys = ['gap', 'pitch', 'skew', 'common-impedance'];

/** The keys of a mapping (an element, a termination) that have no meaning in a single-ended channel. */
export function pairKeyProblems(raw: object): FormatProblem[] {
  return pairKeys
    .filter((key) => Object.hasOwn(raw, key))
    .map((key) => ({
      rule: 'schema',
      path: [key],
      on: 'key',
      message: `\`${key}\` belongs to a pair; this channel is single-ended.`,
      fixes: [{ title: `Remove \`${key}\``, edits: [{ op: 'remove', path: [key] }] }],
    }));
}
