import type { ElementKindName, Quantity } from '../../schemas/format/types';
import {
  entryKind,
  freeName,
  keysOf,
  kindProblems,
  missingKeyProblems,
  missingKeys,
  readValues,
} from '../format/index';
import { nearest } from '../quantity/nearest';
import { show } from '../quantity/show';
import { isMapping, mappingAt, type RawMapping } from '../raw';
import { writtenKeys } from '../text/first';
import type { Place } from '../text/types';
import { type Draft, headOf } from './draft';
import { lookUp, namesAtHand } from './names';
import { formatReports, type ModelReport, nameFixes, placeIn, quoted } from './reports';
import type { Sources } from './sources';
import type { Shelves } from './stackups';
import { touchstoneFile } from './touchstone';

export const KINDS: readonly ElementKindName[] = [
  'package',
  'trace',
  'cable',
  'via',
  'connector',
  'capacitor',
  'stub',
  'block',
];
const OF_A_PAIR = ['gap', 'pitch', 'skew', 'common-impedance'] as const;

export interface ElementContext {
  readonly sources: Sources;
  readonly shelves: Shelves;
  readonly reports: ModelReport[];
  readonly singleEnded: boolean;
  /** Parts that an element names, as `file\nname`. */
  readonly usedParts: Set<string>;
  readonly nyquistHz?: number;
}

/** Reads one entry of `path`: its kind, its part, its names. What is wrong is reported once; the entry is kept whatever it holds. */
export function readElement(context: ElementContext, entry: unknown, index: number): Draft {
  const { sources, reports } = context;
  const { file } = sources.own;
  const raw = isMapping(entry) ? entry : {};
  const chosen = entryKind('elements', entry);
  const kind = (chosen.kind as ElementKindName | undefined) ?? likelyKind(entry);
  const { place, places } = placesIn(file, raw, kind, index);
  const { path } = place;
  const draft: Draft = {
    kind,
    name: nameOf(raw[kind], kind, index),
    index,
    place,
    values: Object.create(null),
    // Of its own: keys of a part are added.
    places: Object.assign(Object.create(null), places),
    derived: {},
    incomplete: false,
    unknownKind: chosen.problem !== undefined,
    partUnread: false,
    raw,
    sourceOf: () => file,
  };
  if (chosen.problem) {
    reports.push(...formatReports([chosen.problem], file, path, draft.name));
    draft.incomplete = true;
    draft.values = readValues(kind, raw, context).values as Record<string, unknown>;
    return draft;
  }
  const { values, problems } = readValues(kind, raw, context);
  const late = kindProblems('elements', kind, writtenKeys(sources.own.parsed, path));
  reports.push(...formatReports([...late, ...problems], file, path, draft.name));
  draft.values = values as Record<string, unknown>;
  mergePart(context, draft);
  if (context.singleEnded) refusePairKeys(context, draft);
  resolveStackup(context, draft);
  resolveFile(context, draft);
  addDefaults(draft);
  return draft;
}

interface Places {
  readonly file: string;
  readonly kind: ElementKindName;
  readonly index: number;
  readonly place: Place;
  readonly places: Readonly<Record<string, Place>>;
}

/** By the entry's value, which stays the same object while its text does. */
const knownPlaces = new WeakMap<RawMapping, Places>();

/** Where the element and each of its keys stand; one that is not written stands where the element does. */
function placesIn(file: string, raw: RawMapping, kind: ElementKindName, index: number): Places {
  const known = knownPlaces.get(raw);
  if (known && known.file === file && known.kind === kind && known.index === index) return known;
  const place = placeIn(file, ['path', index]);
  const places: Record<string, Place> = Object.create(null);
  for (const { key } of keysOf(kind)) places[key] = place;
  for (const key of Object.keys(raw)) places[key] = { file, path: [...place.path, key] };
  const made = { file, kind, index, place, places };
  knownPlaces.set(raw, made);
  return made;
}

/** What an entry without a readable kind was probably meant to be; something without layers where nothing tells. */
function likelyKind(entry: unknown): ElementKindName {
  const words = isMapping(entry) ? Object.keys(entry) : typeof entry === 'string' ? [entry.trim()] : [];
  for (const word of words) if ((KINDS as readonly string[]).includes(word)) return word as ElementKindName;
  for (const word of words.slice(0, 20)) {
    const near = nearest(word, KINDS) ?? KINDS.find((kind) => word.length > 0 && kind.startsWith(word));
    if (near) return near as ElementKindName;
  }
  return 'block';
}

const nameOf = (written: unknown, kind: string, index: number): string =>
  typeof written === 'string' && written !== '' ? written : `${kind} ${index + 1}`;

