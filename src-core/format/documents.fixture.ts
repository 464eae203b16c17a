/** Every key of the format at least once, as a person would write it. */
export const channelText = `lanewright: 1
title: Camera sled to sorting controller, lane 0
line-rate: 25.78125 Gb/s
modulation: NRZ
target-ber: 1e-12
coding: scrambled
reference-impedance: 100 ohm
conditions:
  temperature: 60 degC
owners:
  sled board: 12 dB @ nyquist

use:
  sled: ../boards/sled.parts.yaml
  ctrl: ../boards/controller.parts.yaml

transmitter:
  swing: 800 mV
  rise-time: 12 ps
  impedance: 100 ohm ± 10%
  capacitance: 0.12 pF
  ffe: { pre: [-0.06], main: 0.82, post: [-0.12] }
  random-jitter: 0.25 ps
  deterministic-jitter: 2 ps
receiver:
  impedance: 100 ohm ± 10%
  capacitance: 0.15 pF
  bandwidth: 19.3 GHz
  noise: 1.2 mV
  ctle: auto
  dfe: { taps: 5, limit: 0.4 }

path:
  - package: camera-serdes
    length: 14 mm
    impedance: 95 ohm
    delay: 6.9 ps/mm
    loss: 0.11 dB/mm @ 12.9 GHz
  - trace: breakout
    stackup: sled.main
    layer: L1
    length: 12 mm
    width: 110 um
    gap: 140 um
  - via: dive
    stackup: sled.main
    drill: 0.25 mm
    pad: 0.45 mm
    antipad: 0.75 mm
    pitch: 0.9 mm
    backdrill: { bottom: 0.3 mm ± 0.1 mm }
  - trace: main-run
    stackup: sled.main
    layer: L6
    length: 168 mm ± 2 mm
    impedance: 100 ohm ± 8%
    skew: 1.5 ps
    budget: 9 dB @ nyquist
    owner: sled board
  - via: rise
    stackup: sled.main
    drill: 0.25 mm
    antipad: 0.75 mm
    pitch: 0.9 mm
    to: L1
  - capacitor: coupling
    value: 100 nF
    esl: 0.3 nH
    esr: 20 mohm
    pad-capacitance: 30 fF
  - stub: test-point
    length: 0.9 mm
    impedance: 50 ohm
    dk: 3.6
    end-capacitance: 20 fF
  - connector: sled-mate
    part: ctrl.mezz-row-c
  - cable: twinax
    length: 0.5 m
    impedance: 100 ohm
    delay: 4.5 ns/m
    loss: [1.6 dB/m @ 1.5 GHz, 5.1 dB/m @ 12.9 GHz]
  - connector: sorter-mate
    delay: 60 ps
    impedance: 95 ohm
    loss: 0.6 dB @ 12.9 GHz
    capacitance: 40 fF
  - block: sorter-front-end
    touchstone: ../models/front-end.s4p
    ports: { enter: [1, 3], leave: [2, 4] }

limits:
  - insertion-loss: ball-to-ball
    between: [breakout, twinax]
    max: 24 dB @ nyquist
  - insertion-loss: mask
    max: [2 dB @ 50 MHz, 9 dB @ 4 GHz, 24 dB @ 12.9 GHz]
  - return-loss: receiver-side
    at: receiver
    band: 50 MHz to 12 GHz
    min: 10 dB
  - eye: main
    height: 40 mV
    width: 0.35 UI
waivers:
  - rule: return-loss
    at: receiver-side
    up-to: 9.1 dB
    until: 2027-03-31
    by: connector team
    reason: replaced in revision C
`;

export const partsText = `lanewright: 1
materials:
  core-m6: { dk: 3.37 @ 10 GHz, df: 0.004 @ 10 GHz }
  mask:    { dk: 3.5, df: 0.025 }
foils:
  low-profile: { conductivity: 58 MS/m, roughness: { rms: 0.6 um } }
stackups:
  main:
    - { mask: top, material: mask, thickness: 20 um }
    - { copper: L1, thickness: 45 um, foil: low-profile }
    - { dielectric: d1, material: core-m6, thickness: 95 um }
    - { copper: L2, thickness: 17 um, foil: low-profile, plane: true }
drill-rules:
  backdrill-minimum: 0.15 mm
  backdrill-tolerance: 0.1 mm
parts:
  mezz-row-c:
    kind: connector
    touchstone: ../models/mezzanine.s4p
    ports: { enter: [1, 3], leave: [2, 4] }
`;

export const configText = `lanewright: 1
rules:
  stub-resonance: { severity: error, multiple: 4 }
  unused-part: off
`;
