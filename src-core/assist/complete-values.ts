import type { NameRole } from '../../schemas/format/types';
import { entryLists } from '../../schemas/generated/format';
import type { Analysis } from '../analysis';
import { freeName, type KeyInfo, keySchemaAt } from '../format/index';
import type { Model } from '../model/types';
import { exactly, show } from '../quantity/show';
import { unitsOf } from '../quantity/units';
import { isMapping } from '../raw';
import { rules } from '../rules/list';
import type { ParsedFile } from '../text/parsed';
import type { Completion, Surroundings } from './completions';
import type { Cursor } from './cursor';
import { likelyLayer, stackupAt } from './likely';
import { kindOfEntry } from './subject';
import { unusedNames } from './unused-names';

/** Names, choices, units and examples for the value under the cursor. */
export async function completeValues(
  parsed: ParsedFile,
  analysis: Analysis | undefined,
  cursor: Cursor,
  around: Surroundings,
): Promise<readonly Completion[]> {
  const kind = kindOfEntry(cursor.levels) ?? kindBeingNamed(cursor);
  const inList = typeof cursor.path.at(-1) === 'number';
  const path = inList ? cursor.path.slice(0, -1) : cursor.path;
  const key = keySchemaAt(parsed.kind, path, kind);
  const name = String(path.at(-1) ?? '');
  if (path[0] === 'parts' && path.length === 3 && name === 'kind')
    return entryLists.parts.kinds.map((one, rank) => plain(cursor, one, 'value', rank));
  if (parsed.kind === 'config' && path[0] === 'rules')
    return ['error', 'warning', 'info', 'hint', 'off'].map((one, rank) => plain(cursor, one, 'value', rank));
  if (path[0] === 'waivers' && name === 'at') return subjects(analysis, cursor);
  if (!key) return [];
  if (key.refers) return referable(parsed, analysis, cursor, key.refers, name, around, kind);
  if (key.declares === 'element' || key.declares === 'limit')
    return [plain(cursor, nameFor(analysis, name), 'name', 0)];
  if (key.quantity) return quantities(cursor, key, analysis);
  return key.choices.map((one, rank) => plain(cursor, one, 'value', rank, one === key.default ? 'default' : undefined));
}

const plain = (cursor: Cursor, text: string, kind: Completion['kind'], rank: number, detail?: string): Completion => ({
  label: text,
  kind,
  ...(detail && { detail }),
  insert: text,
  isSnippet: false,
  range: cursor.token,
  filter: text,
  rank,
});

/** `- trace: ‸` is the pair that names the kind itself. */
const kindBeingNamed = ({ path }: Cursor) => (typeof path.at(-2) === 'number' ? String(path.at(-1)) : undefined);

function nameFor(analysis: Analysis | undefined, kind: string): string {
  const { elements = [], limits = [] } = analysis?.model ?? {};
  return freeName(kind, new Set([...elements, ...limits].map(({ name }) => name)));
}

function subjects(analysis: Analysis | undefined, cursor: Cursor): Completion[] {
  const rule = cursor.levels.at(-1)?.keys.get('rule');
  const found = (analysis?.findings ?? [])
    .filter((finding) => finding.rule === rule)
    .flatMap(({ subject }) => (subject === undefined ? [] : [subject]));
  const names = [
    ...new Set([
      ...found,
      ...(analysis?.model.limits ?? []).map(({ name }) => name),
      ...(analysis?.model.elements ?? []).map(({ name }) => name),
    ]),
  ];
  return names.map((name, rank) => ({
    ...plain(cursor, name, 'name', rank, found.includes(name) ? 'has this finding' : undefined),
    ...(rank === 0 && found.length > 0 && { preselect: true }),
  }));
}

/** What a file may hold besides its element: on each side what stands next, beyond what it holds already. */
function neighbours(elements: Model['elements'], cursor: Cursor): Completion[] {
  const [list, index, , item] = cursor.path;
  const own = list === 'path' && typeof index === 'number' ? elements[index] : undefined;
  if (!own) return [];
  const { includes } = own.values as { includes?: unknown };
  const held = Array.isArray(includes) ? includes.filter((_, i) => i !== item) : [];
  const beyond = (step: -1 | 1) => {
    let at = own.index + step;
    while (elements[at] && held.includes(elements[at].name)) at += step;
    return elements[at];
  };
  return [beyond(-1), beyond(1)].flatMap((one, rank) => (one ? [plain(cursor, one.name, 'name', rank, one.kind)] : []));
}

async function referable(
  parsed: ParsedFile,
  analysis: Analysis | undefined,
  cursor: Cursor,
  role: NameRole,
  key: string,
  around: Surroundings,
  kind: string | undefined,
): Promise<readonly Completion[]> {
  const model = analysis?.model;
  switch (role) {
    case 'element':
      if (key === 'includes' && model) return neighbours(model.elements, cursor);
      return (model?.elements ?? [])
        .filter(({ index }) => index !== cursor.path[1] || cursor.path[0] !== 'path')
        .map((element, rank) => plain(cursor, element.name, 'name', rank, element.kind));
    case 'layer':
      return analysis ? layers(analysis, cursor, key) : [];
    case 'part': {
      const names = (model?.names.parts ?? []).filter((part) => !kind || !part.kind || part.kind === kind);
      return [
        ...names.flatMap((part) => writings(cursor, part.writtenAs, part.kind)),
        ...(await unusedNames(parsed, cursor, 'part', around, kind)),
      ];
    }
    case 'stackup':
      return [
        ...(model?.names.stackups ?? []).flatMap(({ writtenAs, stackup }) =>
          writings(
            cursor,
            writtenAs,
            stackup &&
              show.count(
                stackup.layers.filter(({ type }) => type === 'copper'),
                'copper layer',
              ),
          ),
        ),
        ...(await unusedNames(parsed, cursor, 'stackup', around, kind)),
      ];
    case 'material':
      return namesIn(
        parsed,
        'materials',
        cursor,
        model?.names.materials.map(({ writtenAs }) => writtenAs),
      );
    case 'foil':
      return namesIn(
        parsed,
        'foils',
        cursor,
        model?.names.foils.map(({ writtenAs }) => writtenAs),
      );
    case 'owner':
      return ownersOf(parsed, analysis).map((owner, rank) => plain(cursor, owner, 'name', rank));
    case 'rule':
      return rules.map((rule, rank) => plain(cursor, rule.name, 'name', rank, rule.severity));
    default:
      return [];
  }
}

