import type { Analysis } from '../analysis';
import { measuresOf } from '../figures/element-measures';
import { show } from '../quantity/show';
import type { Mark, Plot, Series } from './types';

const mostMarks = 40;

/** Impedance along the path as a step from either end sees it, against one-way delay from the transmitter. */
export const impedancePlot: Plot = {
  name: 'impedance',
  title: 'Impedance along the path',
  describe(analysis) {
    const { time, networks, model } = analysis;
    if (!time?.tdr || !networks) return undefined;
    const places = placesOf(analysis);
    const end = places.length > 0 ? places[places.length - 1].to : 0;
    if (!(end > 0)) return undefined;
    const margin = 0.05 * end;
    const { transmitter, receiver, sampleSeconds } = time.tdr;
    const forth = along(transmitter, sampleSeconds, (delay) => delay, [-margin, end + margin]);
    const back = along(receiver, sampleSeconds, (delay) => end - delay, [-margin, end + margin]);
    const [lowest, highest] = extent([...forth.y, ...back.y]);
    const air = Math.max(2, 0.15 * (highest - lowest));
    return {
      name: this.name,
      title: this.title,
      x: { label: 'Delay from the transmitter, one way', unit: 's', domain: [-margin, end + margin] },
      y: {
        label: 'Impedance',
        unit: 'ohm',
        domain: [Math.floor((lowest - air) / 5) * 5, Math.ceil((highest + air) / 5) * 5],
      },
      series: [
        { name: 'Seen from the transmitter', ...forth },
        { name: 'Seen from the receiver', ...back },
      ],
      limits: [],
      marks: marksOf(places, forth),
      summary: `${model.signalling === 'single-ended' ? 'From' : 'Differential, from'} ${show.impedance(lowest)} to ${show.impedance(highest)} along ${show.time(end)}.`,
    };
  },
};

interface Stretch {
  readonly element: string;
  readonly from: number;
  readonly to: number;
}

/** Where each element begins and ends, by the delays of the ledger. */
function placesOf({ networks, model }: Analysis): Stretch[] {
  let from = 0;
  return networks!.elements.map((element) => {
    const delay = element.through
      ? 0
      : Math.max(0, measuresOf(element, networks!.grid, model.nyquistFrequency).delaySeconds);
    const stretch = { element: element.element.name, from, to: from + delay };
    from += delay;
    return stretch;
  });
}

/** An echo after t comes from half of t away; places outside the domain are left out, x ascends. */
function along(
  impedance: Float64Array,
  sampleSeconds: number,
  place: (delay: number) => number,
  [from, to]: readonly [number, number],
): Omit<Series, 'name'> & { x: number[]; y: number[] } {
  const points: [number, number][] = [];
  for (let i = 0; i < impedance.length; i++) {
    const x = place((i * sampleSeconds) / 2);
    if (x >= from && x <= to && Number.isFinite(impedance[i])) points.push([x, impedance[i]]);
  }
  points.sort((a, b) => a[0] - b[0]);
  return { x: points.map(([x]) => x), y: points.map(([, y]) => y) };
}

function marksOf(places: readonly Stretch[], { x, y }: { x: readonly number[]; y: readonly number[] }): Mark[] {
  if (x.length === 0) return [];
  return places.slice(0, mostMarks).map(({ element, from, to }) => {
    const middle = (from + to) / 2;
    const after = x.findIndex((value) => value >= middle);
    return { x: middle, y: y[after < 0 ? y.length - 1 : after], label: element, element };
  });
}

function extent(values: readonly number[]): [number, number] {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return low <= high ? [low, high] : [0, 0];
}
