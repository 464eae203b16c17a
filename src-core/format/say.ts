export { quoted as quote } from '../quantity/problem';

import { quoted as quote } from '../quantity/problem';

/** `a`, `a and b`, `a, b and c` */
export function listed(items: readonly string[], joint: 'and' | 'or' = 'and'): string {
  if (items.length < 2) return items.join('');
  return `${items.slice(0, -1).join(', ')} ${joint} ${items[items.length - 1]}`;
}

export const withArticle = (noun: string): string => (/^[aeiou]/i.test(noun) ? `an ${noun}` : `a ${noun}`);

/** What kind of value stands there, for "… is wanted, this is …". */
export function kindOfValue(value: unknown): string {
  if (value === null || value === undefined) return 'nothing';
  if (Array.isArray(value)) return 'a list';
  if (typeof value === 'object') return 'a mapping';
  if (typeof value === 'boolean') return `\`${value}\``;
  return quote(String(value));
}

export const isMapping = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
