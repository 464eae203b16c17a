import type { Model } from '../model/types';
import type { Grid, Network } from '../networks/types';

/** A grid of symbol rate / 2^k up to 2 × symbol rate × 2^j. */
export function gridFor(symbolRate: number, k = 8, j = 0): Grid {
  const stepHz = symbolRate / 2 ** k;
  const points = 2 ** (k + j + 1) + 1;
  return { stepHz, points, frequencies: Float64Array.from({ length: points }, (_, i) => i * stepHz), k, j };
}

/** A reflectionless path with the given transfer, re and im at a frequency. */
export function matchedPath(grid: Grid, s21: (frequencyHz: number) => readonly [number, number]): Network {
  const differential = new Float64Array(8 * grid.points);
  for (let i = 0; i < grid.points; i++) {
    const [re, im] = s21(grid.frequencies[i]);
    differential.set([0, 0, re, im, re, im, 0, 0], 8 * i);
  }
  return { differential };
}

/** A pure delay. */
export const delayOf = (seconds: number) => (f: number) =>
  [Math.cos(2 * Math.PI * f * seconds), -Math.sin(2 * Math.PI * f * seconds)] as const;

/** The loss of skin effect alone, exp(-k √(jω)), behind a delay. */
export const skinLossOf = (k: number, delaySeconds: number) => (f: number) => {
  const root = k * Math.sqrt(Math.PI * f);
  const phase = root + 2 * Math.PI * f * delaySeconds;
  return [Math.exp(-root) * Math.cos(phase), -Math.exp(-root) * Math.sin(phase)] as const;
};

type Part<T> = { readonly [K in keyof T]?: T[K] | undefined };

const place = { file: 'test.channel.yaml', path: [] };

/** As much of a model as stages 4 and 5 read: 25 Gb/s NRZ, matched, without equalisers, jitter or noise. */
export function modelOf(
  change: Part<Omit<Model, 'transmitter' | 'receiver'>> & {
    transmitter?: Part<NonNullable<Model['transmitter']>>;
    receiver?: Part<NonNullable<Model['receiver']>>;
  } = {},
): Model {
  const symbolRate = change.symbolRate ?? 25e9;
  const referenceOhms = change.referenceOhms ?? 100;
  const end = { place, written: {}, impedanceOhms: referenceOhms, commonImpedanceOhms: referenceOhms / 4 };
  return {
    file: 'test.channel.yaml',
    title: 'test',
    computable: true,
    modulation: 'NRZ',
    targetBer: 1e-12,
    longestRun: 40,
    signalling: 'differential',
    temperatureCelsius: 20,
    owners: [],
    elements: [],
    limits: [],
    waivers: [],
    files: [],
    names: { parts: [], stackups: [], materials: [], foils: [] },
    reports: [],
    lineRate: symbolRate * (change.modulation === 'PAM4' ? 2 : 1),
    ...change,
    symbolRate,
    referenceOhms,
    nyquistFrequency: symbolRate / 2,
    unitInterval: 1 / symbolRate,
    transmitter: {
      ...end,
      capacitanceFarads: 0,
      swingVolts: 1,
      riseTimeSeconds: 0.25 / symbolRate,
      taps: [1],
      mainTap: 0,
      randomJitterSeconds: 0,
      deterministicJitterSeconds: 0,
      ...change.transmitter,
    },
    receiver: {
      ...end,
      capacitanceFarads: 0,
      bandwidthHz: 0.75 * symbolRate,
      noiseVolts: 0,
      ctle: 'none',
      dfe: { taps: 0, limit: 1 },
      ...change.receiver,
    },
  } as Model;
}
