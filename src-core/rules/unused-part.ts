import { joinPath } from '../inputs';
import type { ParsedFile } from '../text/parsed';
import type { Judged, Report, Rule } from './types';

/** What a file declares under names: each list of names, and the word for one. */
const DECLARED = [
  ['materials', 'material'],
  ['foils', 'foil'],
  ['stackups', 'stackup'],
  ['parts', 'part'],
] as const;

const record = (value: unknown): Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as Record<string, unknown>) : {};

/** Every text in a value. A name is used where it stands as a text: bare, or behind the prefix of a `use` entry. */
function collect(value: unknown, into: Set<string>): Set<string> {
  if (typeof value === 'string') into.add(value.slice(value.lastIndexOf('.') + 1)).add(value);
  else if (Array.isArray(value)) for (const one of value) collect(one, into);
  else if (typeof value === 'object' && value !== null) for (const one of Object.values(value)) collect(one, into);
  return into;
}

/** A name does not use itself, so the list that declares it counts only by its values. */
const textsOf = (files: Iterable<ParsedFile>) => {
  const texts = new Set<string>();
  for (const { value } of files) collect(value, texts);
  return texts;
};

const unused = (
  file: string,
  list: string,
  what: string,
  name: string,
  hint: string,
): Report & { subject: string } => ({
  at: { file, path: [list, name], on: 'key' },
  subject: name,
  message: `The ${what} \`${name}\` is not used${hint}.`,
  tags: ['unnecessary'],
});

/** In a parts file: what neither it nor any file that uses it names. Without knowledge of those files nothing can be said. */
function* unusedDeclarations({ inputs, parsed }: Judged, own: ParsedFile) {
  if (!inputs.dependents) return;
  const users = inputs.dependents.flatMap((file) => parsed.get(file) ?? []);
  const texts = textsOf([own, ...users]);
  for (const [list, what] of DECLARED) {
    for (const name of Object.keys(record(record(own.value)[list]))) {
      if (!texts.has(name)) yield unused(own.file, list, what, name, ' by any file at hand');
    }
  }
}

/** In any file: a `use` entry of which no name is taken, an owner whom no element names. */
function* unusedNames({ model, parsed }: Judged, own: ParsedFile) {
  const root = record(own.value);
  const texts = collect(
    Object.fromEntries(Object.entries(root).filter(([key]) => key !== 'use' && key !== 'owners')),
    new Set<string>(),
  );
  for (const [prefix, path] of Object.entries(record(root.use))) {
    const used = [...texts].some((text) => text.startsWith(`${prefix}.`)) || takesBareName(model, prefix, texts);
    if (!used && typeof path === 'string' && isRead(own.file, path, parsed))
      yield unused(own.file, 'use', 'parts file', prefix, '');
  }
  for (const name of Object.keys(record(root.owners)))
    if (!texts.has(name)) yield unused(own.file, 'owners', 'owner', name, ' by any element');
}

/** A file that is missing has its own finding. */
function isRead(from: string, path: string, parsed: Judged['parsed']): boolean {
  const { file } = joinPath(from, path);
  return file !== undefined && parsed.has(file);
}

/** Prefixes may be left out while a name is unambiguous. */
const takesBareName = ({ names }: Judged['model'], prefix: string, texts: ReadonlySet<string>) =>
  [names.parts, names.stackups, names.materials, names.foils]
    .flat()
    .some(
      ({ writtenAs }) =>
        writtenAs.some((text) => text.startsWith(`${prefix}.`)) && writtenAs.some((text) => texts.has(text)),
    );

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
