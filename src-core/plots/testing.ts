import type { PreviewData } from './preview-data';
import type { PlotDescription } from './types';

/** Invented pictures for tests of the drawing and of the page: smooth formulas, no channel behind them. */

const range = (count: number, value: (i: number) => number): number[] =>
  Array.from({ length: count }, (_, i) => value(i));

/** Loss that grows with √f and f, with one notch. */
export function lossPlot(points = 801): PlotDescription {
  const x = range(points, (i) => (i * 25.78125e9) / (points - 1));
  const loss = (f: number) => 1.6 * Math.sqrt(f / 1e9) + 0.62 * (f / 1e9) + 14 / (1 + ((f - 19.4e9) / 0.7e9) ** 2);
  return {
    name: 'insertion-loss',
    title: 'Insertion loss',
    x: { label: 'Frequency', unit: 'Hz', domain: [0, 25.78125e9] },
    y: { label: 'Insertion loss', unit: 'dB', domain: [0, 45], downwards: true },
    series: [
      { name: 'Whole path', x, y: x.map(loss) },
      { name: 'breakout to twinax', x, y: x.map((f) => 0.8 * loss(f)) },
    ],
    limits: [
      { name: 'ball-to-ball', x: [12.890625e9], y: [24], met: true, forbidden: 'above' },
      { name: 'mask', x: [5e7, 4e9, 12.9e9], y: [2, 5, 24], met: false, forbidden: 'above' },
    ],
    guides: [{ x: 12.890625e9, label: 'Nyquist' }],
    marks: [
      { x: 19.4e9, y: loss(19.4e9), label: 'dive 19.4 GHz', element: 'dive' },
      { x: 19.9e9, y: loss(19.9e9), label: 'rise 19.9 GHz', element: 'rise' },
    ],
    summary:
      '13.8 dB at Nyquist (12.9 GHz); resonances: dive 19.4 GHz, rise 19.9 GHz. Limits: ball-to-ball met, mask not met.',
  };
}

/** A response with cursors as stems. */
export function pulsePlot(): PlotDescription {
  const x = range(449, (i) => -4 + i / 32);
  const pulse = (t: number) =>
    t < -1 ? 0 : 0.35 * (t + 1) * Math.exp(1 - (t + 1)) - 0.02 * Math.sin(2 * t) * Math.exp(-((t - 6) ** 2));
  const places = range(11, (i) => i);
  return {
    name: 'single-bit',
    title: 'Single-bit response',
    x: { label: 'Time from the sampling instant', unit: 'UI', domain: [-4, 10] },
    y: { label: 'Voltage', unit: 'V', domain: [-0.05, 0.4] },
    series: [
      { name: 'Response at the slicer', x, y: x.map(pulse) },
      { name: 'Cursors before the DFE', x: places, y: places.map(pulse), draw: 'stems' },
      { name: 'Left after the DFE', x: [1, 2, 3], y: [0.03, 0.01, 0], draw: 'stems' },
    ],
    limits: [],
    marks: [{ x: 0, y: pulse(0), label: 'main cursor 350 mV' }],
    summary: 'Main cursor 350 mV; largest other cursor 258 mV at 1 UI.',
  };
}

/** Two levels with Gaussian noise and a crossing. */
export function eyeExample(columns = 128, rows = 160): PlotDescription {
  const values: number[] = [];
  for (let row = 0; row < rows; row++) {
    const volts = -0.2 + (0.4 * (row + 0.5)) / rows;
    for (let column = 0; column < columns; column++) {
      const level = 0.12 * Math.cos(Math.PI * ((column + 0.5) / columns - 0.5));
      const density = (at: number) => Math.exp(-(((volts - at) / 0.012) ** 2) / 2);
      values.push(Math.max(-18, Math.log10(density(level) + density(-level) + 1e-30) - 1.5));
    }
  }
  const phases = range(41, (i) => -0.3 + (0.6 * i) / 40);
  const edge = (phase: number) => 0.05 * Math.max(0, 1 - (phase / 0.3) ** 2);
  return {
    name: 'eye',
    title: 'Statistical eye',
    x: { label: 'Time from the sampling instant', unit: 'UI', domain: [-0.5, 0.5] },
    y: { label: 'Voltage at the slicer', unit: 'V', domain: [-0.2, 0.2] },
    series: [
      {
        name: 'Eye at 1e-12',
        x: [...phases, ...[...phases].reverse()],
        y: [...phases.map((p) => -edge(p)), ...[...phases].reverse().map(edge)],
        draw: 'loop',
      },
    ],
    limits: [{ name: 'main', x: [-0.175, 0, 0.175, 0], y: [0, 0.02, 0, -0.02], met: true, forbidden: 'inside' }],
    marks: [],
    heat: { columns, rows, x: [-0.5, 0.5], y: [-0.2, 0.2], values, floor: -18, unit: 'probability of a bin' },
    summary: 'Open by 100 mV and 0.6 UI at a bit error ratio of 1e-12. Limit: main met.',
  };
}

