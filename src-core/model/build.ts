import type { Inputs } from '../analysis';
import { readValues } from '../format/index';
import { isMapping, listAt, mappingAt } from '../raw';
import type { ParsedFile } from '../text/parsed';
import type { FilePath } from '../text/types';
import { type Draft, finish } from './draft';
import { withoutEchoes } from './echoes';
import {
  checkMissing,
  checkOwners,
  type ElementContext,
  readElement,
  reportDuplicateNames,
  resolveIncludes,
} from './elements';
import { longestRun, readReceiver, readTransmitter } from './ends';
import { resolveLayers } from './layers';
import { readLimits, readWaivers } from './limits';
import { nameTable } from './name-table';
import { readParts } from './parts';
import { formatReports, type ModelReport, placeIn } from './reports';
import { gatherSources, type Source, type Sources, unreadable } from './sources';
import { openShelves } from './stackups';
import type { Model } from './types';

export const MAX_ELEMENTS = 500;

type ChannelRead = ReturnType<typeof readValues<'channel'>>;

/**
 * The channel as read: names resolved, parts merged in, defaults filled in, each fault reported once. Depends on the values of the
 * texts alone, never on where they stand. Of a parts file it holds the names and the reports.
 */
export function buildModel(inputs: Inputs, parsed: ReadonlyMap<FilePath, ParsedFile>): Model {
  if (!parsed.has(inputs.file)) return emptyModel(inputs, unreadReports(inputs));
  const sources = gatherSources(inputs, parsed);
  const { own } = sources;
  if (own.parsed.kind === 'config') return emptyModel(inputs, withoutEchoes(configReports(own), parsed));
  if (own.parsed.kind !== 'channel' && own.parsed.kind !== 'parts') return emptyModel(inputs, []);
  if (own.newer) return emptyModel(inputs, versionReports(sources));
  const reports: ModelReport[] = [...sources.reports, ...configUnread(inputs)];
  const shelves = openShelves(sources, reports);
  const read: ChannelRead =
    own.parsed.kind === 'channel' ? readValues('channel', own.parsed.value) : { values: {}, problems: [] };
  reports.push(...formatReports(read.problems, own.file, []));
  const basics = readBasics(read.values);
  const context: ElementContext = {
    sources,
    shelves,
    reports,
    singleEnded: basics.signalling === 'single-ended',
    usedParts: new Set(),
    ...(basics.lineRate > 0 && { nyquistHz: basics.nyquistFrequency }),
  };
  const drafts = own.parsed.kind === 'channel' ? readPath(context) : [];
  for (const source of sources.all.values()) {
    shelves.readAll(source.file);
    readParts(context, source);
  }
  const elements = drafts.map(finish);
  const limits = own.parsed.kind === 'channel' ? readLimits(context, elements) : [];
  reportDuplicateNames([...namedDrafts(drafts), ...limits.map((limit) => ({ ...limit, written: true }))], reports);
  const tooMany = listAt(own.raw, 'path').length > MAX_ELEMENTS;
  return {
    file: own.file,
    title: read.values.title ?? titleOf(own.file),
    computable: basics.lineRate > 0 && elements.length > 0 && !tooMany,
    ...basics,
    ...readEnds(context, read.values, basics),
    owners: ownersOf(read.values, own.file),
    elements,
    limits,
    waivers: own.parsed.kind === 'channel' ? readWaivers(context) : [],
    files: [...sources.all.keys()],
    names: nameTable(sources, shelves),
    reports: withoutEchoes(reports, parsed),
  };
}

function readPath(context: ElementContext): Draft[] {
  const { sources, reports } = context;
  const { file, raw } = sources.own;
  const entries = listAt(raw, 'path');
  if (Array.isArray(raw.path) && entries.length === 0) {
    reports.push({
      rule: 'schema',
      at: placeIn(file, ['path']),
      message: '`path` is empty: it holds the elements in order, transmitter to receiver.',
    });
  }
  if (entries.length > MAX_ELEMENTS) {
    reports.push({
      rule: 'limit',
      at: placeIn(file, ['path', MAX_ELEMENTS]),
      message: `\`path\` has ${entries.length} elements, more than ${MAX_ELEMENTS}: nothing is computed. Join elements, or divide the channel.`,
    });
  }
  const drafts = entries.slice(0, MAX_ELEMENTS).map((entry, index) => readElement(context, entry, index));
  checkOwners(context, drafts);
  resolveIncludes(context, drafts);
  for (const draft of drafts) checkMissing(context, draft);
  resolveLayers(drafts, reports);
  return drafts;
}

