import type { SchemaName } from '../../schemas/format/types';
import { quoted as quote } from '../quantity/problem';

export { quote };

/** `a`, `a and b`, `a, b and c` */
export function listed(items: readonly string[], joint: 'and' | 'or' = 'and'): string {
  if (items.length < 2) return items.join('');
  return `${items.slice(0, -1).join(', ')} ${joint} ${items[items.length - 1]}`;
}

const withArticle = (noun: string): string => (/^[aeiou]/.test(noun) ? `an ${noun}` : `a ${noun}`);

/** Where a schema's name is not yet what a person calls it. */
const nouns = new Map<string, string>([
  ['parts', 'parts file'],
  ['config', 'configuration'],
  ['drill-rules', 'set of drill rules'],
  ['insertion-loss', 'limit of insertion loss'],
  ['return-loss', 'limit of return loss'],
  ['eye', 'limit of the eye'],
  ['copper', 'copper layer'],
  ['dielectric', 'dielectric layer'],
  ['mask', 'mask layer'],
]);

/** `a trace`, `a shared via`, `a limit of the eye` */
export function nounOf(name: SchemaName): string {
  if (name.startsWith('part-')) return `a shared ${name.slice('part-'.length)}`;
  return withArticle(nouns.get(name) ?? name);
}

/** What stands there, for "… is wanted; this is …". */
export function kindOfValue(value: unknown): string {
  if (value === null || value === undefined) return 'empty';
  if (Array.isArray(value)) return 'a list';
  if (typeof value === 'object') return 'a mapping';
  if (typeof value === 'number' && !Number.isFinite(value)) return 'no finite number';
  return quote(String(value));
}
