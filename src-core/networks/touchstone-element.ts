import type { AnyElement, FileReference, Model } from '../model/types';
import { show } from '../quantity/show';
import type { Place } from '../text/types';
import { spectrumShare } from './pulse-spectrum';
import { meanDelay, taperEnd } from './resample';
import { type PortMap, placementProblem, touchstoneNetwork } from './touchstone-network';
import { goesThrough, mendedMap, portMapOf } from './touchstone-ports';
import type { TouchstoneData, TouchstoneResult } from './touchstone-types';
import type { ElementNote, Network, NetworkContext, Prepared } from './types';

/** Cursors may be off by this much, by the main one, before the data's range is a finding. */
const rangeShare = 0.001;
/** What is continued to 0 Hz is known from the data beside it; this share of it counts as unsure. */
const unsureBelow = 0.1;
/** Past rounding and the interpolation of the exporting program. */
const leastGain = 1.001;
const leastNonReciprocity = 1e-3;
/** Per cent of clockwise turning below which data count as not causal. Common practice: a lumped part in a file turns little and scores low. */
const leastCausality = 50;

/** A file in place of an element's geometry: what is known of it, and how to make its network, absent where it cannot be made. */
export interface FileElement {
  readonly prepared: Prepared;
  readonly key?: string;
  readonly evaluate?: (context: NetworkContext) => Network;
}

/** @param result undefined where the host has no such file; the model says so */
export function prepareFile(element: AnyElement, model: Model, result: TouchstoneResult | undefined): FileElement {
  const file = element.file as FileReference;
  const data = result?.data;
  const notes: ElementNote[] = (result?.errors ?? []).slice(0, 3).map(({ line, message, rule }) => ({
    rule: rule ?? 'touchstone',
    at: file.place,
    message: `\`${file.file}\`, line ${line}: ${message}`,
  }));
  if (!data) return { prepared: { parameters: undefined, facts: { stubs: [] }, notes } };

  const map = placementOf(file, data, model.signalling === 'single-ended', element.kind);
  const problem = shapeProblem(map, data, model, element) ?? placementProblem(data.ports, map);
  if (problem !== undefined) {
    notes.push({ rule: 'port-map', at: portsPlace(element, file), message: problem });
    return { prepared: { parameters: undefined, facts: { stubs: [] }, notes } };
  }
  notes.push(
    ...throughNote(element, file, map, data),
    ...rangeNote(model, file, data),
    ...qualityNotes(element, file, data),
  );
  const placement = { ...map, reversed: element.reversed };
  const parameters = { data: numberOf(data), placement };
  return {
    prepared: {
      parameters,
      facts: {
        stubs: [],
        delaySeconds: throughDelay(map, data),
        dataRangeHz: [data.frequencies[0], data.frequencies[data.frequencies.length - 1]],
      },
      notes,
    },
    key: `file ${JSON.stringify(parameters)}`,
    evaluate: (context) => touchstoneNetwork(data, placement, context),
  };
}

/** The written map; failing that the one that goes through, or the usual one. */
function placementOf(file: FileReference, data: TouchstoneData, singleEnded: boolean, kind: string): PortMap {
  if (file.enter) return { enter: file.enter, leave: file.leave ?? [] };
  if (data.ports === 1 || kind === 'stub') return { enter: [1], leave: [] };
  if (data.ports === 4 && !singleEnded) return portMapOf(data) ?? { enter: [1, 3], leave: [2, 4] };
  return { enter: [1], leave: [2] };
}

function shapeProblem(
  { enter, leave }: PortMap,
  data: TouchstoneData,
  model: Model,
  element: AnyElement,
): string | undefined {
  if (leave.length === 0 && element.kind !== 'stub') {
    return data.ports === 1
      ? 'A file of one port is a branch that ends; it may stand on a `stub` only.'
      : 'No port leaves: `leave` names the ports on the receiver side.';
  }
  if (leave.length > 0 && element.kind === 'stub')
    return 'A stub is a branch: its file has one port that enters and none that leaves.';
  if (enter.length === 2 && model.signalling === 'single-ended') {
    return 'In a single-ended channel one port enters and one leaves: `ports: { enter: [1], leave: [2] }`.';
  }
  return undefined;
}

