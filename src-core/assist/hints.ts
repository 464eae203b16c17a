import type { Analysis } from '../analysis';
import type { LedgerRow } from '../figures/types';
import { keySchemaAt } from '../format/index';
import type { AnyElement } from '../model/types';
import type { ElementNetwork } from '../networks/types';
import { show } from '../quantity/show';
import { isMapping } from '../raw';
import { rangeOf } from '../text/index';
import type { FilePath, Place, TextRange } from '../text/types';

/** `derived`: what follows from the neighbours; `defaults`: what holds since nothing is written, where that changes a figure. */
export type HintClass = 'loss' | 'stub' | 'derived' | 'defaults';

/** A remark inside the text, not part of it. */
export interface Hint {
  readonly kind: HintClass;
  readonly offset: number;
  readonly label: string;
  /** Where a click on it leads. */
  readonly target?: Place;
  /** Written into the text on a double click. */
  readonly insert?: { readonly range: TextRange; readonly text: string };
  /** The element that it is about; its explanation is made when asked for. */
  readonly element?: string;
}

/**
 * Hints of one file, within a range of its text if given.
 * Figures of the newest text have `≈`; `~` where they are of an older one.
 */
export function hintsOf(analysis: Analysis, file: FilePath, range?: TextRange, stale = false): readonly Hint[] {
  if (file !== analysis.model.file) return [];
  const parsed = analysis.parsed.get(file);
  if (!parsed) return [];
  const about = stale ? '~' : '≈';
  const hints: Hint[] = [];
  for (const element of analysis.model.elements) {
    const entry = rangeOf(parsed, { ...element.place, on: 'entry' });
    if (range && (entry.end < range.start || entry.start > range.end)) continue;
    const row = analysis.ledger?.rows.find(({ index }) => index === element.index);
    hints.push(...hintsOfElement(analysis, element, row, about, (place) => rangeOf(parsed, place), parsed.text));
  }
  hints.push(...defaultsOfChannel(analysis, (place) => rangeOf(parsed, place)));
  return hints
    .filter(({ offset }) => !range || (offset >= range.start && offset <= range.end))
    .sort((a, b) => a.offset - b.offset);
}

function hintsOfElement(
  analysis: Analysis,
  element: AnyElement,
  row: LedgerRow | undefined,
  about: string,
  range: (place: Place) => TextRange,
  text: string,
): Hint[] {
  const hints: Hint[] = [];
  const { name, kind, place } = element;
  const nameRange = range({ file: place.file, path: [...place.path, kind] });
  if (nameRange.end === nameRange.start) return hints;
  const figure = (wanted: string) => row?.figures.find((one) => one.name === wanted)?.text;
  const network = analysis.networks?.elements[element.index];
  const stubs = network && !network.through ? (network.prepared?.facts.stubs ?? []) : [];
  const loss = figure('own-loss-at-nyquist');
  if (loss !== undefined && stubs.length === 0)
    hints.push({ kind: 'loss', offset: nameRange.end, label: `${about} ${loss}`, element: name });
  for (const stub of stubs) {
    if (stub.lengthMeters <= 0) continue;
    const notch = Number.isFinite(stub.notchHz) ? ` → ${show.frequency(stub.notchHz)}` : '';
    hints.push({
      kind: 'stub',
      offset: nameRange.end,
      label: `${about} stub ${show.length(stub.lengthMeters)}${notch}`,
      element: name,
    });
  }
  const geometry = network && !network.through ? geometryHint(network, range) : undefined;
  if (geometry) hints.push(geometry);
  for (const [key, value] of Object.entries(element.derived)) {
    const info = keySchemaAt('channel', [...place.path, key], kind);
    const isDefault = info?.default !== undefined && info.refers !== 'layer';
    const where = element.places[key];
    if (where && where.path.length > place.path.length && where.file === place.file) continue;
    const target = info?.refers === 'layer' ? layerPlace(element, value) : undefined;
    const insert = insertionOf(text, nameRange.end, key, value);
    hints.push({
      kind: isDefault ? 'defaults' : 'derived',
      offset: nameRange.end,
      label: `${key}: ${value}`,
      element: name,
      ...(target && { target }),
      ...(insert && { insert }),
    });
  }
  return hints;
}

/** Width and gap that give a declared impedance, beside it. */
function geometryHint({ element, prepared }: ElementNetwork, range: (place: Place) => TextRange): Hint | undefined {
  const { widthMeters, gapMeters } = prepared?.facts ?? {};
  const where = element.places.impedance;
  const isWritten =
    Object.hasOwn(element.values, 'width') ||
    where?.file !== element.place.file ||
    where.path.length <= element.place.path.length;
  if (widthMeters === undefined || isWritten) return undefined;
  const gap = gapMeters === undefined || Object.hasOwn(element.values, 'gap') ? '' : `, gap ${show.length(gapMeters)}`;
  const { end } = range(where);
  return { kind: 'derived', offset: end, label: `→ width ${show.length(widthMeters)}${gap}`, element: element.name };
}

/** What holds for the whole channel since it is not written, and for its two ends. */
function defaultsOfChannel({ model, parsed }: Analysis, range: (place: Place) => TextRange): Hint[] {
  if (!model.computable) return [];
  const { file } = model;
  const written = (...path: string[]) =>
    path.reduce<unknown>(
      (value, key) => (isMapping(value) && Object.hasOwn(value, key) ? value[key] : undefined),
      parsed.get(file)?.value,
    ) !== undefined;
  const hint = (path: string[], on: 'key' | 'value', texts: readonly (string | false)[]): Hint[] => {
    const label = texts.filter(Boolean).join(' · ');
    return label === ''
      ? []
      : [{ kind: 'defaults', offset: range({ file, path, on }).end + (on === 'key' ? 1 : 0), label }];
  };
  const { transmitter, receiver } = model;
  return [
    ...hint(['line-rate'], 'value', [
      !written('modulation') && model.modulation,
      !written('target-ber') && `BER ${show.probability(model.targetBer)}`,
      !written('reference-impedance') && show.impedance(model.referenceOhms),
      !written('conditions', 'temperature') && show.temperature(model.temperatureCelsius),
    ]),
    ...(transmitter && written('transmitter')
      ? hint(['transmitter'], 'key', [
          !written('transmitter', 'rise-time') && `rise-time: ${show.time(transmitter.riseTimeSeconds)}`,
        ])
      : []),
    ...(receiver && written('receiver')
      ? hint(['receiver'], 'key', [
          !written('receiver', 'bandwidth') && `bandwidth: ${show.frequency(receiver.bandwidthHz)}`,
        ])
      : []),
  ];
}

function layerPlace({ stackup }: AnyElement, layer: string): Place | undefined {
  return stackup?.layers.find(({ name }) => name === layer)?.place;
}

/** The key as text behind the element's name: in a block on a line of its own, in a flow mapping behind a comma. */
function insertionOf(text: string, offset: number, key: string, value: string): Hint['insert'] {
  const line = text.slice(text.lastIndexOf('\n', offset - 1) + 1, offset);
  const dash = /^(\s*)-(\s+)(?!\s)/.exec(line);
  if (!dash) return undefined;
  const isFlow = line.slice(dash[0].length).startsWith('{');
  const written = isFlow ? `, ${key}: ${value}` : `\n${' '.repeat(dash[0].length)}${key}: ${value}`;
  // Behind the name at the end of its line, before a comment: a comment stays with the name.
  const stop = text.indexOf('\n', offset);
  const at = isFlow ? offset : stop === -1 ? text.length : text[stop - 1] === '\r' ? stop - 1 : stop;
  return { range: { start: at, end: at }, text: written };
}
