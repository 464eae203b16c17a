import type { ReceiverValues, TransmitterValues } from '../../schemas/format/types';
import type { FilePath } from '../text/types';
import { placeIn } from './reports';
import type { Receiver, Transmitter } from './types';

export interface EndContext {
  readonly file: FilePath;
  readonly referenceOhms: number;
  readonly symbolRate: number;
}

/** The termination's impedance is the reference's where none is written; the common mode's a quarter of it. */
function termination(
  values: Pick<Partial<ReceiverValues>, 'impedance' | 'common-impedance' | 'capacitance'>,
  referenceOhms: number,
) {
  const impedanceOhms = values.impedance?.value ?? referenceOhms;
  return {
    impedanceOhms,
    commonImpedanceOhms: values['common-impedance']?.value ?? impedanceOhms / 4,
    capacitanceFarads: values.capacitance?.value ?? 0,
  };
}

/** The transmitter with the format's defaults; `pre` taps are written nearest first and stand here in order of time. */
export function readTransmitter(
  values: Partial<TransmitterValues>,
  { file, referenceOhms, symbolRate }: EndContext,
): Transmitter {
  const { ffe } = values;
  const pre = [...(ffe?.pre ?? [])].reverse();
  return {
    place: placeIn(file, ['transmitter']),
    written: values,
    ...(values.swing && { swingVolts: values.swing.value }),
    riseTimeSeconds: values['rise-time']?.value ?? 0.25 / symbolRate,
    ...termination(values, referenceOhms),
    taps: [...pre, ffe?.main ?? 1, ...(ffe?.post ?? [])],
    mainTap: pre.length,
    randomJitterSeconds: values['random-jitter']?.value ?? 0,
    deterministicJitterSeconds: values['deterministic-jitter']?.value ?? 0,
  };
}

/** The receiver with the format's defaults. */
export function readReceiver(
  values: Partial<ReceiverValues>,
  { file, referenceOhms, symbolRate }: EndContext,
): Receiver {
  const { ctle, dfe } = values;
  return {
    place: placeIn(file, ['receiver']),
    written: values,
    ...termination(values, referenceOhms),
    bandwidthHz: values.bandwidth?.value ?? 0.75 * symbolRate,
    noiseVolts: values.noise?.value ?? 0,
    ctle: readCtle(ctle),
    dfe: { taps: dfe?.taps ?? 0, limit: dfe?.limit?.value ?? Number.MAX_VALUE },
  };
}

function readCtle(written: ReceiverValues['ctle']): Receiver['ctle'] {
  if (written === undefined) return 'none';
  if (written === 'auto') return 'auto';
  const { 'dc-gain': gain, zero, poles } = written;
  if (!gain || !zero || !poles) return 'none'; // a key that could not be read has its own finding
  return { dcGainDb: gain.value, zeroHz: zero.value, polesHz: poles.map(({ value }) => value) };
}

/**
 * Longest run of equal bits. 8b10b's is 5; scrambled data have none, so the run that is met once in 1 / target BER bits counts:
 * a run of n bits has the probability 2^-n.
 */
export function longestRun(
  coding: 'scrambled' | '8b10b' | { readonly 'longest-run'?: number } | undefined,
  targetBer: number,
): number {
  if (coding === '8b10b') return 5;
  const declared = typeof coding === 'object' ? coding['longest-run'] : undefined;
  return declared ?? Math.ceil(-Math.log2(targetBer) - 1e-9);
}
