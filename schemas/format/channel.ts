import { type Static, Type } from '@sinclair/typebox';
import { mapping, named, type Quantity, quantity, refers } from './quantity';

const version = Type.Integer({ description: 'Format version.', examples: [1] });

const ffe = mapping(
  'ffe',
  'Feed-forward equaliser of the transmitter; taps multiply the swing as written.',
  {
    pre: Type.Optional(
      Type.Array(Type.Number(), {
        description: 'Taps before the main one, nearest first.',
        examples: ['[-0.06]'],
        maxItems: 8,
      }),
    ),
    main: Type.Optional(Type.Number({ description: 'The main tap.', examples: [0.82], 'x-default': '1' })),
    post: Type.Optional(
      Type.Array(Type.Number(), {
        description: 'Taps after the main one, nearest first.',
        examples: ['[-0.12]'],
        maxItems: 16,
      }),
    ),
  },
  { examples: ['{ pre: [-0.06], main: 0.82, post: [-0.12] }'] },
);

const ctle = mapping(
  'ctle',
  'Continuous-time equaliser with one zero and two poles, gain as in IEEE 802.3 Annex 93A.',
  {
    'dc-gain': quantity('loss', {
      description: 'Gain at DC, negative.',
      examples: ['-6 dB'],
      tolerance: false,
      valid: [-40, 20],
      plausible: [-20, 0],
    }),
    zero: quantity('frequency', {
      description: 'Where the lift begins.',
      examples: ['6.45 GHz'],
      tolerance: false,
      valid: [1, 1e13],
    }),
    poles: Type.Unsafe<readonly Quantity[]>({
      type: 'array',
      items: { type: 'string' },
      minItems: 1,
      maxItems: 4,
      description: 'Its poles: the first takes the zero’s lift back, the second ends the band.',
      examples: ['[6.45 GHz, 25.8 GHz]'],
      'x-quantity': { dimensions: ['frequency'], at: 'never', tolerance: false, valid: [1, 1e13], list: true },
    }),
  },
  { required: ['dc-gain', 'zero', 'poles'] },
);

const dfe = mapping(
  'dfe',
  'Decision-feedback equaliser: taps are solved, each within the limit.',
  {
    taps: Type.Integer({ description: 'Number of taps.', examples: [5], minimum: 0, maximum: 64 }),
    limit: Type.Optional(
      quantity('ratio', {
        description: 'Most of each tap, a share of the main cursor.',
        examples: ['0.4'],
        tolerance: false,
        valid: [0, 10],
        plausible: [0, 1],
        default: 'none',
      }),
    ),
  },
  { examples: ['{ taps: 5, limit: 0.4 }'] },
);

const termination = (end: string) => ({
  impedance: Type.Optional(
    quantity('impedance', {
      description: `Termination of the ${end}, differential.`,
      examples: ['100 ohm ± 10%'],
      valid: [1e-3, 1e6],
      plausible: [20, 250],
      default: 'reference-impedance',
    }),
  ),
  'common-impedance': Type.Optional(
    quantity('impedance', {
      description: `Common-mode termination of the ${end}.`,
      examples: ['25 ohm'],
      valid: [1e-3, 1e6],
      plausible: [5, 125],
      default: 'a quarter of the differential one',
    }),
  ),
  capacitance: Type.Optional(
    quantity('capacitance', {
      description: `Capacitance of each leg at the ${end}.`,
      examples: ['0.12 pF'],
      valid: [0, 1e-9],
      plausible: [0, 2e-12],
      default: '0',
    }),
  ),
});

export const transmitter = mapping('transmitter', 'What drives the path.', {
  swing: Type.Optional(
    quantity('voltage', {
      description: 'Peak to peak into a matched load, before the taps.',
      examples: ['800 mV'],
      valid: [1e-6, 1000],
      plausible: [0.05, 2.5],
    }),
  ),
  'rise-time': Type.Optional(
    quantity('time', {
      description: 'Rise time, 20 to 80 %.',
      examples: ['12 ps'],
      valid: [0, 1e-6],
      plausible: [1e-13, 1e-9],
      default: '0.25 UI',
    }),
  ),
  ...termination('transmitter'),
  ffe: Type.Optional(ffe),
  'random-jitter': Type.Optional(
    quantity('time', {
      description: 'Random jitter, rms.',
      examples: ['0.25 ps'],
      valid: [0, 1e-6],
      plausible: [0, 1e-10],
      default: '0',
    }),
  ),
  'deterministic-jitter': Type.Optional(
    quantity('time', {
      description: 'Deterministic jitter, peak to peak, dual Dirac.',
      examples: ['2 ps'],
      valid: [0, 1e-6],
      plausible: [0, 1e-9],
      default: '0',
    }),
  ),
});

export const receiver = mapping('receiver', 'What the path ends in.', {
  ...termination('receiver'),
  bandwidth: Type.Optional(
    quantity('frequency', {
      description: '−3 dB of its 4th-order Butterworth filter.',
      examples: ['19.3 GHz'],
      valid: [1, 1e13],
      plausible: [1e8, 2e11],
      default: '0.75 × symbol rate',
    }),
  ),
  noise: Type.Optional(
    quantity('voltage', {
      description: 'Noise, rms, at that filter’s output.',
      examples: ['1.2 mV'],
      valid: [0, 100],
      plausible: [0, 0.05],
      default: '0',
    }),
  ),
  ctle: Type.Optional(
    Type.Unsafe<'auto' | Static<typeof ctle>>({
      anyOf: [{ const: 'auto', description: 'DC gain chosen for the largest eye.' }, ctle],
      description: ctle.description,
      examples: ['auto', '{ dc-gain: -6 dB, zero: 6.45 GHz, poles: [6.45 GHz, 25.8 GHz] }'],
      'x-default': 'none',
    }),
  ),
  dfe: Type.Optional(dfe),
});

