import type { Analysis } from '../analysis';
import { asList, isMapping } from '../raw';
import { rangeOf } from '../text/index';
import type { ParsedFile } from '../text/parsed';
import type { TextRange, ValuePath } from '../text/types';

export type OutlineKind = 'section' | 'element' | 'limit' | 'waiver' | 'name' | 'layer' | 'key' | 'rule';

export interface OutlineItem {
  readonly name: string;
  readonly detail: string;
  readonly kind: OutlineKind;
  readonly range: TextRange;
  /** Inside `range`. */
  readonly selection: TextRange;
  readonly children: readonly OutlineItem[];
}

const KINDS_OF_SECTIONS: Readonly<Record<string, OutlineKind>> = {
  path: 'element',
  limits: 'limit',
  waivers: 'waiver',
  rules: 'rule',
};

/** The file as a tree, two or three levels; details are figures where there are some, else what is written. */
export function outlineOf(parsed: ParsedFile, analysis?: Analysis): readonly OutlineItem[] {
  if (!isMapping(parsed.value)) return [];
  const own = analysis?.model.file === parsed.file ? analysis : undefined;
  return Object.entries(parsed.value).map(([key, value]) => {
    const item = (
      path: ValuePath,
      name: string,
      kind: OutlineKind,
      detail: string,
      children: readonly OutlineItem[] = [],
    ) => itemOf(parsed, path, name, kind, detail, children);
    if (key === 'path')
      return item(
        [key],
        key,
        'section',
        own?.verdict.text ?? '',
        asList(value).map((entry, index) => elementItem(parsed, entry, index, own)),
      );
    if (key === 'limits')
      return item(
        [key],
        key,
        'section',
        '',
        asList(value).map((entry, index) => limitItem(parsed, entry, index, own)),
      );
    if (key === 'waivers')
      return item(
        [key],
        key,
        'section',
        '',
        asList(value).map((entry, index) => waiverItem(parsed, entry, index)),
      );
    if (key === 'stackups' && isMapping(value)) {
      return item(
        [key],
        key,
        'section',
        '',
        Object.entries(value).map(([name, rows]) =>
          item(
            [key, name],
            name,
            'name',
            `${asList(rows).length} rows`,
            asList(rows).map((row, index) => rowItem(parsed, name, row, index)),
          ),
        ),
      );
    }
    const children = isMapping(value)
      ? Object.entries(value).map(([name, one]) =>
          item([key, name], name, KINDS_OF_SECTIONS[key] ?? 'name', detailOf(one)),
        )
      : [];
    return item([key], key, isMapping(value) ? 'section' : 'key', isMapping(value) ? '' : detailOf(value), children);
  });
}

/** The entry on whose lines an offset stands, its dash and indentation included: the element's name as the model has it. */
export function elementAt(analysis: Analysis, offset: number): string | undefined {
  const parsed = analysis.parsed.get(analysis.model.file);
  if (!parsed) return undefined;
  return analysis.model.elements.find(({ place }) => {
    const { start, end } = rangeOf(parsed, { ...place, on: 'entry' });
    const lineStart = parsed.text.lastIndexOf('\n', start - 1) + 1;
    const isFirst = /^[\s-]*$/.test(parsed.text.slice(lineStart, start));
    return (isFirst ? lineStart : start) <= offset && offset <= end;
  })?.name;
}

function itemOf(
  parsed: ParsedFile,
  path: ValuePath,
  name: string,
  kind: OutlineKind,
  detail: string,
  children: readonly OutlineItem[],
): OutlineItem {
  const isEntry = typeof path.at(-1) === 'number';
  const range = rangeOf(parsed, { file: parsed.file, path, on: 'entry' });
  const selection = rangeOf(parsed, { file: parsed.file, path, on: isEntry ? 'value' : 'key' });
  const inside = selection.start >= range.start && selection.end <= range.end;
  return { name: name === '' ? '…' : name, detail, kind, range, selection: inside ? selection : range, children };
}

function elementItem(parsed: ParsedFile, entry: unknown, index: number, analysis: Analysis | undefined): OutlineItem {
  const [kind, written] = isMapping(entry) ? (Object.entries(entry)[0] ?? ['entry', '']) : ['entry', entry];
  const row = analysis?.ledger?.rows.find((one) => one.index === index);
  const figures =
    row?.figures.filter(({ name }) => name === 'own-loss-at-nyquist' || name === 'impedance').map(({ text }) => text) ??
    [];
  return itemOf(
    parsed,
    ['path', index],
    nameOf(written, `${kind} ${index + 1}`),
    'element',
    [kind, ...figures].join(' · '),
    [],
  );
}

function limitItem(parsed: ParsedFile, entry: unknown, index: number, analysis: Analysis | undefined): OutlineItem {
  const [kind, written] = isMapping(entry) ? (Object.entries(entry)[0] ?? ['limit', '']) : ['limit', entry];
  const name = nameOf(written, `limit ${index + 1}`);
  const outcome = analysis?.limits.find((one) => one.name === name);
  return itemOf(parsed, ['limits', index], name, 'limit', outcome ? `${kind} · ${outcome.text}` : kind, []);
}

function waiverItem(parsed: ParsedFile, entry: unknown, index: number): OutlineItem {
  const { rule, at, until } = isMapping(entry) ? entry : {};
  return itemOf(
    parsed,
    ['waivers', index],
    nameOf(rule, `waiver ${index + 1}`),
    'waiver',
    [at, until].filter((one) => typeof one === 'string').join(' until '),
    [],
  );
}

function rowItem(parsed: ParsedFile, stackup: string, row: unknown, index: number): OutlineItem {
  const [kind, written] = isMapping(row) ? (Object.entries(row)[0] ?? ['row', '']) : ['row', row];
  const thickness = isMapping(row) && typeof row.thickness === 'string' ? ` · ${row.thickness}` : '';
  return itemOf(
    parsed,
    ['stackups', stackup, index],
    nameOf(written, `row ${index + 1}`),
    'layer',
    `${kind}${thickness}`,
    [],
  );
}

const nameOf = (written: unknown, otherwise: string) =>
  typeof written === 'string' && written !== '' ? written : otherwise;

/** What is written, on one line and short. */
function detailOf(value: unknown): string {
  if (typeof value === 'string' || typeof value === 'number' || typeof value === 'boolean')
    return String(value).slice(0, 60);
  if (isMapping(value) && typeof value.kind === 'string') return value.kind;
  return '';
}
