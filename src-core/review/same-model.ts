import type { Analysis } from '../analysis';
import type { Model } from '../model/types';
import type { FileContent } from '../text/types';

/** Rounding of 4.5 mil against 114.3 um is no difference. */
const SAME = 1e-9;
/** Where something stands and what it is called. */
const NEVER = new Set(['place', 'places', 'name', 'part', 'touchstone', 'derived', 'includes', 'note', 'between']);
/** How a quantity is written. */
const SPELLING = new Set(['text', 'unit']);
/** What is held against the figures and changes none. */
const JUDGED = new Set(['budget', 'owner']);

export interface Sameness {
  /** Whether the same quantity in another unit is a difference. */
  readonly spelling: boolean;
}

/** Whether two channels compute the same: elements, ends and channel keys, whatever they are called and wherever they stand. */
export function sameElectrically(a: Analysis, b: Analysis, { spelling }: Sameness = { spelling: false }): boolean {
  const ignored = new Set([...NEVER, ...JUDGED, ...(spelling ? [] : SPELLING)]);
  return same(electrical(a), electrical(b), ignored);
}

/** Whether the figures are held against the same limits, budgets and waivers. */
export function sameJudgement(a: Analysis, b: Analysis): boolean {
  return same(judgement(a), judgement(b), new Set(['place', 'places', 'text', 'unit', 'note']));
}

const judgement = ({ model }: Analysis) => ({
  owners: model.owners,
  limits: model.limits.map(({ kind, values, between }) => ({
    kind,
    span: between,
    values: { ...values, [kind]: undefined, between: undefined },
  })),
  waivers: model.waivers.map(({ rule, upTo, until }) => ({ rule, upTo, until })),
  budgets: model.elements.map(({ budget, owner }) => ({ budget, owner })),
});

function electrical({ model, inputs }: Analysis) {
  const { elements, transmitter, receiver, computable } = model;
  const keys = [
    'lineRate',
    'modulation',
    'targetBer',
    'longestRun',
    'signalling',
    'referenceOhms',
    'temperatureCelsius',
  ] as const satisfies readonly (keyof Model)[];
  const end = <T extends { readonly written: unknown }>(one: T | undefined) => one && { ...one, written: undefined };
  return {
    computable,
    channel: keys.map((key) => model[key]),
    transmitter: end(transmitter),
    receiver: end(receiver),
    elements: elements.map(({ kind, values, stackup, file, includedIn, ...rest }) => ({
      ...rest,
      kind,
      includedIn: includedIn !== undefined,
      values: { ...values, [kind]: undefined, stackup: undefined, from: undefined, to: undefined },
      layers: stackup,
      // by its data, whatever it is called
      file: file && { ...file, file: undefined, data: dataOf(inputs.files.get(file.file)) },
    })),
  };
}

const dataOf = (content: FileContent | undefined) => (content?.kind === 'text' ? content.text : content);

function same(a: unknown, b: unknown, ignored: ReadonlySet<string>): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a === 'number' && typeof b === 'number')
    return Math.abs(a - b) <= SAME * Math.max(Math.abs(a), Math.abs(b));
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a) && Array.isArray(b))
    return a.length === b.length && a.every((item, i) => same(item, b[i], ignored));
  if (Array.isArray(a) || Array.isArray(b)) return false;
  const [left, right] = [a, b].map((one) =>
    Object.entries(one).filter(([key, v]) => !ignored.has(key) && v !== undefined),
  );
  const other = new Map(right);
  return (
    left.length === right.length && left.every(([key, value]) => other.has(key) && same(value, other.get(key), ignored))
  );
}
