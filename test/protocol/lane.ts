/** An invented lane over an invented board: complete, without a finding; tests spoil it. */
export const PARTS = `lanewright: 1
materials:
  core: { dk: 3.4 @ 10 GHz, df: 0.004 @ 10 GHz }
foils:
  smooth: { conductivity: 58 MS/m, roughness: { rms: 0.4 um } }
stackups:
  main:
    - { copper: L1, thickness: 40 um, foil: smooth }
    - { dielectric: d1, material: core, thickness: 110 um }
    - { copper: L2, thickness: 17 um, foil: smooth, plane: true }
    - { dielectric: d2, material: core, thickness: 200 um }
    - { copper: L3, thickness: 17 um, foil: smooth }
    - { dielectric: d3, material: core, thickness: 200 um }
    - { copper: L4, thickness: 17 um, foil: smooth, plane: true }
    - { dielectric: d4, material: core, thickness: 110 um }
    - { copper: L5, thickness: 40 um, foil: smooth }
drill-rules:
  backdrill-minimum: 0.15 mm
  backdrill-tolerance: 0.05 mm
`;

export const LANE = `lanewright: 1
title: Camera to sorter
line-rate: 10 Gb/s
use:
  board: boards/main.parts.yaml
path:
  - trace: start
    stackup: board.main
    layer: L1
    length: 20 mm
    impedance: 100 ohm ± 8%
  - via: dive
    stackup: board.main
    drill: 0.2 mm
    antipad: 0.7 mm
    pitch: 0.8 mm
  - trace: run
    stackup: board.main
    layer: L3
    length: 60 mm
    impedance: 100 ohm ± 8%
limits:
  - insertion-loss: whole
    max: 12 dB @ nyquist
`;
