import type { AnyElement, Limit } from '../model/types';
import type { ElementNetwork } from '../networks/types';
import { show } from '../quantity/show';
import type { Computed } from './computed';
import { type ElementMeasures, measuresOf } from './element-measures';
import { insertionLossAt } from './measures';
import type { Figure, Ledger, LedgerRow } from './types';

interface RowFigureKind extends Pick<Figure, 'name' | 'unit' | 'worse'> {
  title: string;
  value(measures: ElementMeasures, element: ElementNetwork, computed: Computed): number | undefined;
  text(value: number): string;
  note?(value: number): string | undefined;
}

/** The lowest notch of its stubs; of what has none, the lowest dip of the whole response that is named for it. */
const firstResonance = ({ element, prepared }: ElementNetwork, { cascade }: Computed) => {
  const notches = prepared?.facts.stubs.map((stub) => stub.notchHz).filter(Number.isFinite) ?? [];
  if (notches.length > 0) return Math.min(...notches);
  return cascade?.resonances.find(({ elements }) => elements.includes(element.name))?.frequencyHz;
};

/** What each row of the ledger, each hover and each hint shows of an element. */
export const rowFigureKinds: readonly RowFigureKind[] = [
  {
    name: 'own-loss-at-nyquist',
    title: 'Own loss at Nyquist',
    unit: 'dB',
    worse: 'higher',
    value: (m) => m.ownLossDb,
    text: show.loss,
  },
  { name: 'delay', title: 'Delay', unit: 's', worse: 'neither', value: (m) => m.delaySeconds, text: show.time },
  {
    name: 'impedance',
    title: 'Impedance',
    unit: 'ohm',
    worse: 'neither',
    value: (_, { prepared }) => prepared?.facts.impedanceOhms,
    text: show.impedance,
  },
  {
    name: 'worst-return-loss',
    title: 'Least return loss up to Nyquist',
    unit: 'dB',
    worse: 'lower',
    value: (m) => m.worstReturnLossDb,
    text: show.returnLoss,
  },
  {
    name: 'first-resonance',
    title: 'First resonance',
    unit: 'Hz',
    worse: 'lower',
    value: (_, element, computed) => firstResonance(element, computed),
    text: show.frequency,
    note: () => 'of a stub its notch, pads included',
  },
];

const atHz = (quantity: { at?: number | 'nyquist' }, nyquist: number) =>
  quantity.at === undefined || quantity.at === 'nyquist' ? nyquist : quantity.at;

/** Own loss of elements at the frequency of a budget, dB. */
export function spentAt(elements: readonly ElementNetwork[], { networks }: Computed, frequencyHz: number): number {
  const grid = networks!.grid;
  return elements.reduce(
    (sum, { network, through }) => (through ? sum : sum + insertionLossAt(network.differential, grid, frequencyHz)),
    0,
  );
}

function budgetOf(element: ElementNetwork, computed: Computed): LedgerRow['budget'] {
  const budget = element.element.budget;
  if (!budget || element.through) return undefined;
  const frequencyHz = atHz(budget, computed.model.nyquistFrequency);
  const spentDb = spentAt([element], computed, frequencyHz);
  const text = `${show.loss(spentDb)} of ${show.loss(budget.value)} at ${show.frequency(frequencyHz)}`;
  return { allowedDb: budget.value, spentDb, share: budget.value > 0 ? spentDb / budget.value : 0, text };
}

/** The most that the whole path may lose at Nyquist, where a limit says so. */
function allowedAtNyquist({ model }: Computed): number | undefined {
  const whole = model.limits.filter(
    (limit): limit is Limit<'insertion-loss'> => limit.kind === 'insertion-loss' && !limit.values.between,
  );
  const allowed = whole.flatMap(({ values }) =>
    values.max?.length === 1 && atHz(values.max[0], model.nyquistFrequency) === model.nyquistFrequency
      ? [values.max[0].value]
      : [],
  );
  return allowed.length ? Math.min(...allowed) : undefined;
}

function ownersOf(computed: Computed): Ledger['owners'] {
  const { model, networks } = computed;
  const named = new Set([
    ...model.owners.map(({ name }) => name),
    ...model.elements.flatMap(({ owner }) => (owner === undefined ? [] : [owner])),
  ]);
  return [...named].map((owner) => {
    const budget = model.owners.find(({ name }) => name === owner)?.budget;
    const frequencyHz = atHz(budget ?? {}, model.nyquistFrequency);
    const spentDb = spentAt(
      networks!.elements.filter(({ element }) => element.owner === owner),
      computed,
      frequencyHz,
    );
    const text = `${show.loss(spentDb)}${budget ? ` of ${show.loss(budget.value)}` : ''} at ${show.frequency(frequencyHz)}`;
    return { owner, spentDb, ...(budget && { allowedDb: budget.value }), text };
  });
}

function figuresOfRow(element: ElementNetwork, computed: Computed): readonly Figure[] {
  if (element.through) return [];
  const measures = measuresOf(element, computed.networks!.grid, computed.model.nyquistFrequency);
  const before = writtenFigures.get(measures);
  const figures: Figure[] = [];
  for (const kind of rowFigureKinds) {
    const value = kind.value(measures, element, computed);
    if (value === undefined || !Number.isFinite(value)) continue;
    const kept = before?.find((figure) => figure.name === kind.name && Object.is(figure.value, value));
    figures.push(kept ?? writtenFigure(kind, value));
  }
  writtenFigures.set(measures, figures);
  return figures;
}

/** By what was measured: most edits leave most elements as they are, and writing numbers is most of the work. */
const writtenFigures = new WeakMap<ElementMeasures, readonly Figure[]>();

function writtenFigure({ name, title, unit, worse, text, note: noteOf }: RowFigureKind, value: number): Figure {
  const note = noteOf?.(value);
  return { name, title, unit, worse, value, text: text(value), ...(note && { note }) };
}

/** What each element spends and may spend, along the path. undefined where nothing could be computed. */
export function ledgerOf(computed: Computed): Ledger | undefined {
  const { model, networks, cascade } = computed;
  if (!networks || !cascade) return undefined;
  const allowed = allowedAtNyquist(computed);
  let cumulativeDb = 0;
  const rows = networks.elements.map((element): LedgerRow => {
    const { name, kind, index, owner } = element.element as AnyElement;
    const figures = figuresOfRow(element, computed);
    cumulativeDb += figures.find((figure) => figure.name === 'own-loss-at-nyquist')?.value ?? 0;
    const budget = budgetOf(element, computed);
    return {
      element: name,
      kind,
      index,
      figures,
      ...(owner !== undefined && { owner }),
      ...(budget && { budget }),
      cumulativeDb,
      ...(allowed && { cumulativeShare: cumulativeDb / allowed }),
    };
  });
  const whole = insertionLossAt(cascade.total.differential, networks.grid, model.nyquistFrequency);
  return { rows, reflectionsDb: whole - cumulativeDb, owners: ownersOf(computed) };
}
