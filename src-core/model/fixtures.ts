import type { Inputs } from '../analysis';
import { fileKind, parseCached } from '../inputs';
import type { ParsedFile } from '../text/parsed';
import type { FileContent, FilePath } from '../text/types';
import { buildModel } from './build';
import type { Model } from './types';

/** A complete channel without any finding of the text or the model: an invented fruit-sorting machine's camera lane. */
export const CHANNEL_FILE = 'lanes/camera.channel.yaml';
export const PARTS_FILE = 'boards/sled.parts.yaml';

export const channelText = `lanewright: 1
title: Camera sled to sorting controller, lane 0
line-rate: 10.3125 Gb/s
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

transmitter:
  swing: 800 mV
  rise-time: 24 ps
  impedance: 100 ohm ± 10%
  capacitance: 0.12 pF
  ffe: { pre: [-0.06], main: 0.82, post: [-0.12] }
  random-jitter: 0.25 ps
  deterministic-jitter: 2 ps
receiver:
  impedance: 100 ohm ± 10%
  capacitance: 0.15 pF
  bandwidth: 7.7 GHz
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
  - via: dive # from, to: those of the neighbouring traces
    part: sled.through-via
    backdrill: { bottom: 0.3 mm ± 0.1 mm }
  - trace: main-run
    stackup: sled.main
    layer: L3
    length: 60 mm ± 2 mm
    impedance: 100 ohm ± 8%
    skew: 1.5 ps
    budget: 9 dB @ nyquist
    owner: sled board
  - via: rise
    part: sled.through-via
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
    part: sled.sled-mate
  - cable: twinax
    length: 0.5 m
    impedance: 100 ohm
    delay: 4.5 ns/m
    loss: [1.6 dB/m @ 1.5 GHz, 5.1 dB/m @ 12.9 GHz]

limits:
  - insertion-loss: ball-to-ball
    between: [breakout, twinax]
    max: 24 dB @ nyquist
  - return-loss: receiver-side
    at: receiver
    band: 50 MHz to 5 GHz
    min: 6 dB
  - eye: main
    height: 40 mV
    width: 0.35 UI
waivers:
  - rule: return-loss
    at: receiver-side
    up-to: 5.1 dB
    until: 2027-03-31
    by: connector team
    reason: replaced in revision C
`;

export const partsText = `lanewright: 1
materials:
  core: { dk: { through: 3.37 @ 10 GHz, in-plane: 3.6 @ 10 GHz }, df: 0.004 @ 10 GHz }
  mask: { dk: 3.5, df: 0.025 }
foils:
  low-profile: { conductivity: 58 MS/m, roughness: { rms: 0.6 um } }
stackups:
  main:
    - { mask: top, material: mask, thickness: 20 um }
    - { copper: L1, thickness: 45 um, foil: low-profile }
    - { dielectric: d1, material: core, thickness: 95 um }
    - { copper: L2, thickness: 17 um, foil: low-profile, plane: true }
    - { dielectric: d2, material: core, thickness: 150 um }
    - { copper: L3, thickness: 17 um, foil: low-profile }
    - { dielectric: d3, material: core, thickness: 150 um }
    - { copper: L4, thickness: 17 um, foil: low-profile, plane: true }
    - { dielectric: d4, material: core, thickness: 500 um }
    - { dielectric: d5, material: core, thickness: 500 um }
    - { copper: L5, thickness: 17 um, foil: low-profile, plane: true }
    - { dielectric: d6, material: core, thickness: 95 um }
    - { copper: L6, thickness: 45 um, foil: low-profile }
    - { mask: bottom, material: mask, thickness: 20 um }
drill-rules:
  backdrill-minimum: 0.15 mm
  backdrill-tolerance: 0.1 mm
parts:
  through-via:
    kind: via
    stackup: main
    drill: 0.25 mm
    pad: 0.45 mm
    antipad: 0.75 mm
    pitch: 0.9 mm
  sled-mate:
    kind: connector
    delay: 60 ps
    impedance: 95 ohm
    loss: 0.6 dB @ 12.9 GHz
    capacitance: 40 fF
`;

/** The inputs of texts by path, the first one analysed; for tests. */
export function inputsOf(texts: Readonly<Record<FilePath, string>>, today = '2026-12-01'): Inputs {
  const files = new Map<FilePath, FileContent>(
    Object.entries(texts).map(([file, text]) => [file, { kind: 'text', text }]),
  );
  const [file] = files.keys();
  const configFile = [...files.keys()].find((path) => fileKind(path) === 'config');
  return { file, files, today, ...(configFile !== undefined && configFile !== file && { configFile }) };
}

export function parsedOf({ files }: Inputs): ReadonlyMap<FilePath, ParsedFile> {
  const parsed = new Map<FilePath, ParsedFile>();
  for (const [file, content] of files) {
    if (content.kind === 'text' && fileKind(file) !== 'touchstone') parsed.set(file, parseCached(file, content.text));
  }
  return parsed;
}

/** The example channel with its parts, or with other texts of the same names, and more files. */
export function exampleTexts({
  channel = channelText,
  parts = partsText,
  ...more
}: { channel?: string; parts?: string } & Record<FilePath, string> = {}) {
  return { [CHANNEL_FILE]: channel, [PARTS_FILE]: parts, ...more };
}

/** Model and texts of an example, for tests of later stages. */
export function exampleModel(texts: Readonly<Record<FilePath, string>> = exampleTexts()): {
  inputs: Inputs;
  parsed: ReadonlyMap<FilePath, ParsedFile>;
  model: Model;
} {
  const inputs = inputsOf(texts);
  const parsed = parsedOf(inputs);
  return { inputs, parsed, model: buildModel(inputs, parsed) };
}
