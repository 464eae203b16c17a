import type { FoilValues, MaterialValues, PartsValues, Quantity } from '../../schemas/format/types';
import { entryKind, kindProblems, readValues } from '../format/index';
import { COPPER_CONDUCTIVITY } from '../physics/copper';
import { cannonball, type Roughness } from '../physics/roughness';
import { mappingAt } from '../raw';
import { writtenKeys } from '../text/first';
import type { FilePath, ValuePath } from '../text/types';
import { lookUp } from './names';
import { formatReports, type ModelReport, placeIn, quoted } from './reports';
import { readPartsFile, type Sources } from './sources';
import type { Foil, Material, Point, Stackup, StackupLayer } from './types';

const DEFAULT_FREQUENCY = 10e9;
const SMOOTH: Foil = { conductivity: COPPER_CONDUCTIVITY, roughness: { kind: 'smooth' } };

/** Reads stackups, materials and foils of parts files, each once. */
export interface Shelves {
  /** Undefined where it cannot be used; a report says why. */
  stackup(file: FilePath, name: string): Stackup | undefined;
  /** Reads all that a parts file holds, for its findings. */
  readAll(file: FilePath): void;
}

export function openShelves(sources: Sources, reports: ModelReport[]): Shelves {
  const files = new Map<FilePath, Partial<PartsValues>>();
  const stackups = new Map<string, Stackup | undefined>();
  const valuesOf = (file: FilePath): Partial<PartsValues> => {
    let values = files.get(file);
    if (!values) {
      const source = sources.all.get(file);
      const read = source && source.parsed.kind === 'parts' ? readPartsFile(source) : { values: {}, reports: [] };
      values = read.values as Partial<PartsValues>;
      reports.push(...read.reports);
      files.set(file, values);
    }
    return values;
  };
  const context: Context = { sources, reports, valuesOf };
  const stackup = (file: FilePath, name: string) => {
    const key = `${file}\n${name}`;
    if (!stackups.has(key)) stackups.set(key, readStackup(context, file, name));
    return stackups.get(key);
  };
  return {
    stackup,
    readAll(file) {
      valuesOf(file);
      const source = sources.all.get(file);
      if (source && !source.newer)
        for (const name of Object.keys(mappingAt(source.raw, 'stackups'))) stackup(file, name);
    },
  };
}

interface Context {
  readonly sources: Sources;
  readonly reports: ModelReport[];
  readonly valuesOf: (file: FilePath) => Partial<PartsValues>;
}

function readStackup(context: Context, file: FilePath, name: string): Stackup | undefined {
  const { sources, reports, valuesOf } = context;
  const raw = mappingAt(sources.all.get(file)?.raw, 'stackups')[name];
  const path: ValuePath = ['stackups', name];
  const values = valuesOf(file);
  if (!Array.isArray(raw)) return undefined; // the schema says so
  const layers: StackupLayer[] = [];
  let broken = false;
  raw.slice(0, 200).forEach((row, i) => {
    const layer = readRow(context, file, [...path, i], row);
    if (layer) layers.push(layer);
    else broken = true;
  });
  // Of rows that could not be read, no order can be told.
  const order = broken ? [] : orderReports(layers, file, name);
  reports.push(...order);
  if (broken || order.length > 0 || layers.length === 0) return undefined;
  const rules = values['drill-rules'];
  return {
    name,
    place: placeIn(file, path),
    layers,
    drillRules: {
      ...(rules?.['backdrill-minimum'] && { backdrillMinimumMeters: rules['backdrill-minimum'].value }),
      ...(rules?.['backdrill-tolerance'] && { backdrillToleranceMeters: rules['backdrill-tolerance'].value }),
    },
  };
}

function readRow(context: Context, file: FilePath, path: ValuePath, row: unknown): StackupLayer | undefined {
  const { reports } = context;
  const kind = entryKind('stackup-rows', row);
  if (kind.problem) {
    reports.push(...formatReports([kind.problem], file, path));
    return undefined;
  }
  const keys = writtenKeys(context.sources.all.get(file)!.parsed, path);
  reports.push(...formatReports(kindProblems('stackup-rows', kind.kind, keys), file, path));
  const place = placeIn(file, path);
  if (kind.kind === 'copper') {
    const { values, problems } = readValues('copper', row);
    reports.push(...formatReports(problems, file, path));
    if (!values.copper || !values.thickness) return undefined;
    const foil = readFoil(context, file, values.foil, path);
    if (!foil) return undefined;
    return {
      type: 'copper',
      name: values.copper,
      thicknessMeters: values.thickness.value,
      plane: values.plane === true,
      foil,
      place,
    };
  }
  const { values, problems } = readValues(kind.kind as 'dielectric' | 'mask', row);
  reports.push(...formatReports(problems, file, path));
  const { material: written, thickness } = values;
  const name = 'dielectric' in values ? values.dielectric : (values as { mask?: 'top' | 'bottom' }).mask;
  if (!name || !thickness || !written) return undefined;
  const material = readMaterial(context, file, written, path);
  if (!material) return undefined;
  const common = { thicknessMeters: thickness.value, material, place };
  return kind.kind === 'mask'
    ? { type: 'mask', name: name as 'top' | 'bottom', ...common }
    : { type: 'dielectric', name, ...common };
}

