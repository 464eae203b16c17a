import type { Analysis } from '../analysis';
import type { ElementNetwork } from '../networks/types';
import { show } from '../quantity/show';
import type { Change } from './types';

/** What of an element follows from the text without standing in it. */
interface Fact {
  readonly attribute: string;
  readonly text: string;
  /** For facts that a change elsewhere moves by next to nothing. */
  readonly value?: number;
}

/** A fact that moved by less is the same one: impedance follows the frequency a little. */
const NOTICEABLE = 0.005;

function factsOf({ element, prepared }: ElementNetwork): readonly Fact[] {
  const { impedanceOhms, widthMeters, stubs = [] } = prepared?.facts ?? {};
  const layers = (['from', 'to'] as const).flatMap((end): Fact[] =>
    element.kind === 'via' && element.derived[end] !== undefined
      ? [{ attribute: end, text: element.derived[end] }]
      : [],
  );
  const stub = stubs
    .filter(() => element.kind === 'via')
    .flatMap(({ side, lengthMeters, notchHz }): Fact[] => [
      { attribute: `${side} stub`, text: show.length(lengthMeters), value: lengthMeters },
      ...(Number.isFinite(notchHz)
        ? [{ attribute: `${side} stub’s notch`, text: show.frequency(notchHz), value: notchHz }]
        : []),
    ]);
  const declares = 'impedance' in element.values;
  return [
    ...layers,
    ...stub,
    ...(impedanceOhms !== undefined && !declares && element.kind === 'trace'
      ? [{ attribute: 'impedance', text: show.impedance(impedanceOhms), value: impedanceOhms }]
      : []),
    ...(widthMeters !== undefined && !('width' in element.values)
      ? [{ attribute: 'width', text: show.length(widthMeters), value: widthMeters }]
      : []),
  ];
}

const noticeable = (from: Fact | undefined, to: Fact | undefined) => {
  if (from?.text === to?.text) return false;
  if (from?.value === undefined || to?.value === undefined) return true;
  return Math.abs(to.value - from.value) > NOTICEABLE * Math.max(Math.abs(from.value), Math.abs(to.value));
};

/** Stub lengths, notches, impedances, widths and layers that follow from the changes, for elements that both sides have. */
export function derivedChanges(
  base: Analysis,
  head: Analysis,
  nameInHead: ReadonlyMap<string, string>,
): readonly Change[] {
  const before = new Map(
    base.networks?.elements.map((one) => [nameInHead.get(one.element.name) ?? one.element.name, one]),
  );
  return (head.networks?.elements ?? []).flatMap((now) => {
    const then = before.get(now.element.name);
    if (!then || then.element.kind !== now.element.kind) return [];
    const [from, to] = [factsOf(then), factsOf(now)];
    const attributes = [...new Set([...to, ...from].map(({ attribute }) => attribute))];
    return attributes.flatMap((attribute): Change[] => {
      const [old, fresh] = [from, to].map((facts) => facts.find((fact) => fact.attribute === attribute));
      if (!noticeable(old, fresh)) return [];
      return [
        {
          subject: now.element.name,
          attribute,
          ...(old && { from: old.text }),
          ...(fresh && { to: fresh.text }),
          derived: true,
          electrical: true,
          words: `${now.element.name}: ${attribute} ${old?.text ?? 'none'} → ${fresh?.text ?? 'none'}`,
          at: now.element.place,
          group: 0,
        },
      ];
    });
  });
}
