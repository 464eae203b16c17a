import type { FileContent, FilePath } from '../text/types';

export const CHANNEL = 'lane.channel.yaml';
export const BOARD = 'board.parts.yaml';
export const OTHER = 'other.parts.yaml';
export const CONFIG = 'lanewright.config.yaml';

/** A short, good channel at 10 Gb/s: nothing is wrong with it, so that what an example lays over it is. */
const channel = `lanewright: 1
title: Rule example
line-rate: 10 Gb/s
use: { board: board.parts.yaml, other: other.parts.yaml }
transmitter: { swing: 800 mV, rise-time: 20 ps }
receiver: { noise: 1 mV }
path:
  - { package: chip, length: 10 mm, impedance: 100 ohm, delay: 6.5 ps/mm, loss: 0.05 dB/mm @ 5 GHz }
  - { trace: breakout, stackup: board.main, layer: L1, length: 10 mm, impedance: 100 ohm }
  - { capacitor: coupling, value: 100 nF }
  - { trace: approach, stackup: board.main, layer: L1, length: 5 mm, impedance: 100 ohm }
  - { via: dive, part: board.hole }
  - { trace: run, stackup: board.main, layer: L3, length: 100 mm, impedance: 100 ohm }
  - { via: rise, part: board.hole, to: L1 }
  - { connector: mate, delay: 50 ps, impedance: 100 ohm, loss: 0.3 dB @ 5 GHz }
  - { package: landing, part: other.landing }
limits:
  - { insertion-loss: whole, max: 12 dB @ nyquist }
  - { return-loss: match, band: 50 MHz to 5 GHz, min: 5 dB }
  - { eye: main, height: 40 mV, width: 0.3 UI }
`;

/** A board of 4 mm with a hole that is drilled back, and one that is not. */
const board = `lanewright: 1
materials:
  core: { dk: 3.4 @ 10 GHz, df: 0.003 @ 10 GHz }
stackups:
  main:
    - { copper: L1, thickness: 35 um }
    - { dielectric: d1, material: core, thickness: 100 um }
    - { copper: L2, thickness: 17 um, plane: true }
    - { dielectric: d2, material: core, thickness: 150 um }
    - { copper: L3, thickness: 17 um }
    - { dielectric: d3, material: core, thickness: 150 um }
    - { copper: L4, thickness: 17 um, plane: true }
    - { dielectric: d4, material: core, thickness: 3.3 mm }
    - { copper: L5, thickness: 17 um, plane: true }
    - { dielectric: d5, material: core, thickness: 100 um }
    - { copper: L6, thickness: 35 um }
drill-rules: { backdrill-minimum: 0.15 mm, backdrill-tolerance: 0.1 mm }
parts:
  hole: { kind: via, stackup: main, drill: 0.2 mm, antipad: 0.7 mm, pitch: 0.8 mm, backdrill: { bottom: 0.3 mm ± 0.1 mm } }
  long-hole: { kind: via, stackup: main, drill: 0.2 mm, antipad: 0.7 mm, pitch: 0.8 mm }
  mate: { kind: connector, delay: 40 ps, impedance: 95 ohm, loss: 0.2 dB @ 5 GHz }
`;

const other = `lanewright: 1
parts:
  mate: { kind: connector, delay: 50 ps, impedance: 100 ohm, loss: 0.3 dB @ 5 GHz }
  landing: { kind: package, length: 3 mm, impedance: 100 ohm, delay: 6.5 ps/mm, loss: 0.05 dB/mm @ 5 GHz }
`;

export interface Sweep {
  readonly toHz?: number;
  readonly gain?: number;
  readonly backwardGain?: number;
  readonly delaySeconds?: number;
}

/** An invented connector as a file: two uncoupled, matched legs; ports 1 and 2 are one leg, 3 and 4 the other. */
export function throughFile({ toHz = 40e9, gain = 0.98, backwardGain = gain, delaySeconds = 40e-12 }: Sweep): string {
  const lines = ['! invented', '# Hz S MA R 50'];
  for (let f = 50e6; f <= toHz; f += 50e6) {
    const degrees = -360 * f * delaySeconds;
    const wave = (size: number) => `${size.toFixed(6)} ${(((degrees + 180) % 360) - 180).toFixed(4)}`;
    const none = '0 0';
    const [back, on] = [wave(backwardGain), wave(gain)];
    lines.push(`${f} ${none} ${back} ${none} ${none}`, `${on} ${none} ${none} ${none}`);
    lines.push(`${none} ${none} ${none} ${back}`, `${none} ${none} ${on} ${none}`);
  }
  return `${lines.join('\n')}\n`;
}

const text = (value: string): FileContent => ({ kind: 'text', text: value });

/** The files beside an example's channel; what is not here is missing, what leads out is refused. */
export const files: ReadonlyMap<FilePath, FileContent> = new Map([
  [CHANNEL, text(channel)],
  [BOARD, text(board)],
  [OTHER, text(other)],
  [CONFIG, text('lanewright: 1\n')],
  ['thru.s4p', text(throughFile({}))],
  ['short.s4p', text(throughFile({ toHz: 4e9 }))],
  ['gain.s4p', text(throughFile({ gain: 1.05 }))],
  ['one-way.s4p', text(throughFile({ backwardGain: 0.5 }))],
  ['early.s4p', text(throughFile({ delaySeconds: -40e-12 }))],
  ['broken.s4p', text('# GHz S RI R 50\n1 0 0 1 0\n')],
]);
