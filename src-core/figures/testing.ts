import type { Cascade } from '../cascade/types';
import type { EyeDensity, Link } from '../link/types';
import type { AnyElement, AnyLimit, Model } from '../model/types';
import type { ElementNetwork, Grid, Network } from '../networks/types';
import type { Computed } from './computed';

/** 0 to 40 GHz in steps of 0.5 GHz. */
export const grid: Grid = {
  stepHz: 0.5e9,
  points: 81,
  frequencies: Float64Array.from({ length: 81 }, (_, i) => i * 0.5e9),
  k: 0,
  j: 0,
};

interface Behaviour {
  /** Insertion loss, dB at a frequency. */
  lossDb?: (frequencyHz: number) => number;
  /** Return loss at port 1 and port 2, dB. */
  returnLossDb?: (frequencyHz: number) => number;
  returnLossAtReceiverDb?: (frequencyHz: number) => number;
  delaySeconds?: number;
}

/** A network that does just what is said: made up, not physical. */
export function networkThat({
  lossDb = () => 0,
  returnLossDb = () => 200,
  returnLossAtReceiverDb = returnLossDb,
  delaySeconds = 0,
}: Behaviour): Network {
  const differential = new Float64Array(8 * grid.points);
  grid.frequencies.forEach((f, i) => {
    const size = 10 ** (-lossDb(f) / 20);
    const angle = -2 * Math.PI * f * delaySeconds;
    differential[8 * i] = 10 ** (-returnLossDb(f) / 20);
    differential[8 * i + 6] = 10 ** (-returnLossAtReceiverDb(f) / 20);
    for (const at of [2, 4]) {
      differential[8 * i + at] = size * Math.cos(angle);
      differential[8 * i + at + 1] = size * Math.sin(angle);
    }
  });
  return { differential };
}

export const elementThat = (name: string, behaviour: Behaviour, more: Partial<AnyElement> = {}): ElementNetwork =>
  ({
    element: {
      kind: 'trace',
      name,
      place: { file: 'lane.channel.yaml', path: ['path', 0] },
      values: {},
      places: {},
      derived: {},
      ...more,
    },
    network: networkThat(behaviour),
    through: false,
  }) as unknown as ElementNetwork;

export const limit = (kind: string, name: string, values: object): AnyLimit =>
  ({ kind, name, index: 0, place: { file: 'lane.channel.yaml', path: ['limits', 0] }, values }) as AnyLimit;

/** A 20 Gb/s NRZ channel, Nyquist at 10 GHz, whose whole does what `whole` says. */
export function computedOf(
  whole: Behaviour,
  more: { elements?: ElementNetwork[]; model?: Partial<Model>; link?: Link } = {},
): Computed {
  const total = networkThat(whole);
  const elements = (more.elements ?? []).map(
    (one, index) => ({ ...one, element: { ...one.element, index } }) as ElementNetwork,
  );
  const model = {
    signalling: 'differential',
    symbolRate: 20e9,
    unitInterval: 50e-12,
    nyquistFrequency: 10e9,
    targetBer: 1e-12,
    limits: [],
    owners: [],
    elements: elements.map(({ element }) => element),
    ...more.model,
  } as unknown as Model;
  const cascade: Cascade = { total, between: () => total, resonances: [] };
  return {
    model,
    networks: {
      grid,
      context: { frequencies: grid.frequencies, referenceOhms: 100, singleEnded: false },
      elements,
      without: [],
    } as never,
    cascade,
    link: more.link,
    linkIsStale: false,
  };
}

/** An eye that is a rhombus itself: as high as `heightVolts` in the middle, shut `widthUi`/2 to either side. */
export function linkWithEye(heightVolts: number, widthUi: number): Link {
  const phases = 65;
  const upper = Float64Array.from({ length: phases }, (_, i) => {
    const distance = Math.abs(i - 32) / phases;
    return Math.max(0, (heightVolts / 2) * (1 - distance / (widthUi / 2)));
  });
  const density: Partial<EyeDensity> = { phases, openings: [{ upper, lower: upper.map((edge) => -edge) }] };
  return {
    eyeHeightVolts: heightVolts,
    eyeWidthUi: widthUi,
    mainCursorVolts: heightVolts,
    noiseVolts: 0,
    droopVolts: 0,
    density,
    without: [],
  } as unknown as Link;
}