/** The part's keys under the element's own: a key that is written here counts, even where it cannot be read. */
function mergePart(context: ElementContext, draft: Draft): void {
  const { sources, reports } = context;
  const written = draft.values.part;
  if (typeof written !== 'string') {
    draft.partUnread = Object.hasOwn(draft.raw, 'part');
    draft.incomplete ||= draft.partUnread;
    return;
  }
  const at = draft.places.part;
  const found = lookUp(sources, draft.place.file, 'parts', written, at, reports, draft.name, draft.kind);
  const rawPart = found.broken ? undefined : mappingAt(sources.all.get(found.file)?.raw, 'parts')[found.name];
  if (found.broken || !isMapping(rawPart)) {
    draft.partUnread = true;
    draft.incomplete = true;
    return;
  }
  context.usedParts.add(`${found.file}\n${found.name}`);
  const partPath = ['parts', found.name];
  if (rawPart.kind !== draft.kind) {
    draft.partUnread = true;
    draft.incomplete = true;
    if (typeof rawPart.kind === 'string' && (KINDS as readonly string[]).includes(rawPart.kind)) {
      reports.push({
        rule: 'schema',
        at,
        subject: draft.name,
        message: `The part ${quoted(written)} is a ${rawPart.kind}, this is a ${draft.kind}.`,
        related: [
          {
            at: placeIn(found.file, [...partPath, 'kind']),
            message: `${quoted(found.name)} is a ${rawPart.kind} here.`,
          },
        ],
        fixes: [
          {
            title: `Change this to \`${rawPart.kind}\``,
            edits: [
              { op: 'key', at: placeIn(draft.place.file, [...draft.place.path, draft.kind]), name: rawPart.kind },
            ],
          },
        ],
      });
    }
    return;
  }
  const { values } = readValues(`part-${draft.kind}` as 'part-via', rawPart, context);
  const fromPart = new Set<string>();
  for (const [key, value] of Object.entries(values)) {
    if (key === 'kind' || Object.hasOwn(draft.raw, key)) continue;
    draft.values[key] = value;
    draft.places[key] = placeIn(found.file, [...partPath, key]);
    fromPart.add(key);
  }
  // What the part writes and cannot be read is not missing here: its own finding says so.
  for (const key of Object.keys(rawPart))
    if (key !== 'kind' && !(key in draft.values) && !Object.hasOwn(draft.raw, key)) fromPart.add(key);
  draft.raw = withKeys(draft.raw, fromPart);
  draft.sourceOf = (key) => (fromPart.has(key) ? found.file : draft.place.file);
}

function withKeys(raw: RawMapping, keys: ReadonlySet<string>): RawMapping {
  const all: Record<string, unknown> = Object.create(null);
  Object.assign(all, raw);
  for (const key of keys) if (!Object.hasOwn(all, key)) all[key] = true;
  return all;
}

function refusePairKeys({ reports }: ElementContext, draft: Draft): void {
  for (const key of OF_A_PAIR) {
    if (!Object.hasOwn(draft.raw, key)) continue;
    delete draft.values[key];
    const at: Place = { ...(draft.places[key] ?? draft.place), on: 'key' };
    reports.push({
      rule: 'schema',
      at,
      subject: draft.name,
      message: `\`${key}\` belongs to a pair; this channel is single-ended and has one conductor.`,
      fixes: [{ title: `Remove \`${key}\``, edits: [{ op: 'remove', at }] }],
    });
  }
}

function resolveStackup({ sources, shelves, reports }: ElementContext, draft: Draft): void {
  const written = draft.values.stackup;
  if (typeof written !== 'string') return;
  const found = lookUp(
    sources,
    draft.sourceOf('stackup'),
    'stackups',
    written,
    draft.places.stackup,
    reports,
    draft.name,
  );
  if (!found.broken) draft.stackup = shelves.stackup(found.file, found.name);
  if (!draft.stackup) draft.incomplete = true;
}

function resolveFile({ sources, reports }: ElementContext, draft: Draft): void {
  const written = draft.values.touchstone;
  if (typeof written !== 'string') return;
  const place = draft.places.touchstone;
  const named = touchstoneFile(sources, draft.sourceOf('touchstone'), written);
  if (named.file === undefined) {
    draft.incomplete = true;
    reports.push({ rule: named.rule, at: place, subject: draft.name, message: named.message });
    return;
  }
  const ports = draft.values.ports as { enter?: readonly number[]; leave?: readonly number[] } | undefined;
  draft.fileReference = {
    file: named.file,
    place,
    ...(ports?.enter && { enter: ports.enter }),
    ...(ports?.leave && { leave: ports.leave }),
  };
}

/** A via's pad is shown where it is not written: it moves the notch. */
function addDefaults(draft: Draft): void {
  const drill = draft.values.drill as Quantity | undefined;
  if (draft.kind === 'via' && drill && !Object.hasOwn(draft.raw, 'pad') && !draft.values.touchstone) {
    draft.derived.pad = show.length(drill.value + 0.2e-3);
  }
}

/** Whether a key that the kind does not know, misspelt or half typed, was meant to be one of these: it has its own finding. */
function isMeant({ kind, raw }: Draft, keys: readonly string[]): boolean {
  const known = new Set(keysOf(kind).map(({ key }) => key));
  const unknown = Object.keys(raw).filter((key) => !known.has(key) && key !== '');
  return unknown.some((key) => nearest(key, keys) !== undefined || keys.some((one) => one.startsWith(key)));
}

