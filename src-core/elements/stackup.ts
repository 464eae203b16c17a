import type { Foil, Material, Stackup, StackupLayer } from '../model/types';
import { type DielectricPoint, jointPoint } from '../physics/laminate';
import type { Layering } from './computed-line';

type Copper = Extract<StackupLayer, { type: 'copper' }>;
type Dielectric = Extract<StackupLayer, { type: 'dielectric' }>;

/** A stretch of height in one material: a dielectric, or a copper layer whose place the resin around it fills. */
export interface Slice {
  readonly heightMeters: number;
  readonly material: Material;
}

/** What lies on one side of a trace, from it outwards, up to the nearest plane or the board's surface. */
export interface TraceSide {
  readonly slices: readonly Slice[];
  readonly plane?: Copper;
}

export const throughPoint = ({ dkThrough, df }: Material): DielectricPoint =>
  jointPoint(dkThrough.value, dkThrough.atHz, df.value, df.atHz);

export const inPlanePoint = ({ dkInPlane, df }: Material): DielectricPoint =>
  jointPoint(dkInPlane.value, dkInPlane.atHz, df.value, df.atHz);

/** The thicker of the dielectrics that touch a copper layer. */
export function neighbourMaterial(stackup: Stackup, index: number): Material | undefined {
  const around = [stackup.layers[index - 1], stackup.layers[index + 1]].filter(
    (layer): layer is Dielectric => layer?.type === 'dielectric',
  );
  return around.sort((a, b) => b.thicknessMeters - a.thicknessMeters)[0]?.material;
}

export const copperIndex = (stackup: Stackup, name: string | undefined) =>
  stackup.layers.findIndex((layer) => layer.type === 'copper' && layer.name === name);

/** A row as a slice of dielectric; undefined for mask, and for copper without dielectric beside it. */
export function sliceOf(stackup: Stackup, index: number): Slice | undefined {
  const layer = stackup.layers[index];
  if (layer.type === 'mask') return undefined;
  const material = layer.type === 'dielectric' ? layer.material : neighbourMaterial(stackup, index);
  return material && { heightMeters: layer.thicknessMeters, material };
}

/** From a trace's layer upwards (−1) or downwards (+1). Signal layers count as dielectric; mask is neglected. */
export function sideOf(stackup: Stackup, from: number, direction: -1 | 1): TraceSide {
  const slices: Slice[] = [];
  for (let i = from + direction; i >= 0 && i < stackup.layers.length; i += direction) {
    const layer = stackup.layers[i];
    if (layer.type === 'copper' && layer.plane) return { slices, plane: layer };
    const slice = sliceOf(stackup, i);
    if (slice) slices.push(slice);
  }
  return { slices };
}

export const heightOf = (slices: readonly Slice[]) => slices.reduce((sum, { heightMeters }) => sum + heightMeters, 0);

/** Slices as dielectrics in series, alike ones joined. */
export function layeringOf(slices: readonly Slice[]): Layering {
  const height = heightOf(slices);
  const layers: { dk: number; df: number; atHz: number; share: number }[] = [];
  for (const { heightMeters, material } of slices) {
    const point = throughPoint(material);
    const same = layers.find(({ dk, df, atHz }) => dk === point.dk && df === point.df && atHz === point.atHz);
    if (same) same.share += heightMeters / height;
    else layers.push({ ...point, share: heightMeters / height });
  }
  return layers;
}

export type { Copper, Foil };
