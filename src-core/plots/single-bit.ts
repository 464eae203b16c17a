import type { Analysis } from '../analysis';
import type { Link } from '../link/types';
import { show } from '../quantity/show';
import type { Plot, PlotDescription, Series } from './types';

/** What is left of the response beyond the last shown UI, as a share of the main cursor. */
const quiet = 0.004;
const mostUi = 80;

/** What one bit makes at the slicer, against unit intervals from the sampling instant, with its cursors. */
export const singleBitPlot: Plot = {
  name: 'single-bit',
  title: 'Single-bit response',
  describe: (analysis) => (analysis.link ? withLink(analysis, analysis.link) : withoutLink(analysis)),
};

const describeWith = (
  parts: Pick<PlotDescription, 'x' | 'y' | 'series' | 'summary' | 'stale' | 'marks'>,
): PlotDescription => ({
  name: singleBitPlot.name,
  title: singleBitPlot.title,
  limits: [],
  ...parts,
});

function withLink({ linkIsStale }: Analysis, link: Link): PlotDescription {
  const { pulse, samplesPerUi, mainIndex, cursors, precursors, dfeTaps } = link;
  const response = around(pulse, mainIndex, samplesPerUi);
  const [from, to] = [response.x[0], response.x[response.x.length - 1]];
  const ui = Array.from(cursors, (_, i) => i - precursors);
  const shown = ui.filter((place) => place >= from && place <= to);
  const value = (place: number) => cursors[place + precursors];
  const series: Series[] = [
    { name: 'Response at the slicer', ...response },
    { name: dfeTaps.length > 0 ? 'Cursors before the DFE' : 'Cursors', x: shown, y: shown.map(value), draw: 'stems' },
  ];
  if (dfeTaps.length > 0) {
    const corrected = dfeTaps
      .map((_, i) => i + 1)
      .filter((place) => place <= to && place + precursors < cursors.length);
    const left = corrected.map((place) => value(place) - dfeTaps[place - 1]);
    series.push({ name: 'Left after the DFE', x: corrected, y: left, draw: 'stems' });
  }
  const worst = shown
    .filter((place) => place !== 0)
    .reduce((a, b) => (Math.abs(value(b)) > Math.abs(value(a) ?? 0) ? b : a), Number.NaN);
  const other = Number.isFinite(worst) ? `; largest other cursor ${show.voltage(value(worst))} at ${worst} UI` : '';
  return describeWith({
    x: { label: 'Time from the sampling instant', unit: 'UI', domain: [from, to] },
    y: { label: 'Voltage', unit: 'V', domain: room([...response.y, ...Array.from(shown, value)]) },
    series,
    marks: [{ x: 0, y: link.mainCursorVolts, label: `main cursor ${show.voltage(link.mainCursorVolts)}` }],
    summary: `Main cursor ${show.voltage(link.mainCursorVolts)}${other}.`,
    stale: linkIsStale || undefined,
  });
}

/** Before there is a link: the response as it arrives, against its own peak. */
function withoutLink({ time, model }: Analysis): PlotDescription | undefined {
  if (!time || time.pulse.length === 0) return undefined;
  let peak = 0;
  for (let i = 1; i < time.pulse.length; i++) if (time.pulse[i] > time.pulse[peak]) peak = i;
  const swing = model.transmitter?.swingVolts ?? 1;
  const response = around(time.pulse, peak, time.samplesPerUi);
  const y = response.y.map((value) => value * swing);
  return describeWith({
    x: { label: 'Time from the peak', unit: 'UI', domain: [response.x[0], response.x[response.x.length - 1]] },
    y: { label: 'Voltage', unit: 'V', domain: room(y) },
    series: [{ name: 'Response at the receiver', x: response.x, y }],
    marks: [],
    summary: `Peak ${show.voltage(time.pulse[peak] * swing)} for one bit of ${show.voltage(swing)}${model.transmitter ? '' : ' (no transmitter is declared)'}.`,
  });
}

/** From 4 UI before the middle to where the response has died away, in UI. */
function around(pulse: Float64Array, middle: number, samplesPerUi: number) {
  const first = Math.max(0, middle - 4 * samplesPerUi);
  const threshold = quiet * Math.abs(pulse[middle]);
  let last = Math.min(pulse.length - 1, middle + mostUi * samplesPerUi);
  while (last > middle && Math.abs(pulse[last]) < threshold) last--;
  last = Math.min(pulse.length - 1, Math.max(middle + 8 * samplesPerUi, Math.ceil(last / samplesPerUi) * samplesPerUi));
  const count = last - first + 1;
  return {
    x: Float64Array.from({ length: count }, (_, i) => (first + i - middle) / samplesPerUi),
    y: pulse.slice(first, last + 1),
  };
}

/** A little air above and below, in tenths of the span. */
function room(values: readonly number[] | Float64Array): [number, number] {
  let low = 0;
  let high = 0;
  for (const value of values) {
    if (!Number.isFinite(value)) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  const air = (high - low || 1) * 0.06;
  return [low - air, high + air];
}