/** The shortest way to write a name first, the one with its prefix below. */
const writings = (cursor: Cursor, writtenAs: readonly string[], detail: string | undefined): Completion[] =>
  writtenAs.map((text) => plain(cursor, text, 'name', text.includes('.') ? 0 : 10, detail));

function namesIn(
  parsed: ParsedFile,
  section: string,
  cursor: Cursor,
  known: readonly (readonly string[])[] | undefined,
): Completion[] {
  const value = isMapping(parsed.value) ? parsed.value[section] : undefined;
  const own = isMapping(value) ? Object.keys(value) : [];
  return [...new Set([...own, ...(known ?? []).flat()])].map((name, rank) => plain(cursor, name, 'name', rank));
}

function ownersOf(parsed: ParsedFile, analysis: Analysis | undefined): string[] {
  const value = isMapping(parsed.value) ? parsed.value.owners : undefined;
  return [
    ...new Set([
      ...(isMapping(value) ? Object.keys(value) : []),
      ...(analysis?.model.elements ?? []).flatMap(({ owner }) => (owner === undefined ? [] : [owner])),
    ]),
  ];
}

/** Copper layers of the stackup, top to bottom; the likely one is marked, planes come last. */
function layers(analysis: Analysis, cursor: Cursor, key: string): Completion[] {
  const stackup = stackupAt(analysis, cursor);
  if (!stackup) return [];
  const likely = likelyLayer(analysis, cursor, stackup, key);
  return stackup.layers
    .filter((layer) => layer.type === 'copper')
    .map((layer, index) => ({
      ...plain(
        cursor,
        layer.name,
        'name',
        (layer.plane ? 100 : 0) + index + (layer.name === likely ? -50 : 0),
        layer.plane ? 'plane' : show.length(layer.thicknessMeters),
      ),
      ...(layer.name === likely && { preselect: true }),
    }));
}

const NUMBER = /^([-+]?(?:\d+\.?\d*|\.\d+)(?:e[-+]?\d+)?)\s*([A-Za-zµμΩ/]*)$/;
const AT = /^(.*\S)\s*@\s*(?:([-+]?(?:\d+\.?\d*|\.\d+)(?:e[-+]?\d+)?)\s*)?([A-Za-z]*)$/;

/** Behind a number its units; behind `@` frequencies; where nothing is typed yet, examples. */
function quantities(
  cursor: Cursor,
  { quantity, examples, default: byDefault }: KeyInfo,
  analysis: Analysis | undefined,
): Completion[] {
  const typed = cursor.typed;
  const dimensions = quantity?.dimensions ?? [];
  const units = dimensions.flatMap((dimension) => unitsOf(dimension));
  const upToCursor = { start: cursor.token.start, end: cursor.token.start + typed.length };
  const at = AT.exec(typed);
  if (at && quantity?.at && quantity.at !== 'never') {
    const figure = analysis?.model.computable ? [exactly(analysis.model.nyquistFrequency, 'frequency')] : [];
    const nyquist = at[2] !== undefined ? [] : quantity.at === 'nyquist' ? ['nyquist'] : figure;
    const frequencies = at[2] === undefined ? [] : unitsOf('frequency').map(({ text }) => `${at[2]} ${text}`);
    return [...nyquist, ...frequencies].map((one, rank) => ({
      ...plain(cursor, `@ ${one}`, 'unit', rank),
      insert: `${at[1]} @ ${one}`,
      filter: `${at[1]} @ ${one}`,
      range: upToCursor,
    }));
  }
  const number = NUMBER.exec(typed);
  if (number) {
    const space = /\s/.test(typed.slice(number[1].length, number[1].length + 1)) || number[2] === '' ? ' ' : '';
    const common = commonUnits(examples);
    return units.map(({ text }, index) => ({
      ...plain(cursor, `${number[1]} ${text}`, 'unit', common.includes(text) ? index : index + 50),
      insert: `${number[1]} ${text}`,
      filter: typed.endsWith(' ') || number[2] !== '' ? `${number[1]}${space}${text}` : `${number[1]} ${text}`,
      range: upToCursor,
      ...(text === common[0] && { preselect: true }),
    }));
  }
  if (typed !== '') return [];
  return [...examples, ...(byDefault !== undefined && /^\d/.test(byDefault) ? [byDefault] : [])].map((one, rank) =>
    plain(cursor, one, 'value', rank, one === byDefault ? 'default' : 'example'),
  );
}

/** The units that the examples use: the likely ones. */
const commonUnits = (examples: readonly string[]): string[] =>
  examples.flatMap((one) => /^\[?[-+\d.e]+\s*([A-Za-z/]+)/.exec(one)?.[1] ?? []);
