import { joinPath } from '../inputs';
import { quoted } from '../model/reports';
import type { Report } from '../report';
import type { ParsedFile } from '../text/parsed';
import type { Judged, Rule } from './types';

/** What a file declares under names: each list of names, and the key under which one is used. */
const DECLARED = [
  ['materials', 'material'],
  ['foils', 'foil'],
  ['stackups', 'stackup'],
  ['parts', 'part'],
] as const;
const ROLES: ReadonlySet<string> = new Set([...DECLARED.map(([, role]) => role), 'owner']);

const record = (value: unknown): Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as Record<string, unknown>) : {};

/** Names as they are used, by the key that takes them: `material main.core`, and `material core` without its prefix. */
function collect(value: unknown, into: Set<string>): Set<string> {
  for (const name of namesUsedIn(value)) into.add(name);
  return into;
}

/** By the value, which stays the same object while its text does. */
const known = new WeakMap<object, readonly string[]>();

function namesUsedIn(value: unknown): readonly string[] {
  if (typeof value !== 'object' || value === null) return [];
  const before = known.get(value);
  if (before) return before;
  const names: string[] = [];
  for (const [key, one] of Object.entries(value)) {
    if (typeof one !== 'string') for (const name of namesUsedIn(one)) names.push(name);
    else if (ROLES.has(key)) names.push(`${key} ${one}`, `${key} ${one.slice(one.lastIndexOf('.') + 1)}`);
  }
  known.set(value, names);
  return names;
}

const unused = (
  file: string,
  list: string,
  what: string,
  name: string,
  hint: string,
): Report & { subject: string } => ({
  at: { file, path: [list, name], on: 'key' },
  subject: name,
  message: `The ${what} ${quoted(name)} is not used${hint}.`,
  tags: ['unnecessary'],
});

/** In a parts file: what neither it nor any file that uses it names. Without knowledge of those files nothing can be said. */
function* unusedDeclarations({ inputs, parsed }: Judged, own: ParsedFile) {
  if (!inputs.dependents) return;
  const used = new Set<string>();
  for (const file of [own.file, ...inputs.dependents]) collect(parsed.get(file)?.value, used);
  for (const [list, role] of DECLARED) {
    for (const name of Object.keys(record(record(own.value)[list]))) {
      if (!used.has(`${role} ${name}`)) yield unused(own.file, list, role, name, ' by any file at hand');
    }
  }
}

/** In any file: a `use` entry of which no name is taken, an owner whom no element names. */
function* unusedNames({ model, parsed }: Judged, own: ParsedFile) {
  const root = record(own.value);
  const used = collect(root, new Set<string>());
  for (const [prefix, path] of Object.entries(record(root.use))) {
    if (typeof path !== 'string' || !isRead(own.file, path, parsed) || takesName(model, prefix, used)) continue;
    yield unused(own.file, 'use', 'parts file', prefix, '');
  }
  for (const name of Object.keys(record(root.owners))) {
    if (!used.has(`owner ${name}`)) yield unused(own.file, 'owners', 'owner', name, ' by any element');
  }
}

/** A file that is missing has its own finding. */
function isRead(from: string, path: string, parsed: Judged['parsed']): boolean {
  const { file } = joinPath(from, path);
  return file !== undefined && parsed.has(file);
}

/** With its prefix, or without where the name is unambiguous. */
function takesName({ names }: Judged['model'], prefix: string, used: ReadonlySet<string>): boolean {
  const begins = `${prefix}.`;
  return DECLARED.some(
    ([list, role]) =>
      [...used].some((use) => use.startsWith(`${role} ${begins}`)) ||
      names[list].some(
        ({ writtenAs }) =>
          writtenAs.some((text) => text.startsWith(begins)) && writtenAs.some((text) => used.has(`${role} ${text}`)),
      ),
  );
}

export const unusedPart: Rule = {
  name: 'unused-part',
  severity: 'hint',
  reads: 'model',
  options: {},
  doc: `Something is declared and nobody uses it: a \`use\` entry, an owner; in a parts file, a material, foil, stackup or part that neither
it nor any channel or parts file at hand names. It does no harm, but it will be read and kept up for nothing. A library of parts that is
meant for others turns this rule off.`,
  bad: 'owners: { nobody: 3 dB @ nyquist }',
  good: 'owners: { me: 9 dB @ nyquist }\npath: [{ capacitor: coupling, value: 100 nF, owner: me }]',
  *check(judged) {
    const own = judged.parsed.get(judged.inputs.file);
    if (!own) return;
    yield* unusedNames(judged, own);
    if (own.kind === 'parts') yield* unusedDeclarations(judged, own);
  },
};
