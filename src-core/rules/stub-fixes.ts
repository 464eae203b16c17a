import type { Quantity } from '../../schemas/format/types';
import { quoted } from '../model/reports';
import type { AnyElement, Element } from '../model/types';
import type { StubFact } from '../networks/types';
import { show } from '../quantity/show';
import type { Fix } from '../report';
import { withGain } from './gain';
import type { Judged } from './types';
import { changed, prepareChanged } from './what-if';

/** Fabricators quote remainders in steps of this size. */
const STEP_METERS = 0.05e-3;
/** The most that the format finds plausible for a remainder; leaving more is hardly worth the drill. */
const LONGEST_METERS = 2e-3;

const millimetres = (meters: number) => `${Number((meters * 1e3).toFixed(3))} mm`;

const lengthQuantity = (meters: number, tolerance: number, text: string): Quantity => ({
  value: meters,
  dimension: 'length',
  text,
  unit: 'mm',
  plus: tolerance,
  minus: tolerance,
  threeSigma: false,
});

const lowestNotch = (stubs: readonly StubFact[]) => Math.min(...stubs.map(({ lowestNotchHz }) => lowestNotchHz));

/** From `from` towards `to`, both included, in steps of {@link STEP_METERS}: the longest that helps is found first. */
function* downwards(from: number, to: number): Generator<number> {
  for (let n = Math.floor(from / STEP_METERS + 1e-9); n * STEP_METERS >= to - 1e-9; n--) yield n * STEP_METERS;
}

type Side = 'top' | 'bottom';

function drilled(element: Element<'via'>, sides: readonly Side[], remainder: Quantity): AnyElement {
  const backdrill = { ...element.values.backdrill, ...Object.fromEntries(sides.map((side) => [side, remainder])) };
  return changed(element, { backdrill });
}

/** `{ bottom: 0.3 mm ± 0.1 mm }`, the side that is not touched kept as written. */
function backdrillText(element: Element<'via'>, sides: readonly Side[], text: string): string {
  const written = element.values.backdrill ?? {};
  const both: readonly Side[] = ['top', 'bottom'];
  const parts = both.flatMap((side) =>
    sides.includes(side) ? [`${side}: ${text}`] : written[side] ? [`${side}: ${written[side].text}`] : [],
  );
  return `{ ${parts.join(', ')} }`;
}

/**
 * Backdrills that lift the notch of the computed response to `wantedHz`, pads included, at the upper end of the drill's tolerance.
 * First the shortest remainder that the fabricator leaves: it gains the most, and the drill rules keep it from the layer that it must not
 * cut. Then the longest that does, where that is another: it keeps the drill farthest from that layer.
 * @returns none without drill rules, or where they leave no depth that helps
 */
export function backdrillFixes(
  judged: Judged,
  element: AnyElement,
  stubs: readonly StubFact[],
  wantedHz: number,
): readonly Fix[] {
  const via = element as Element<'via'>;
  const { backdrillMinimumMeters: minimum, backdrillToleranceMeters: tolerance = 0 } = via.stackup?.drillRules ?? {};
  const sides = stubs.flatMap(({ side }) => (side === 'branch' ? [] : [side]));
  if (minimum === undefined || sides.length === 0) return [];
  const longest = Math.min(LONGEST_METERS, ...stubs.map(({ lengthMeters }) => lengthMeters));
  const helping = [...downwards(longest, minimum + tolerance)].filter((remainder) => {
    const after = prepareChanged(judged, drilled(via, sides, lengthQuantity(remainder, tolerance, '')))?.facts.stubs;
    return after !== undefined && lowestNotch(after) >= wantedHz;
  });
  const chosen = helping.length > 1 ? [helping[helping.length - 1], helping[0]] : helping;
  return chosen.map((remainder, i) =>
    drillFix(judged, via, { sides, stubs, remainder, tolerance, preferred: i === 0 }),
  );
}

interface Drilling {
  readonly sides: readonly Side[];
  readonly stubs: readonly StubFact[];
  readonly remainder: number;
  readonly tolerance: number;
  readonly preferred: boolean;
}

function drillFix(
  judged: Judged,
  via: Element<'via'>,
  { sides, stubs, remainder, tolerance, preferred }: Drilling,
): Fix {
  const text = `${millimetres(remainder)}${tolerance > 0 ? ` ± ${millimetres(tolerance)}` : ''}`;
  const candidate = drilled(via, sides, lengthQuantity(remainder, tolerance, text));
  const after = prepareChanged(judged, candidate)?.facts.stubs ?? [];
  const title = `Backdrill ${quoted(via.name)} to ${text}: notch from ${show.frequency(lowestNotch(stubs))} to ${notchAfter(after)}`;
  const edits = [{ op: 'set', at: via.place, key: 'backdrill', text: backdrillText(via, sides, text) }] as const;
  return withGain(judged, candidate, { title, ...(preferred && { preferred }), edits });
}

const notchAfter = (stubs: readonly StubFact[]) => {
  const lowest = lowestNotch(stubs);
  return Number.isFinite(lowest) ? show.frequency(lowest) : 'above 1 THz';
};

/** A declared stub cut short enough. A stub of a part is the part's. */
export function shortenFixes(judged: Judged, element: AnyElement, stub: StubFact, wantedHz: number): readonly Fix[] {
  const written = (element as Element<'stub'>).values.length;
  if (element.kind !== 'stub' || !written || element.places.length?.file !== element.place.file) return [];
  for (const length of downwards(stub.lengthMeters, STEP_METERS)) {
    const text = `${millimetres(length)}${tolerancePart(written.text)}`;
    const candidate = changed(element, { length: { ...written, value: length, text, unit: 'mm' } });
    const after = prepareChanged(judged, candidate)?.facts.stubs;
    if (!after || lowestNotch(after) < wantedHz) continue;
    const title = `Shorten ${quoted(element.name)} to ${millimetres(length)}: notch from ${show.frequency(stub.lowestNotchHz)} to ${notchAfter(after)}`;
    return [withGain(judged, candidate, { title, edits: [{ op: 'value', at: element.places.length, text }] })];
  }
  return [];
}

/** ` ± 0.1 mm` as it was written, where it is not relative to the length. */
const tolerancePart = (text: string) => / ?(?:±|\+).*$/.exec(text)?.[0] ?? '';
