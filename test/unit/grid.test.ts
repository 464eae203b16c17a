import { describe, expect, test } from 'vitest';
import { analyse } from '../../src-core/analyse';
import { networkAt } from '../../src-core/cascade/network-at';
import { channelText, exampleTexts, inputsOf } from '../../src-core/model/fixtures';
import { gridOf } from '../../src-core/networks/grid';
import { computeTime } from '../../src-core/time/compute-time';
import type { Time } from '../../src-core/time/types';

const header = 'lanewright: 1\nline-rate: 25.78125 Gb/s\n';
const channels: readonly [string, string][] = [
  ['a whole channel of every kind', channelText],
  [
    'the same at 25.78125 Gb/s',
    channelText.replace('10.3125', '25.78125').replace('24 ps', '10 ps').replace('7.7 GHz', '19.3 GHz'),
  ],
  [
    'a mismatched cable without much loss',
    `${header}path:\n  - cable: c\n    length: 1 m\n    impedance: 80 ohm\n    delay: 5 ns/m\n    loss: 2 dB/m @ 5 GHz\n`,
  ],
  [
    'a long line of skin loss',
    `${header}path:\n  - cable: c\n    length: 3 m\n    impedance: 100 ohm\n    delay: 4.5 ns/m\n    loss: 6 dB/m @ 12.9 GHz\n    skin-share: 1\n`,
  ],
  [
    'a stub between two lines',
    `${header}path:\n  - trace: a\n    length: 90 mm\n    impedance: 95 ohm\n    delay: 6.6 ps/mm\n    loss: 0.03 dB/mm @ 12.9 GHz\n  - stub: s\n    length: 2 mm\n    impedance: 50 ohm\n    dk: 3.6\n  - trace: b\n    length: 70 mm\n    impedance: 105 ohm\n    delay: 6.6 ps/mm\n    loss: 0.03 dB/mm @ 12.9 GHz\n`,
  ],
  [
    'a sharp edge into a wide receiver',
    `${header}transmitter: { swing: 1 V, rise-time: 3 ps }\nreceiver: { bandwidth: 60 GHz }\npath:\n  - trace: a\n    length: 20 mm\n    impedance: 90 ohm\n    delay: 6.6 ps/mm\n    loss: 0.02 dB/mm @ 12.9 GHz\n`,
  ],
];

/** 128 cursors at whole UI around an instant. */
const cursorsAt = ({ pulse, samplesPerUi }: Time, ui: number) =>
  Array.from(
    { length: 128 },
    (_, m) => pulse[(Math.round((ui + m - 24) * samplesPerUi) + pulse.length) % pulse.length],
  );

const peakOf = ({ pulse, samplesPerUi }: Time) => pulse.indexOf(pulse.reduce((a, b) => Math.max(a, b))) / samplesPerUi;

describe('doubling either end of the grid moves no cursor by more than 0.2 % of the main one', () => {
  test.each(channels)('%s', (_, channel) => {
    const { model, networks, time } = analyse(inputsOf(exampleTexts({ channel })), undefined, { until: 'time' });
    const { k, j, tooCoarse } = networks!.grid;
    expect(tooCoarse).toBeUndefined();
    const peak = peakOf(time!);
    const cursors = cursorsAt(time!, peak);
    const main = Math.max(...cursors);
    for (const [finer, wider] of [
      [1, 0],
      [0, 1],
    ]) {
      // biome-ignore format: a table
      const grid = gridOf(model.symbolRate, k + finer, j + wider);
      const doubled = cursorsAt(computeTime(model, { total: networkAt(networks!, grid.frequencies) }, { grid }), peak);
      const moved = Math.max(...doubled.map((value, i) => Math.abs(value - cursors[i]))) / main;
      expect(moved).toBeLessThan(0.002);
    }
  });
});
