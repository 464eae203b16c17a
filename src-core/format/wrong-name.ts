import type { NodeSchema } from '../../schemas/format/types';
import type { ValuePath } from '../text/types';
import type { FormatProblem } from './problem';
import { quote } from './say';

/** Not names: what YAML 1.1 readers take for something else. */
const reservedWords = new Set(['true', 'false', 'null', 'yes', 'no', 'on', 'off']);

/** A corrected name is no longer than this. */
const LONGEST = 60;

/** What is wrong with a name of our own, and the nearest right one; undefined if it is right. */
export function nameProblem(name: string): { message: string; suggestion: string } | undefined {
  if (reservedWords.has(name)) {
    const suggestion = `${name}-1`;
    return {
      message: `${quote(name)} cannot be a name: YAML readers take it for a value. Write for example \`${suggestion}\`.`,
      suggestion,
    };
  }
  if (/^[a-z][a-z0-9-]*$/.test(name)) return undefined;
  const suggestion = correctedName(name);
  const message = `${quote(name)} cannot be a name: names are lower-case letters, digits and dashes, with a letter first, as \`${suggestion}\`.`;
  return { message, suggestion };
}

function correctedName(name: string): string {
  const letters = name
    .slice(0, LONGEST)
    .normalize('NFD')
    .replace(/[\u0300-\u036f]/g, '')
    .toLowerCase();
  const words = letters.split(/[^a-z0-9]/).filter((word) => word !== '');
  const plain = words.join('-').replace(/^[-0-9]+/, '');
  if (plain === '') return words.length > 0 ? `n${words.join('-')}` : 'name';
  return reservedWords.has(plain) ? `${plain}-1` : plain;
}

function correctedLayer(name: string): string {
  const words = name
    .slice(0, LONGEST)
    .split(/[^A-Za-z0-9_.-]/)
    .filter((word) => word !== '');
  return words.join('-').replace(/^[^A-Za-z0-9]+/, '') || 'L1';
}

/** A name that breaks its pattern, as key or value, with the corrected one as fix. */
export function wrongName(path: ValuePath, on: 'key' | 'value', name: string, node?: NodeSchema): FormatProblem {
  const isLayer = node?.['x-declares'] === 'layer' || node?.['x-refers'] === 'layer';
  const suggestion = isLayer ? correctedLayer(name) : (nameProblem(name)?.suggestion ?? 'name');
  const message = isLayer
    ? `${quote(name)} cannot be a layer’s name: letters, digits, \`_\`, \`.\` and \`-\`, with a letter or digit first, as \`${suggestion}\`.`
    : (nameProblem(name)?.message ?? `${quote(name)} cannot be a name.`);
  const edit =
    on === 'key'
      ? ({ op: 'key', path, name: suggestion } as const)
      : ({ op: 'value', path, text: suggestion } as const);
  return { rule: 'schema', path, on, message, fixes: [{ title: `Change to \`${suggestion}\``, edits: [edit] }] };
}
