import { type KeyInfo, keySchemaAt } from '../format/index';
import type { FileKind, ValuePath } from '../text/types';
import { code, page, plainText, type Row } from './markdown';

/** What a key means, whatever it holds: for completion and hover alike. */
export function keyRows(key: KeyInfo): readonly Row[] {
  const rows: Row[] = [];
  if (key.default !== undefined) rows.push(['Where it is not written', plainText(key.default)]);
  if (key.examples.length > 0) rows.push(['Example', key.examples.slice(0, 2).map(code).join(' or ')]);
  if (key.choices.length > 0) rows.push(['One of', key.choices.map(code).join(', ')]);
  return rows;
}

export function describeKeyAt(fileKind: string, path: ValuePath, kind?: string): string | undefined {
  const key = keySchemaAt(fileKind as FileKind, path, kind);
  return key && page(`**${plainText(key.key)}**: ${plainText(key.description)}`, keyRows(key));
}
