// Channels of a wanted size for the bench: alike enough to be fair, unlike enough that no cache answers for another.

/** A board with ten signal layers' worth of stackup. */
export const boardText = `lanewright: 1
materials:
  core: { dk: 3.4 @ 10 GHz, df: 0.004 @ 10 GHz }
foils:
  low: { conductivity: 58 MS/m, roughness: { rms: 0.5 um } }
stackups:
  main:
    - { copper: L1, thickness: 40 um, foil: low }
    - { dielectric: d1, material: core, thickness: 110 um }
    - { copper: L2, thickness: 17 um, foil: low, plane: true }
    - { dielectric: d2, material: core, thickness: 130 um }
    - { copper: L3, thickness: 17 um, foil: low }
    - { dielectric: d3, material: core, thickness: 140 um }
    - { copper: L4, thickness: 17 um, foil: low, plane: true }
    - { dielectric: d4, material: core, thickness: 200 um }
    - { copper: L5, thickness: 17 um, foil: low, plane: true }
    - { dielectric: d5, material: core, thickness: 130 um }
    - { copper: L6, thickness: 17 um, foil: low }
    - { dielectric: d6, material: core, thickness: 140 um }
    - { copper: L7, thickness: 17 um, foil: low, plane: true }
    - { dielectric: d7, material: core, thickness: 110 um }
    - { copper: L8, thickness: 40 um, foil: low }
drill-rules: { backdrill-minimum: 0.15 mm, backdrill-tolerance: 0.1 mm }
`;

/**
 * @param elements how many; traces and vias in turn, a package at each end, one capacitor
 * @param vary changes lengths a little: another channel to every cache
 * @param shortest length of the shortest trace in mm: decides how fine the grid is
 * @param widths how many different cross-sections the traces use
 */
export function channelText({
  elements,
  vary = 0,
  widths = 1,
  board = 'board.parts.yaml',
  rate = '25.78125 Gb/s',
  ctle = 'auto',
  shortest = 8,
}) {
  const path = [];
  const inner = elements - 3;
  path.push(
    '  - package: leave\n    length: 9 mm\n    impedance: 96 ohm\n    delay: 6.8 ps/mm\n    loss: 0.08 dB/mm @ 12.9 GHz',
  );
  const layers = ['L1', 'L3', 'L1', 'L6'];
  let turn = 0;
  for (let i = 0; i < inner; i++) {
    if (i % 2 === 0) {
      const width = 100 + ((turn + vary) % widths) * 2;
      path.push(
        `  - trace: run-${i}\n    stackup: board.main\n    layer: ${layers[turn % 4]}\n    length: ${(shortest + (i % 5) + (vary % 997) * 0.001).toFixed(3)} mm\n    width: ${width} um\n    gap: ${width + 40} um`,
      );
      turn++;
    } else if (i < inner - 1) {
      path.push(
        `  - via: hop-${i}\n    stackup: board.main\n    drill: 0.2 mm\n    antipad: 0.7 mm\n    pitch: 0.8 mm\n    backdrill: { bottom: 0.2 mm ± 0.05 mm }`,
      );
    } else {
      path.push(`  - capacitor: spare-${i}\n    value: 100 nF`);
    }
  }
  path.push('  - capacitor: coupling\n    value: 220 nF\n    esl: 0.2 nH\n    pad-capacitance: 20 fF');
  path.push(
    '  - package: arrive\n    length: 9 mm\n    impedance: 96 ohm\n    delay: 6.8 ps/mm\n    loss: 0.08 dB/mm @ 12.9 GHz',
  );
  return `lanewright: 1
title: Bench ${vary}
line-rate: ${rate}
use:
  board: ${board}
transmitter:
  swing: 800 mV
  ffe: { pre: [-0.06], main: 0.82, post: [-0.12] }
  random-jitter: 0.25 ps
  deterministic-jitter: 2 ps
receiver:
  noise: 1 mV
  ctle: ${ctle}
  dfe: { taps: 4, limit: 0.4 }
path:
${path.join('\n')}
limits:
  - insertion-loss: whole
    max: 30 dB @ nyquist
  - eye: main
    height: 10 mV
    width: 0.1 UI
`;
}
