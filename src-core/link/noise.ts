import { type Complex, type Ctle, ctleResponse, ratioOfDb, receiverFilter } from '../time/filters';

/** Step of ln f; the integrands are smooth in it, so that trapezoids converge faster than any power. */
const step = 0.05;

/**
 * Power that white noise keeps behind the receiver filter and a CTLE, as the three parts of g² · flat + g · cross + rising, g the DC gain as a ratio;
 * in hertz, that is per unit of one-sided density. Without a CTLE only `flat`: the noise bandwidth. Check value S-07.
 */
export function noiseBandwidths(bandwidthHz: number, ctle?: Omit<Ctle, 'dcGainDb'>) {
  const lowest = 1e-3 * Math.min(bandwidthHz, ctle?.zeroHz ?? bandwidthHz, ...(ctle?.polesHz ?? []));
  const filter: Complex = { re: 0, im: 0 };
  const flatPart: Complex = { re: 1, im: 0 };
  const risingPart: Complex = { re: 0, im: 0 };
  const sums = { flat: 0, cross: 0, rising: 0 };
  const add = (f: number, width: number) => {
    receiverFilter(f, bandwidthHz, filter);
    const power = (filter.re ** 2 + filter.im ** 2) * width;
    if (ctle) {
      ctleResponse(f, ctle, 1, 0, flatPart);
      ctleResponse(f, ctle, 0, 1, risingPart);
    }
    sums.flat += power * (flatPart.re ** 2 + flatPart.im ** 2);
    sums.cross += 2 * power * (flatPart.re * risingPart.re + flatPart.im * risingPart.im);
    sums.rising += power * (risingPart.re ** 2 + risingPart.im ** 2);
  };
  // below the lowest place all is as at 0 Hz; its own trapezoid is a half
  add(lowest, lowest * (1 + step / 2));
  for (let x = Math.log(lowest) + step; x < Math.log(30 * bandwidthHz); x += step) add(Math.exp(x), Math.exp(x) * step);
  return sums;
}

/**
 * rms noise at the slicer: declared at the receiver filter's output, white before it, shaped by the CTLE behind it.
 * The other way round of `noise`: what the CTLE makes of it.
 */
export function shapedNoise(noiseVolts: number, bandwidthHz: number, ctle?: Ctle): number {
  if (!ctle || noiseVolts === 0) return noiseVolts;
  const g = ratioOfDb(ctle.dcGainDb);
  const { flat, cross, rising } = noiseBandwidths(bandwidthHz, ctle);
  return noiseVolts * Math.sqrt((g * g * flat + g * cross + rising) / noiseBandwidths(bandwidthHz).flat);
}