/** What the element's own model needs and is not there; keys that are written and bad have their own finding. */
export function checkMissing(context: ElementContext, draft: Draft): void {
  const { reports, singleEnded } = context;
  if (draft.unknownKind || draft.includedIn !== undefined) return;
  const lacking = missingKeys(draft.kind, draft.values, singleEnded);
  if (lacking.length === 0) return;
  // One finding for one cause: an entry without a name is only begun, and a part that is not found may hold the rest.
  const begun = draft.raw[draft.kind] === null || draft.partUnread;
  const unwritten = begun
    ? []
    : missingKeys(draft.kind, draft.raw, singleEnded).filter(({ anyOf }) => !isMeant(draft, anyOf));
  draft.incomplete = true;
  const { file, path } = headOf(draft);
  const problems = missingKeyProblems(draft.kind, unwritten, (key) => namesFor(context, draft, key));
  reports.push(...formatReports(problems, file, path.slice(0, -1), draft.name));
}

const MOST_OFFERED = 3;

/** Stackups at hand, and the layers of this element's on which a signal runs: an example's names would be unknown here. */
function namesFor({ sources, shelves }: ElementContext, draft: Draft, key: string): readonly string[] | undefined {
  if (key !== 'stackup' && key !== 'layer') return undefined;
  const source = sources.all.get(draft.place.file);
  const stackups = source ? namesAtHand(sources, source, 'stackups') : [];
  if (key === 'stackup') return stackups.slice(0, MOST_OFFERED).map(({ writtenAs }) => writtenAs[0]);
  const only = stackups.length === 1 ? shelves.stackup(stackups[0].file, stackups[0].name) : undefined;
  const layers = (draft.stackup ?? only)?.layers ?? [];
  return layers
    .flatMap((layer) => (layer.type === 'copper' && !layer.plane ? [layer.name] : []))
    .slice(0, MOST_OFFERED);
}

/** `includes`: neighbours that the file already holds; their network is a straight through. */
export function resolveIncludes({ reports }: ElementContext, drafts: readonly Draft[]): void {
  for (const draft of drafts) {
    const includes = draft.values.includes;
    if (!Array.isArray(includes)) continue;
    const wanted = new Set(includes.filter((name) => typeof name === 'string'));
    const neighbours = new Set<Draft>();
    for (const step of [-1, 1]) {
      for (let at = draft.index + step; drafts[at] && wanted.has(drafts[at].name); at += step)
        neighbours.add(drafts[at]);
    }
    includes.forEach((name, i) => {
      const at: Place = { file: draft.place.file, path: [...draft.place.path, 'includes', i] };
      const neighbour = [...neighbours].find((one) => one.name === name);
      if (neighbour) {
        neighbour.includedIn = draft.name;
        return;
      }
      const beside = [drafts[draft.index - 1], drafts[draft.index + 1]].flatMap((one) => (one ? [one.name] : []));
      const known = drafts.some((one) => one.name === name);
      reports.push({
        rule: 'unknown-name',
        at,
        subject: draft.name,
        message: known
          ? `${quoted(name)} is no neighbour of \`${draft.name}\`: a file can hold only what stands beside it.`
          : `There is no element ${quoted(String(name))} beside \`${draft.name}\`.`,
        fixes: beside.map((one) => ({ title: `Change to \`${one}\``, edits: [{ op: 'value', at, text: one }] })),
      });
    });
  }
}

/** An owner who is nearly one of those with a budget was meant to be that one; any other name is a label of its own. */
export function checkOwners({ sources, reports }: ElementContext, drafts: readonly Draft[]): void {
  const owners = Object.keys(mappingAt(sources.own.raw, 'owners'));
  for (const { name, values, places } of drafts) {
    const { owner } = values;
    if (typeof owner !== 'string' || owners.includes(owner)) continue;
    const near = nearest(owner, owners);
    if (near === undefined) continue;
    const at = places.owner;
    reports.push({
      rule: 'unknown-name',
      at,
      subject: name,
      message: `There is no owner ${quoted(owner)} with a budget; did you mean ${quoted(near)}?`,
      fixes: nameFixes(at, owner, owners),
    });
  }
}

/** Elements and limits share one name space; the second of two names is reported, and where the first stands. */
export function reportDuplicateNames(
  named: readonly { readonly name: string; readonly kind: string; readonly place: Place; readonly written: boolean }[],
  reports: ModelReport[],
): void {
  const taken = new Set(named.map(({ name }) => name));
  const first = new Map<string, Place>();
  for (const { name, kind, place, written } of named) {
    if (!written) continue;
    const at: Place = { file: place.file, path: [...place.path, kind] };
    const before = first.get(name);
    if (!before) {
      first.set(name, at);
      continue;
    }
    const free = freeName(/-\d+$/.test(name) ? name.replace(/-\d+$/, '') : name, taken);
    taken.add(free);
    reports.push({
      rule: 'duplicate-name',
      at,
      subject: name,
      message: `${quoted(name)} is a name already; elements and limits of a channel each have their own.`,
      related: [{ at: before, message: `${quoted(name)} stands here first.` }],
      fixes: [{ title: `Rename this one to \`${free}\``, edits: [{ op: 'value', at, text: free }] }],
    });
  }
}