export const channelProperties = {
  lanewright: version,
  title: Type.Optional(
    Type.String({
      description: 'What this lane is.',
      'x-default': 'the file’s name',
      examples: ['Camera sled to controller, lane 0'],
    }),
  ),
  'line-rate': quantity('bitRate', {
    description: 'Line rate.',
    examples: ['25.78125 Gb/s'],
    tolerance: false,
    valid: [1, 1e13],
    plausible: [1e8, 2.5e11],
  }),
  modulation: Type.Optional(
    Type.Union([Type.Literal('NRZ'), Type.Literal('PAM4')], {
      description: 'Levels a symbol.',
      examples: ['NRZ'],
      'x-default': 'NRZ',
    }),
  ),
  'target-ber': Type.Optional(
    quantity('ratio', {
      description: 'Bit errors before correction at which the eye is judged.',
      examples: ['1e-12'],
      tolerance: false,
      valid: [1e-18, 0.1],
      plausible: [1e-18, 1e-2],
      default: '1e-12',
    }),
  ),
  coding: Type.Optional(
    Type.Unsafe<'scrambled' | '8b10b' | { 'longest-run': number }>({
      anyOf: [
        { const: 'scrambled' },
        { const: '8b10b' },
        mapping('coding', 'A coding with a known longest run.', {
          'longest-run': Type.Integer({
            minimum: 1,
            maximum: 100000,
            description: 'Longest run of equal bits.',
            examples: [66],
          }),
        }),
      ],
      description: 'Line coding, for the longest run of equal bits.',
      examples: ['scrambled', '8b10b', '{ longest-run: 66 }'],
      'x-default': 'scrambled',
    }),
  ),
  signalling: Type.Optional(
    Type.Union([Type.Literal('differential'), Type.Literal('single-ended')], {
      description: 'A pair, or one conductor.',
      examples: ['single-ended'],
      'x-default': 'differential',
    }),
  ),
  'reference-impedance': Type.Optional(
    quantity('impedance', {
      description: 'Reference of all scattering figures, differential; the common mode’s is a quarter of it.',
      examples: ['100 ohm'],
      tolerance: false,
      valid: [1e-3, 1e6],
      plausible: [20, 200],
      default: '100 ohm, single-ended 50 ohm',
    }),
  ),
  conditions: Type.Optional(
    mapping(
      'conditions',
      'Conditions under which the figures hold.',
      {
        temperature: Type.Optional(
          quantity('temperature', {
            description: 'Temperature of the copper.',
            examples: ['60 degC'],
            tolerance: false,
            valid: [-273, 1000],
            plausible: [-60, 160],
            default: '20 degC',
          }),
        ),
      },
      { examples: ['{ temperature: 60 degC }'] },
    ),
  ),
  owners: Type.Optional(
    named(
      undefined,
      'Who answers for what, and what they may spend.',
      quantity('loss', {
        description: 'Budget for all elements that name this owner.',
        examples: ['12 dB @ nyquist'],
        at: 'nyquist',
        tolerance: false,
        valid: [0, 500],
        plausible: [0.1, 100],
      }),
    ),
  ),
  use: Type.Optional(
    named(
      'use',
      'Parts files by a name of your own: `ctrl: controller.parts.yaml` makes `ctrl.main`.',
      refers('file', 'A parts file, relative to this file.', { examples: ['../boards/sled.parts.yaml'] }),
    ),
  ),
  transmitter: Type.Optional(transmitter),
  receiver: Type.Optional(receiver),
  path: Type.Array(Type.Any(), {
    description: 'The elements in order, transmitter to receiver. An entry’s first key is its kind.',
    'x-entries': 'elements',
  }),
  limits: Type.Optional(
    Type.Array(Type.Any(), {
      description: 'What must hold; each is named, so that it can be waived and reviewed.',
      'x-entries': 'limits',
    }),
  ),
  waivers: Type.Optional(
    Type.Array(Type.Any(), {
      description: 'Findings accepted in writing: the only way to accept one.',
      'x-entries': 'waivers',
    }),
  ),
};

/** `path`, `limits` and `waivers` are validated entry by entry, by the schema of the entry's kind, so that messages name the kind. */
export const channel = mapping('channel', 'A channel: one lane from transmitter to receiver.', channelProperties, {
  required: ['lanewright', 'line-rate', 'path'],
});

export type TransmitterValues = Static<typeof transmitter>;
export type ReceiverValues = Static<typeof receiver>;
export type ChannelValues = Static<typeof channel>;

/** Known for later versions; each has the finding `reserved-key` until it works. */
export const reservedKeys = [
  'sections',
  'section',
  'lanes',
  'variants',
  'aggressors',
  'costs',
  'measurements',
  'rates',
  'link',
  'group',
  'weave',
] as const;