/** What a page gets; `names` go into every place where text of a file may stand. */
export function exampleData(names: { title?: string; element?: string; message?: string } = {}): PreviewData {
  const {
    title = 'Camera sled to sorting controller, lane 0',
    element = 'dive',
    message = 'The 1.1 mm stub of `dive` cuts a notch at 19.4 GHz.',
  } = names;
  const at = (index: number) => ({ file: 'lanes/rx0.channel.yaml', path: ['path', index] });
  const row = (name: string, kind: string, index: number, cells: string[], sofar: string, share: number) => {
    return {
      element: name,
      kind,
      at: at(index),
      cells,
      sofar,
      share,
      budget: index === 2 ? '6.1 dB of 9 dB at 12.9 GHz' : '',
      owner: index === 2 ? 'sled board' : '',
    };
  };
  const loss = lossPlot();
  return {
    file: 'lanes/rx0.channel.yaml',
    title,
    about: '25.8 Gb/s NRZ, differential, 100 ohm, Nyquist 12.9 GHz',
    verdict: { state: 'errors', text: 'fails 1 of 2 limits: mask: 6.1 dB of 5 dB at 4 GHz' },
    stale: false,
    figures: [
      {
        name: 'insertion-loss-at-nyquist',
        title: 'Insertion loss at Nyquist (SDD21)',
        text: '13.8 dB',
        note: 'at 12.9 GHz',
      },
      { name: 'eye-height', title: 'Eye height', text: '100 mV' },
    ],
    limits: [
      {
        name: 'ball-to-ball',
        kind: 'insertion-loss',
        met: true,
        text: '13.8 dB of 24 dB at 12.9 GHz',
        at: { file: 'lanes/rx0.channel.yaml', path: ['limits', 0] },
      },
      { name: 'mask', kind: 'insertion-loss', met: false, text: '6.1 dB of 5 dB at 4 GHz' },
    ],
    ledger: {
      columns: [
        { name: 'own-loss-at-nyquist', title: 'Own loss at Nyquist' },
        { name: 'delay', title: 'Delay' },
        { name: 'impedance', title: 'Impedance' },
      ],
      rows: [
        row('breakout', 'trace', 0, ['1.2 dB', '71 ps', '98.4 ohm'], '1.2 dB (5 %)', 0.05),
        row(element, 'via', 1, ['0.8 dB', '14 ps', '82 ohm'], '2 dB (8.3 %)', 0.083),
        row('main-run', 'trace', 2, ['6.1 dB', '1.1 ns', '100 ohm'], '8.1 dB (33.8 %)', 0.338),
        row('rise', 'via', 3, ['0.8 dB', '14 ps', ''], '8.9 dB (37.1 %)', 0.371),
      ],
      reflections: '0.4 dB',
      owners: [{ owner: 'sled board', text: '6.1 dB of 12 dB at 12.9 GHz', share: 0.508 }],
    },
    plots: [
      {
        name: loss.name,
        title: loss.title,
        description: {
          ...loss,
          marks: loss.marks.map((mark, i) => (i === 0 ? { ...mark, element, label: `${element} 19.4 GHz` } : mark)),
        },
      },
      { name: 'return-loss', title: 'Return loss', missing: 'This is not computed yet.' },
      { name: 'single-bit', title: 'Single-bit response', description: pulsePlot() },
      { name: 'eye', title: 'Statistical eye', description: eyeExample() },
    ],
    findings: [
      {
        severity: 'error',
        rule: 'insertion-loss',
        message: '6.1 dB at 4 GHz, at most 5 dB.',
        subject: 'mask',
        accepted: false,
        at: { file: 'lanes/rx0.channel.yaml', path: ['limits', 1] },
      },
      { severity: 'warning', rule: 'stub-resonance', message, subject: element, accepted: false, at: at(1) },
    ],
    moreFindings: 0,
  };
}