const namedDrafts = (drafts: readonly Draft[]) =>
  drafts.map(({ name, kind, place, raw, unknownKind }) => ({
    name,
    kind,
    place,
    written: !unknownKind && typeof raw[kind] === 'string' && raw[kind] !== '',
  }));

type Basics = Pick<
  Model,
  | 'lineRate'
  | 'modulation'
  | 'symbolRate'
  | 'nyquistFrequency'
  | 'unitInterval'
  | 'targetBer'
  | 'longestRun'
  | 'signalling'
  | 'referenceOhms'
  | 'temperatureCelsius'
>;

function readBasics(values: ChannelRead['values']): Basics {
  const lineRate = values['line-rate']?.value ?? 0;
  const modulation = values.modulation ?? 'NRZ';
  const symbolRate = modulation === 'PAM4' ? lineRate / 2 : lineRate;
  const signalling = values.signalling ?? 'differential';
  const targetBer = values['target-ber']?.value ?? 1e-12;
  return {
    lineRate,
    modulation,
    symbolRate,
    nyquistFrequency: symbolRate / 2,
    unitInterval: symbolRate > 0 ? 1 / symbolRate : 0,
    targetBer,
    longestRun: longestRun(values.coding, targetBer),
    signalling,
    referenceOhms: values['reference-impedance']?.value ?? (signalling === 'single-ended' ? 50 : 100),
    temperatureCelsius: values.conditions?.temperature?.value ?? 20,
  };
}

function readEnds(
  { sources, singleEnded, reports }: ElementContext,
  values: ChannelRead['values'],
  { referenceOhms, symbolRate }: Basics,
) {
  const { file, raw } = sources.own;
  if (symbolRate <= 0) return {};
  for (const end of ['transmitter', 'receiver'] as const) {
    if (!singleEnded || !Object.hasOwn(mappingAt(raw, end), 'common-impedance')) continue;
    const at = placeIn(file, [end, 'common-impedance'], 'key');
    reports.push({
      rule: 'schema',
      at,
      message: '`common-impedance` belongs to a pair; this channel is single-ended and has one conductor.',
      fixes: [{ title: 'Remove `common-impedance`', edits: [{ op: 'remove', at }] }],
    });
  }
  const context = { file, referenceOhms, symbolRate };
  return {
    ...(values.transmitter &&
      isMapping(raw.transmitter) && { transmitter: readTransmitter(values.transmitter, context) }),
    ...(values.receiver && isMapping(raw.receiver) && { receiver: readReceiver(values.receiver, context) }),
  };
}

const ownersOf = ({ owners }: ChannelRead['values'], file: FilePath): Model['owners'] =>
  Object.entries(owners ?? {}).map(([name, budget]) => ({ name, budget, place: placeIn(file, ['owners', name]) }));

const titleOf = (file: FilePath) => file.slice(file.lastIndexOf('/') + 1).replace(/\.(?:channel|parts)\.yaml$/, '');

function versionReports({ own }: Sources): readonly ModelReport[] {
  const { problems } = readValues(own.parsed.kind === 'parts' ? 'parts' : 'channel', own.parsed.value);
  return formatReports(
    problems.filter(({ rule }) => rule === 'format-version'),
    own.file,
    [],
  );
}

/** What the schema says of a configuration; the names of its rules and options are the judge's. */
const configReports = ({ file, parsed }: Source) =>
  formatReports(readValues('config', parsed.value).problems, file, []);

/** Why the file itself has no text. */
function unreadReports(inputs: Inputs): readonly ModelReport[] {
  const { file } = inputs;
  const [rule, message] = unreadable(inputs, file, file.slice(file.lastIndexOf('/') + 1));
  return [{ rule, at: placeIn(file, []), message: rule === 'missing-file' ? 'This file is not there.' : message }];
}

/** Why the configuration that would count has no text. */
function configUnread(inputs: Inputs): readonly ModelReport[] {
  const { file, configFile, files } = inputs;
  if (configFile === undefined || configFile === file || files.get(configFile)?.kind === 'text') return [];
  const [rule, message] = unreadable(inputs, configFile, configFile);
  return [{ rule, at: placeIn(file, []), message: `${message} The rules’ defaults hold.` }];
}

function emptyModel({ file }: Inputs, reports: readonly ModelReport[]): Model {
  return {
    file,
    title: titleOf(file),
    computable: false,
    ...readBasics({}),
    owners: [],
    elements: [],
    limits: [],
    waivers: [],
    files: [file],
    names: { parts: [], stackups: [], materials: [], foils: [] },
    reports,
  };
}
