import { type Static, Type } from '@sinclair/typebox';
import { channelProperties } from './channel';
import { declares, mapping, named, type Quantity, quantity, refers } from './quantity';

const dk = quantity('ratio', {
  description: 'Dielectric constant; without `@` it holds at 10 GHz.',
  examples: ['3.37 @ 10 GHz'],
  at: 'optional',
  valid: [1, 100],
  plausible: [1, 15],
});

export const material = mapping(
  'material',
  'A dielectric.',
  {
    dk: Type.Unsafe<Quantity | { through: Quantity; 'in-plane': Quantity }>({
      anyOf: [
        dk,
        mapping(
          'dk',
          'Through the laminate and in its plane.',
          { through: dk, 'in-plane': dk },
          { required: ['through', 'in-plane'] },
        ),
      ],
      description:
        'Dielectric constant: one for all directions, or through and in the plane. Traces feel `through`, barrels `in-plane`.',
      examples: ['3.37 @ 10 GHz', '{ through: 3.37 @ 10 GHz, in-plane: 3.6 @ 10 GHz }'],
    }),
    df: Type.Optional(
      quantity('ratio', {
        description: 'Loss tangent; without `@` it holds at 10 GHz.',
        examples: ['0.004 @ 10 GHz'],
        at: 'optional',
        valid: [0, 0.2],
        plausible: [0, 0.1],
        default: '0',
      }),
    ),
  },
  { required: ['dk'] },
);

const huray = mapping(
  'huray',
  'Spheres on a flat surface.',
  {
    radius: quantity('length', {
      description: 'Radius of the spheres.',
      examples: ['0.5 um'],
      valid: [1e-9, 1e-4],
      plausible: [5e-8, 5e-6],
    }),
    ratio: quantity('ratio', {
      description: 'Surface of the spheres over the flat surface they stand on.',
      examples: ['2.1'],
      valid: [0, 100],
      plausible: [0, 20],
    }),
  },
  { required: ['radius', 'ratio'], examples: ['{ radius: 0.5 um, ratio: 2.1 }'] },
);

export const roughness = mapping(
  'roughness',
  'One of: `rms` (Hammerstad’s factor), `rz` (a stack of spheres of that height) or `huray`.',
  {
    rms: Type.Optional(
      quantity('length', {
        description: 'Root mean square height.',
        examples: ['0.6 um'],
        valid: [0, 1e-3],
        plausible: [0, 1e-5],
      }),
    ),
    rz: Type.Optional(
      quantity('length', {
        description: 'Ten-point height.',
        examples: ['3 um'],
        valid: [0, 1e-3],
        plausible: [0, 2e-5],
      }),
    ),
    huray: Type.Optional(huray),
  },
  { minProperties: 1, maxProperties: 1, examples: ['{ rms: 0.6 um }'] },
);

export const foil = mapping('foil', 'A copper foil.', {
  conductivity: Type.Optional(
    quantity('conductivity', {
      description: 'Conductivity at 20 degC.',
      examples: ['58 MS/m'],
      valid: [1, 1e9],
      plausible: [1e6, 6.5e7],
      default: '58 MS/m',
    }),
  ),
  roughness: Type.Optional(roughness),
});

const thickness = quantity('length', {
  description: 'Thickness.',
  examples: ['95 um'],
  valid: [1e-7, 0.1],
  plausible: [3e-6, 5e-3],
});

/** A row of a stackup; its first key says which. */
export const stackupRowSchemas = {
  copper: mapping(
    'copper',
    'A copper layer: signals, or a plane.',
    {
      copper: declares('layer', 'Its name.'),
      thickness,
      foil: Type.Optional(refers('foil', 'Its foil.', { examples: ['low-profile'], default: 'smooth copper' })),
      plane: Type.Optional(
        Type.Boolean({ description: 'A plane that carries no signal.', examples: ['true'], 'x-default': 'false' }),
      ),
    },
    { required: ['copper', 'thickness'] },
  ),
  dielectric: mapping(
    'dielectric',
    'A dielectric layer; two in a row are allowed.',
    {
      dielectric: declares('layer', 'Its name.'),
      material: refers('material', 'Its material.', { examples: ['core-m6'] }),
      thickness,
    },
    { required: ['dielectric', 'material', 'thickness'] },
  ),
  mask: mapping(
    'mask',
    'Solder mask over an outer layer.',
    {
      mask: Type.String({ description: 'Its side: `top` or `bottom`.', enum: ['top', 'bottom'] }),
      material: refers('material', 'Its material.', { examples: ['mask'] }),
      thickness,
    },
    { required: ['mask', 'material', 'thickness'] },
  ),
};
export type StackupRowKind = keyof typeof stackupRowSchemas;
export type StackupRowValues = { [K in StackupRowKind]: Static<(typeof stackupRowSchemas)[K]> };

export const drillRules = mapping('drill-rules', 'What the fabricator can drill.', {
  'backdrill-minimum': Type.Optional(
    quantity('length', {
      description: 'Least that is left of a drilled barrel.',
      examples: ['0.15 mm'],
      tolerance: false,
      valid: [0, 0.01],
      plausible: [2e-5, 1e-3],
    }),
  ),
  'backdrill-tolerance': Type.Optional(
    quantity('length', {
      description: 'Tolerance of that remainder, either way.',
      examples: ['0.1 mm'],
      tolerance: false,
      valid: [0, 0.01],
      plausible: [1e-5, 5e-4],
    }),
  ),
});

/** `stackups` rows and `parts` entries are validated by the schema of their kind. */
export const parts = mapping(
  'parts',
  'What several channels share: materials, foils, stackups, drill rules, parts.',
  {
    lanewright: channelProperties.lanewright,
    title: Type.Optional(Type.String({ description: 'What this file holds.' })),
    use: channelProperties.use,
    materials: Type.Optional(named('material', 'Dielectrics by name.', material)),
    foils: Type.Optional(named('foil', 'Copper foils by name.', foil)),
    stackups: Type.Optional(
      named(
        'stackup',
        'Stackups by name, top to bottom; copper and dielectric alternate, two dielectrics in a row are allowed.',
        Type.Array(Type.Any(), { description: 'Its layers, top to bottom.', 'x-entries': 'stackup-rows' }),
      ),
    ),
    'drill-rules': Type.Optional(drillRules),
    parts: Type.Optional(
      named('part', 'Shared parts by name: `kind` and the keys of that kind.', Type.Any(), { 'x-entries': 'parts' }),
    ),
  },
  { required: ['lanewright'] },
);

export type MaterialValues = Static<typeof material>;
export type FoilValues = Static<typeof foil>;
export type DrillRulesValues = Static<typeof drillRules>;
export type PartsValues = Static<typeof parts>;
