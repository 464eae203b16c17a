import type { Analysis } from '../analysis';
import { maskFit } from '../figures/eye-limit';
import type { EyeDensity, Link } from '../link/types';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import { namesOf } from './sampled';
import type { Heat, Plot, PlotLimit, Series } from './types';

/** Density of voltage against phase at the slicer, the contour at the target bit error ratio, and the limits' rhombus. */
export const eyePlot: Plot = {
  name: 'eye',
  title: 'Statistical eye',
  describe(analysis) {
    const { link, model, linkIsStale } = analysis;
    if (!link || link.density.phases < 2 || link.density.voltages < 2) return undefined;
    const { lowestVolts, highestVolts } = link.density;
    const limits = masksOf(analysis, link);
    const ratio = show.ratio(model.targetBer);
    const opening =
      link.eyeHeightVolts > 0
        ? `Open by ${show.voltage(link.eyeHeightVolts)} and ${show.unitIntervals(link.eyeWidthUi)} at a bit error ratio of ${ratio}.`
        : `Shut at a bit error ratio of ${ratio}.`;
    return {
      name: this.name,
      title: this.title,
      x: { label: 'Time from the sampling instant', unit: 'UI', domain: spanOf(link.density) },
      y: { label: 'Voltage at the slicer', unit: 'V', domain: [lowestVolts, highestVolts] },
      series: contoursOf(link.density, ratio),
      limits,
      marks: [],
      heat: heatOf(link.density),
      summary: opening + namesOf(limits),
      stale: linkIsStale || undefined,
    };
  },
};

/** Below this probability a bin is not drawn: it is the floor of the pictures, not of the computation. */
const drawnFloor = -18;

function heatOf(density: EyeDensity): Heat {
  const { phases, voltages, lowestVolts, highestVolts, log10 } = density;
  return {
    columns: phases,
    rows: voltages,
    x: spanOf(density),
    y: [lowestVolts, highestVolts],
    values: log10,
    floor: drawnFloor,
    unit: 'probability of a bin',
  };
}

/** Left edge of the first and right edge of the last column, each standing around its phase. */
const spanOf = ({ phases }: EyeDensity): [number, number] => [
  phaseOf(0, phases) - 0.5 / phases,
  phaseOf(phases - 1, phases) + 0.5 / phases,
];

/** Phase of each column's middle, as the density has it: the sampling instant in column phases / 2. */
const phaseOf = (column: number, phases: number) => (column - Math.floor(phases / 2)) / phases;

const names: Readonly<Record<number, readonly string[]>> = { 1: ['Eye'], 3: ['Lower eye', 'Middle eye', 'Upper eye'] };

function contoursOf({ phases, openings }: EyeDensity, ratio: string): Series[] {
  return openings.flatMap(({ lower, upper }, index) => {
    const columns = Array.from({ length: phases }, (_, i) => i).filter((i) => upper[i] > lower[i]);
    if (columns.length === 0) return [];
    const back = [...columns].reverse();
    const at = (i: number) => phaseOf(i, phases);
    return [
      {
        name: `${names[openings.length]?.[index] ?? `Eye ${index + 1}`} at ${ratio}`,
        x: [...columns.map(at), ...back.map(at)],
        y: [...columns.map((i) => lower[i]), ...back.map((i) => upper[i])],
        draw: 'loop' as const,
      },
    ];
  });
}

const isEyeLimit = (limit: Analysis['model']['limits'][number]): limit is Limit<'eye'> => limit.kind === 'eye';

/** The rhombus of height and width where it fits best into each opening; a lone height or width is a line at the sampling instant. */
function masksOf({ model, limits }: Analysis, { density }: Link): PlotLimit[] {
  const centre = Math.floor(density.phases / 2);
  return model.limits.filter(isEyeLimit).flatMap((limit) => {
    const height = limit.values.height?.value ?? 0;
    const width = limit.values.width;
    const widthUi = width ? (width.dimension === 'time' ? width.value / model.unitInterval : width.value) : 0;
    if (!(height > 0 || widthUi > 0)) return [];
    const at = height > 0 && widthUi > 0 ? maskFit(density, height, widthUi).shiftUi : 0;
    const met = limits.find(({ name }) => name === limit.name)?.met ?? true;
    return density.openings.map(({ lower, upper }, index) => {
      const middle = (lower[centre] + upper[centre]) / 2;
      return {
        name:
          density.openings.length > 1
            ? `${limit.name} (${names[3]?.[index]?.toLowerCase() ?? `eye ${index + 1}`})`
            : limit.name,
        x: [at - widthUi / 2, at, at + widthUi / 2, at],
        y: [middle, middle + height / 2, middle, middle - height / 2],
        met,
        forbidden: 'inside' as const,
      };
    });
  });
}