function throughNote(element: AnyElement, file: FileReference, map: PortMap, data: TouchstoneData): ElementNote[] {
  if (map.enter.length !== 2) return [];
  const through = portMapOf(data);
  if (!through || goesThrough(map, through)) return [];
  const mended = textOf(mendedMap(map, through));
  const place = element.places.ports;
  const edit = place
    ? ({ op: 'value', at: place, text: mended } as const)
    : ({
        op: 'set',
        at: { file: file.place.file, path: file.place.path.slice(0, -1) },
        key: 'ports',
        text: mended,
        after: 'touchstone',
      } as const);
  const pairs = through.enter.map((port, i) => `${port} to ${through.leave[i]}`).join(' and ');
  return [
    {
      rule: 'port-map',
      at: portsPlace(element, file),
      message: `In \`${file.file}\` the signal goes from port ${pairs}; ${textOf(map)} joins others. Which end is the transmitter's and which conductor the positive one, the file does not say.`,
      fixes: [{ title: `Write ports: ${mended}`, edits: [edit], preferred: true }],
    },
  ];
}

/** Cursors that the data's range leaves open, by the main one: an upper bound, from the pulse's spectrum there. */
export function rangeError(model: Model, data: TouchstoneData): number {
  const lowest = data.frequencies[0];
  const highest = data.frequencies[data.frequencies.length - 1];
  return unsureBelow * spectrumShare(model, 0, lowest) + spectrumShare(model, highest, 64 * model.symbolRate);
}

function rangeNote(model: Model, file: FileReference, data: TouchstoneData): ElementNote[] {
  const error = rangeError(model, data);
  if (error <= rangeShare) return [];
  const lowest = data.frequencies[0];
  const highest = data.frequencies[data.frequencies.length - 1];
  return [
    {
      rule: 'data-range',
      at: file.place,
      message:
        `The data of \`${file.file}\` reach from ${show.frequency(lowest)} to ${show.frequency(highest)} (Nyquist is ${show.frequency(model.nyquistFrequency)}); ` +
        `below they are continued to 0 Hz, above they taper to nothing at ${show.frequency(taperEnd * highest)}. Cursors may be off by up to ${show.percent(error)} of the main one.`,
      value: error,
      valueText: show.percent(error),
    },
  ];
}

function qualityNotes(element: AnyElement, file: FileReference, { quality }: TouchstoneData): ElementNote[] {
  const notes: ElementNote[] = [];
  const say = (rule: string, message: string, value: number, valueText: string, worse: 'higher' | 'lower' = 'higher') =>
    notes.push({ rule, at: file.place, message: `\`${file.file}\` ${message}`, value, worse, valueText });
  const { largestSingularValue: gain, largestNonReciprocity: difference, causalityPercent: causal } = quality;
  if (!element.active && gain > leastGain) {
    const most = show.ratio(gain);
    say(
      'passivity',
      `gives back more than it takes: its largest singular value is ${most} at ${show.frequency(quality.worstPassivityHz)} (passive: at most 1).`,
      gain,
      most,
    );
  }
  if (!element.active && difference > leastNonReciprocity) {
    const most = show.ratio(difference);
    say(
      'reciprocity',
      `transmits differently in its two directions: by ${most} at ${show.frequency(quality.worstReciprocityHz)}.`,
      difference,
      most,
    );
  }
  if (causal < leastCausality) {
    const share = show.percent(causal / 100);
    say(
      'causality',
      `turns the right way over only ${share} of its course (IEEE 370 initial figure): it answers before it is asked, or has too few points.`,
      causal / 100,
      share,
      'lower',
    );
  }
  return notes;
}

const textOf = ({ enter, leave }: PortMap) => `{ enter: [${enter.join(', ')}], leave: [${leave.join(', ')}] }`;

const portsPlace = (element: AnyElement, file: FileReference): Place => element.places.ports ?? file.place;

function throughDelay({ enter, leave }: PortMap, { ports, frequencies, s }: TouchstoneData): number | undefined {
  if (leave.length === 0) return undefined;
  return Math.max(0, meanDelay(frequencies, s, 2 * ((leave[0] - 1) * ports + enter[0] - 1), 2 * ports * ports));
}

/** Data are told apart by identity: the host reads a file once while its text is the same. */
const numbers = new WeakMap<TouchstoneData, number>();
let next = 1;

function numberOf(data: TouchstoneData): number {
  let number = numbers.get(data);
  if (number === undefined) numbers.set(data, (number = next++));
  return number;
}