function readMaterial(
  { sources, reports, valuesOf }: Context,
  file: FilePath,
  written: string,
  row: ValuePath,
): Material | undefined {
  const found = lookUp(sources, file, 'materials', written, placeIn(file, [...row, 'material']), reports);
  if (found.broken) return undefined;
  const values = valuesOf(found.file).materials as Record<string, MaterialValues> | undefined;
  const material = values && Object.hasOwn(values, found.name) ? values[found.name] : undefined;
  if (!material?.dk) return undefined;
  const { dk, df } = material;
  const through = 'through' in dk ? dk.through : dk;
  const inPlane = 'through' in dk ? dk['in-plane'] : dk;
  if (!through || !inPlane) return undefined;
  // A df that is written and cannot be read is no df of nought.
  const raw = mappingAt(mappingAt(sources.all.get(found.file)?.raw, 'materials'), found.name);
  if (!df && Object.hasOwn(raw, 'df')) return undefined;
  return {
    name: found.name,
    dkThrough: pointOf(through),
    dkInPlane: pointOf(inPlane),
    df: df ? pointOf(df) : { value: 0, atHz: DEFAULT_FREQUENCY },
  };
}

const pointOf = ({ value, at }: Quantity): Point => ({ value, atHz: typeof at === 'number' ? at : DEFAULT_FREQUENCY });

function readFoil(
  { sources, reports, valuesOf }: Context,
  file: FilePath,
  written: string | undefined,
  row: ValuePath,
): Foil | undefined {
  if (written === undefined) return SMOOTH;
  const found = lookUp(sources, file, 'foils', written, placeIn(file, [...row, 'foil']), reports);
  if (found.broken) return undefined;
  const values = valuesOf(found.file).foils as Record<string, FoilValues> | undefined;
  const foil = values && Object.hasOwn(values, found.name) ? values[found.name] : undefined;
  if (!foil) return undefined;
  const raw = mappingAt(mappingAt(sources.all.get(found.file)?.raw, 'foils'), found.name);
  for (const key of ['conductivity', 'roughness'] as const) if (Object.hasOwn(raw, key) && !foil[key]) return undefined;
  const roughness = readRoughness(foil.roughness);
  return roughness && { conductivity: foil.conductivity?.value ?? COPPER_CONDUCTIVITY, roughness };
}

function readRoughness(written: FoilValues['roughness']): Roughness | undefined {
  if (!written) return { kind: 'smooth' };
  const { rms, rz, huray } = written;
  if (rms) return rms.value > 0 ? { kind: 'rms', rmsMeters: rms.value } : { kind: 'smooth' };
  if (rz) return rz.value > 0 ? { kind: 'huray', ...cannonball(rz.value) } : { kind: 'smooth' };
  return huray?.radius && huray.ratio
    ? { kind: 'huray', radiusMeters: huray.radius.value, ratio: huray.ratio.value }
    : undefined;
}

/** Copper and dielectric alternate, two dielectrics in a row allowed; copper outside, mask over it; each name once. */
function orderReports(layers: readonly StackupLayer[], file: FilePath, stackup: string): ModelReport[] {
  const reports: ModelReport[] = [];
  const schema = (layer: StackupLayer, message: string) =>
    reports.push({ rule: 'schema', at: { ...layer.place, on: 'entry' }, message });
  const first = new Map<string, StackupLayer>();
  layers.forEach((layer, i) => {
    const written = layer.type === 'mask' ? `mask ${layer.name}` : layer.name;
    const before = first.get(written);
    if (before) {
      reports.push({
        rule: 'duplicate-name',
        at: { file, path: [...layer.place.path, layer.type] },
        message: `The layer ${quoted(layer.name)} stands twice in \`${stackup}\`; each layer has its own name.`,
        related: [
          {
            at: { file, path: [...before.place.path, before.type] },
            message: `${quoted(layer.name)} stands here first.`,
          },
        ],
      });
    } else first.set(written, layer);
    const above = layers[i - 1];
    if (layer.type === 'mask' && !(layer.name === 'top' ? i === 0 : i === layers.length - 1)) {
      schema(layer, `The ${layer.name} mask is the ${layer.name === 'top' ? 'first' : 'last'} row of a stackup.`);
    }
    if (layer.type === 'copper' && above?.type === 'copper') {
      schema(
        layer,
        `${quoted(layer.name)} lies directly on ${quoted(above.name)}: copper and dielectric alternate. A dielectric is missing between them.`,
      );
    }
  });
  const rows = layers.filter(({ type }) => type !== 'mask');
  const outer = rows.length === 0 ? [] : [rows[0], rows[rows.length - 1]];
  for (const layer of new Set(outer)) {
    if (layer.type === 'dielectric')
      schema(layer, `The outermost row of a stackup is copper; ${quoted(layer.name)} is a dielectric.`);
  }
  if (layers.length > 0 && !layers.some(({ type }) => type === 'copper'))
    schema(layers[0], `\`${stackup}\` has no copper layer.`);
  return reports;
}

export const copperLayers = ({ layers }: Stackup) => layers.filter((layer) => layer.type === 'copper');
