import { Type } from '@sinclair/typebox';
import { mapping, quantities, quantity, refers } from '../quantity';

/** Which file port stands where: transmitter side, receiver side; the positive leg first. One number each in a single-ended channel or where a two-port file is one leg. */
export const ports = mapping(
  'ports',
  'Which ports of the file stand on which side; the positive leg first.',
  {
    enter: Type.Array(Type.Integer({ minimum: 1 }), {
      minItems: 1,
      maxItems: 2,
      description: 'Ports on the transmitter side.',
      examples: ['[1, 3]'],
    }),
    leave: Type.Array(Type.Integer({ minimum: 1 }), {
      minItems: 0,
      maxItems: 2,
      description: 'Ports on the receiver side; empty for a one-port.',
      examples: ['[2, 4]'],
    }),
  },
  { examples: ['{ enter: [1, 3], leave: [2, 4] }'] },
);

/** Keys that an element of any kind takes. */
export const common = {
  part: Type.Optional(
    refers(
      'part',
      'A part of a parts file that gives the keys which are not written here; a key beside `part` overrides that key.',
      { examples: ['ctrl.mezz-row-c'] },
    ),
  ),
  touchstone: Type.Optional(
    refers('touchstone', 'A Touchstone file that takes the place of geometry and declared data.', {
      examples: ['../models/front-end.s4p'],
    }),
  ),
  ports: Type.Optional(ports),
  includes: Type.Optional(
    Type.Array(refers('element', 'A neighbour.'), {
      description:
        'Neighbours that the file already holds: they stay in the path, their network is a straight through.',
      examples: ['[rise]'],
    }),
  ),
  reversed: Type.Optional(
    Type.Boolean({ description: 'Placed the other way round.', examples: ['true'], 'x-default': 'false' }),
  ),
  active: Type.Optional(
    Type.Boolean({
      description: 'The file may give gain: lifts the demand to be passive.',
      examples: ['true'],
      'x-default': 'false',
    }),
  ),
  net: Type.Optional(
    Type.Array(Type.String(), {
      minItems: 1,
      maxItems: 2,
      description: 'Net names in the layout, the positive leg first.',
      examples: ['[CAM0_P, CAM0_N]'],
    }),
  ),
  refdes: Type.Optional(Type.String({ description: 'Reference designator on the board.', examples: ['J3'] })),
  note: Type.Optional(Type.String({ description: 'Free text, kept and shown.', examples: ['revision B moves it'] })),
  budget: Type.Optional(
    quantity('loss', {
      description: 'What this element may spend of its own insertion loss.',
      examples: ['9 dB @ nyquist'],
      at: 'nyquist',
      valid: [0, 200],
    }),
  ),
  owner: Type.Optional(
    refers('owner', 'Who answers for it; `owners` may hold a budget for all that name this owner.', {
      examples: ['sled board'],
    }),
  ),
};

const positive = [1e-9, 1e9] as const;

/** Keys of an element with length, without the length itself. */
export const line = {
  impedance: Type.Optional(
    quantity('impedance', {
      description: 'Characteristic impedance, differential (single-ended: of the one conductor).',
      examples: ['100 ohm ± 8%'],
      valid: positive,
      plausible: [10, 300],
    }),
  ),
  'common-impedance': Type.Optional(
    quantity('impedance', {
      description: 'Common-mode impedance, where the legs couple.',
      examples: ['27 ohm'],
      valid: positive,
      plausible: [5, 150],
      default: 'a quarter of the differential one',
    }),
  ),
  delay: Type.Optional(
    quantity('delayPerLength', {
      description: 'Delay per length.',
      examples: ['6.9 ps/mm'],
      valid: [1e-12, 1e-3],
      plausible: [3.3e-9, 12e-9],
    }),
  ),
  velocity: Type.Optional(
    quantity('velocity', {
      description: 'Phase velocity, in place of `delay`.',
      examples: ['0.68 c'],
      valid: [1, 299792458],
      plausible: [7e7, 299792458],
    }),
  ),
  dk: Type.Optional(
    quantity('ratio', {
      description: 'Effective dielectric constant, in place of `delay`; with `df` also the laminate loss.',
      examples: ['3.6 @ 10 GHz'],
      at: 'optional',
      valid: [1, 100],
      plausible: [1, 15],
    }),
  ),
  df: Type.Optional(
    quantity('ratio', {
      description: 'Loss tangent that belongs to `dk`.',
      examples: ['0.004 @ 10 GHz'],
      at: 'optional',
      valid: [0, 0.2],
      plausible: [0, 0.1],
      default: '0',
    }),
  ),
  loss: Type.Optional(
    quantities('lossPerLength', {
      description:
        'Loss of the matched line, which replaces copper and laminate: one point, split by `skin-share`, or a list fitted by a·√f + b·f.',
      examples: ['0.11 dB/mm @ 12.9 GHz', '[1.6 dB/m @ 1.5 GHz, 5.1 dB/m @ 12.9 GHz]'],
      at: 'required',
      valid: [0, 1e5],
      plausible: [0, 2000],
    }),
  ),
  'skin-share': Type.Optional(
    quantity('ratio', {
      description: 'Share of a one-point `loss` that follows √f; the rest follows f.',
      examples: ['0.6'],
      valid: [0, 1],
      tolerance: false,
      default: 'trace 0.5, package 0.5, cable 0.8, connector 0.5',
    }),
  ),
  skew: Type.Optional(
    quantity('time', {
      description: 'The second leg later by this time, or longer by this length.',
      examples: ['1.5 ps', '0.2 mm'],
      or: ['length'],
      valid: [-1e-6, 1e-6],
      plausible: [-100e-12, 100e-12],
    }),
  ),
};

export const length = quantity('length', {
  description: 'Length.',
  examples: ['168 mm ± 2 mm'],
  valid: [0, 1e6],
  plausible: [1e-6, 10],
});

/** Options of an element with length. */
export const segment = { not: { properties: { delay: {}, velocity: {} }, required: ['delay', 'velocity'] } };
