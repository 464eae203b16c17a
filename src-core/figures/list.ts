import type { Networks } from '../networks/types';
import { show } from '../quantity/show';
import type { Computed } from './computed';
import { insertionLossAt, phaseDelay, worstReturnLoss } from './measures';
import type { Figure } from './types';

/** One figure of a whole channel: how it is named, computed and written. */
interface FigureKind extends Pick<Figure, 'name' | 'unit' | 'worse'> {
  title(singleEnded: boolean): string;
  /** undefined where it cannot be known (yet). */
  value(computed: Computed): number | undefined;
  text(value: number): string;
  note?(computed: Computed): string | undefined;
  /** From the link, which may belong to an older text. */
  ofLink?: boolean;
}

/** The name of a scattering parameter: with its modes in a pair, bare for one conductor. */
export const parameterName = (pair: string, singleEnded: boolean) => (singleEnded ? `S${pair}` : `SDD${pair}`);

const worstReflection = ({ model, networks, cascade }: Computed) =>
  networks && cascade && worstReturnLoss(cascade.total.differential, networks.grid, model.nyquistFrequency);

const declaredDelay = ({ elements }: Networks) =>
  elements.reduce((sum, { through, prepared }) => sum + (through ? 0 : (prepared?.facts.delaySeconds ?? 0)), 0);

const conversionDb = ({ model, networks, cascade }: Computed) => {
  const full = cascade?.total.full;
  if (!full || !networks) return undefined;
  // Row c2, column d1 of the four-port: what of the differential wave leaves as common.
  const at = 32 * Math.round(model.nyquistFrequency / networks.grid.stepHz) + 2 * (3 * 4 + 0);
  return Math.min(200, -10 * Math.log10(Math.max(full[at] ** 2 + full[at + 1] ** 2, 1e-30)));
};

/** The list from which verdict, JSON, hover, preview and report take each figure of the whole channel. */
export const figureKinds: readonly FigureKind[] = [
  {
    name: 'insertion-loss-at-nyquist',
    title: (single) => `Insertion loss at Nyquist (${parameterName('21', single)})`,
    unit: 'dB',
    worse: 'higher',
    value: ({ model, networks, cascade }) =>
      networks && cascade && insertionLossAt(cascade.total.differential, networks.grid, model.nyquistFrequency),
    text: show.loss,
    note: ({ model }) => `at ${show.frequency(model.nyquistFrequency)}`,
  },
  {
    name: 'worst-return-loss',
    title: (single) =>
      `Least return loss up to Nyquist (${parameterName('11', single)}, ${parameterName('22', single)})`,
    unit: 'dB',
    worse: 'lower',
    value: (computed) => worstReflection(computed)?.lossDb,
    text: show.returnLoss,
    note: (computed) => {
      const worst = worstReflection(computed);
      // of what hardly reflects the place is a matter of rounding
      return worst && worst.lossDb <= 60
        ? `at ${show.frequency(worst.frequencyHz)}, seen from the ${worst.end}`
        : undefined;
    },
  },
  {
    name: 'delay',
    title: () => 'Delay at Nyquist',
    unit: 's',
    worse: 'neither',
    value: ({ model, networks, cascade }) =>
      networks &&
      cascade &&
      phaseDelay(cascade.total.differential, networks.grid, model.nyquistFrequency, declaredDelay(networks)),
    text: show.time,
  },
  {
    name: 'lowest-resonance',
    title: () => 'Lowest resonance',
    unit: 'Hz',
    worse: 'lower',
    value: ({ cascade }) => cascade?.resonances[0]?.frequencyHz,
    text: show.frequency,
    note: ({ cascade }) => {
      const lowest = cascade?.resonances[0];
      return (
        lowest &&
        `${show.loss(lowest.depthDb)} deep${lowest.elements.length ? `, by ${lowest.elements.join(' or ')}` : ''}`
      );
    },
  },
  {
    name: 'skew',
    title: () => 'Skew between the legs',
    unit: 's',
    worse: 'neither',
    value: ({ networks }) => {
      const skews = networks?.elements.map(({ prepared }) => prepared?.facts.skewSeconds ?? 0) ?? [];
      return skews.some((skew) => skew !== 0) ? skews.reduce((sum, skew) => sum + skew, 0) : undefined;
    },
    text: show.time,
    note: () => 'positive: the second leg is later',
  },
  {
    name: 'mode-conversion-at-nyquist',
    title: () => 'Conversion to common mode at Nyquist (SCD21)',
    unit: 'dB',
    worse: 'lower',
    value: conversionDb,
    text: show.returnLoss,
    note: () => 'below the incident differential wave',
  },
  {
    name: 'main-cursor',
    title: () => 'Main cursor',
    unit: 'V',
    worse: 'lower',
    value: ({ link }) => link?.mainCursorVolts,
    text: show.voltage,
    ofLink: true,
  },
  {
    name: 'noise',
    title: () => 'Noise at the slicer, rms',
    unit: 'V',
    worse: 'higher',
    value: ({ link }) => link?.noiseVolts,
    text: show.voltage,
    ofLink: true,
  },
  {
    name: 'droop',
    title: () => 'Droop over the longest run',
    unit: 'V',
    worse: 'higher',
    value: ({ link }) => (link && link.droopVolts > 0 ? link.droopVolts : undefined),
    text: show.voltage,
    ofLink: true,
  },
  {
    name: 'ctle-dc-gain',
    title: () => 'CTLE gain at DC',
    unit: 'dB',
    worse: 'neither',
    value: ({ link }) => link?.ctleDcGainDb,
    text: show.loss,
    ofLink: true,
  },
  {
    name: 'eye-height',
    title: () => 'Eye height',
    unit: 'V',
    worse: 'lower',
    value: ({ link }) => link?.eyeHeightVolts,
    text: show.voltage,
    note: ({ model }) => `peak to peak at a bit error ratio of ${show.probability(model.targetBer)}`,
    ofLink: true,
  },
  {
    name: 'eye-width',
    title: () => 'Eye width',
    unit: 'UI',
    worse: 'lower',
    value: ({ link }) => link?.eyeWidthUi,
    text: show.unitIntervals,
    note: ({ model }) => `at a bit error ratio of ${show.probability(model.targetBer)}`,
    ofLink: true,
  },
];
