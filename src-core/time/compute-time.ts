import type { Cascade } from '../cascade/types';
import type { Model } from '../model/types';
import type { Networks } from '../networks/types';
import { sameValue } from '../same-value';
import { automaticCtle, type Complex, ctleResponse, ratioOfDb, receiverFilter } from './filters';
import { inverseReal } from './fourier';
import { type SymbolShape, symbolSpectrum } from './symbol-spectrum';
import { tdr } from './tdr';
import { type ModeEnds, transfer } from './terminations';
import type { Time } from './types';

/** Least and usual samples of a UI. */
const fewestSamplesPerUi = 8;
const samplesPerUi = 32;
/** Longer records take fewer samples a UI, down to what the grid itself holds. */
const mostSamples = 131072;

/**
 * Stage 4: what one symbol makes at the slicer, and on demand the impedance against time.
 * Symbol, edge and taps of the transmitter, terminations, path, receiver filter and a declared CTLE are multiplied on the grid and
 * transformed once; time 0 is the middle of the leading edge at the transmitter, delay is kept. The record is one period of the grid,
 * 2^k UI. Zero-filled above the grid's end, where a symbol's spectrum has a zero.
 * Without a transmitter or receiver its defaults hold: matched, rise time 0.25 UI, bandwidth 0.75 × symbol rate.
 */
export function computeTime(model: Model, cascade: Pick<Cascade, 'total'>, { grid }: Pick<Networks, 'grid'>): Time {
  const { symbolRate, transmitter, receiver } = model;
  const riseTimeSeconds = transmitter?.riseTimeSeconds ?? 0.25 / symbolRate;
  const bandwidthHz = receiver?.bandwidthHz ?? 0.75 * symbolRate;
  const H = transfer(cascade.total, grid.frequencies, ...modeEnds(model));
  const shape = { symbolRate, riseTimeSeconds, taps: transmitter?.taps ?? [1], mainTap: transmitter?.mainTap ?? 0 };
  const sent = filteredSymbol(shape, bandwidthHz, grid.frequencies);
  const uis = Math.round(symbolRate / grid.stepHz);
  // one line of the grid is 1/uis of the symbol rate, so that the Fourier sum times 1/uis is the pulse
  const spectrum = new Float64Array(H.length);
  for (let i = 0; i < grid.points; i++)
    multiplyInto(spectrum, i, H[2 * i] / uis, H[2 * i + 1] / uis, sent[2 * i], sent[2 * i + 1]);
  const perUi = samplesFor(uis, grid.points);
  const through = (dcGain: number, zeroShare: number, shape = automaticCtle(symbolRate)) =>
    inverseReal(equalised(spectrum, grid.frequencies, shape, dcGain, zeroShare), perUi * uis);
  const ctle = receiver?.ctle ?? 'none';
  const declared = typeof ctle === 'object';
  let pictured: Time['tdr'];
  let parts: Time['ctleParts'];
  return {
    sampleSeconds: 1 / (symbolRate * perUi),
    samplesPerUi: perUi,
    pulse: declared ? through(ratioOfDb(ctle.dcGainDb), 1, ctle) : inverseReal(spectrum, perUi * uis),
    // Only the eye asks for them.
    get ctleParts() {
      return ctle === 'auto' ? (parts ??= { flat: through(1, 0), rising: through(0, 1) }) : undefined;
    },
    get tdr() {
      return (pictured ??= tdr(cascade.total, grid, model.referenceOhms, riseTimeSeconds));
    },
  };
}

/** By frequencies: an edit of the path leaves both ends as they are. */
const filteredSymbols = new WeakMap<Float64Array, { readonly from: unknown; readonly spectrum: Float64Array }>();

/** What the transmitter sends for one symbol, through the receiver's filter. */
function filteredSymbol(shape: SymbolShape, bandwidthHz: number, frequencies: Float64Array): Float64Array {
  const from = { shape, bandwidthHz };
  const kept = filteredSymbols.get(frequencies);
  if (kept && sameValue(kept.from, from)) return kept.spectrum;
  const spectrum = symbolSpectrum(shape, frequencies);
  const filter: Complex = { re: 0, im: 0 };
  for (let i = 0; i < frequencies.length; i++) {
    receiverFilter(frequencies[i], bandwidthHz, filter);
    multiplyInto(spectrum, i, spectrum[2 * i], spectrum[2 * i + 1], filter.re, filter.im);
  }
  filteredSymbols.set(frequencies, { from, spectrum });
  return spectrum;
}

/** Terminations of both modes. Two legs in series halve a leg's capacitance for the differential mode, in parallel double it for the common. */
export function modeEnds({ transmitter, receiver, referenceOhms, signalling }: Model): [ModeEnds, ModeEnds] {
  const pair = signalling === 'differential';
  const end = (which: Model['transmitter'] | Model['receiver']) => ({
    differential: {
      ohms: which?.impedanceOhms ?? referenceOhms,
      farads: (which?.capacitanceFarads ?? 0) * (pair ? 0.5 : 1),
    },
    common: {
      ohms: which?.commonImpedanceOhms ?? referenceOhms / 4,
      farads: (which?.capacitanceFarads ?? 0) * 2,
    },
  });
  const [source, load] = [end(transmitter), end(receiver)];
  return [
    { source: source.differential, load: load.differential, referenceOhms },
    { source: source.common, load: load.common, referenceOhms: referenceOhms / 4 },
  ];
}

function samplesFor(uis: number, points: number): number {
  const grids = (2 * (points - 1)) / uis;
  let perUi = samplesPerUi;
  while (perUi * uis > mostSamples && perUi > fewestSamplesPerUi) perUi /= 2;
  return Math.max(perUi, 2 ** Math.ceil(Math.log2(Math.max(grids, 4))));
}

function equalised(
  spectrum: Float64Array,
  frequencies: Float64Array,
  shape: Parameters<typeof ctleResponse>[1],
  dcGain: number,
  zeroShare: number,
): Float64Array {
  const out = new Float64Array(spectrum.length);
  const gain: Complex = { re: 0, im: 0 };
  for (let i = 0; i < frequencies.length; i++) {
    ctleResponse(frequencies[i], shape, dcGain, zeroShare, gain);
    multiplyInto(out, i, spectrum[2 * i], spectrum[2 * i + 1], gain.re, gain.im);
  }
  return out;
}

function multiplyInto(out: Float64Array, i: number, aRe: number, aIm: number, bRe: number, bIm: number): void {
  out[2 * i] = aRe * bRe - aIm * bIm;
  out[2 * i + 1] = aRe * bIm + aIm * bRe;
}
