import type { Analysis } from '../analysis';
import type { StackupLayer } from '../model/types';
import { show } from '../quantity/show';
import { isMapping } from '../raw';
import type { FilePath } from '../text/types';
import { describeElement } from './describe-element';
import { code, page, plainText, type Row } from './markdown';
import { occurrenceAt } from './names';
import { type Identity, sharedValue } from './occurrences';

/** What a name stands for: an element, layer, stackup, material, foil, part, file. */
export function describeName(analysis: Analysis, file: FilePath, offset: number): string | undefined {
  const identity = occurrenceAt(analysis.parsed, file, offset)?.occurrence.identity;
  if (!identity) return undefined;
  const { role, name } = identity;
  switch (role) {
    case 'element': {
      const element = analysis.model.elements.find((one) => one.name === name);
      return element && describeElement(analysis, element);
    }
    case 'layer':
      return describeLayer(analysis, identity);
    case 'stackup':
    case 'material':
    case 'foil':
    case 'part':
      return describeShared(analysis, role, identity);
    case 'owner': {
      const owner = analysis.ledger?.owners.find((one) => one.owner === name);
      return owner && page(`**${plainText(name)}**: owner`, [['Spent', owner.text]]);
    }
    case 'file':
    case 'touchstone':
    case 'use': {
      const target = role === 'use' ? undefined : identity.file;
      if (!target) return undefined;
      const content = analysis.inputs.files.get(target);
      const state = content?.kind === 'missing' ? 'is not there' : content?.kind === 'text' ? 'is read' : 'is not read';
      return page(`${code(target)} ${state}`, []);
    }
    default:
      return undefined;
  }
}

function describeLayer(analysis: Analysis, { within, name }: Identity): string | undefined {
  const stackups = analysis.model.names.stackups.filter((entry) => entry.name === within);
  const layers = stackups.find(({ stackup }) => stackup?.layers.some((layer) => layer.name === name))?.stackup?.layers;
  const index = layers?.findIndex((layer) => layer.name === name) ?? -1;
  const layer = layers?.[index];
  if (!layers || !layer) return undefined;
  const above = layers.slice(0, index).reduce((sum, one) => sum + one.thicknessMeters, 0);
  const total = layers.reduce((sum, one) => sum + one.thicknessMeters, 0);
  const rows: Row[] = [
    ['Thickness', show.length(layer.thicknessMeters)],
    ...layerRows(layer),
    ['Depth', `${show.length(above)} of ${show.length(total)}`],
  ];
  const neighbours = [layers[index - 1], layers[index + 1]].flatMap((one) =>
    one ? [`${code(one.name)} ${show.length(one.thicknessMeters)}`] : [],
  );
  return page(`**${plainText(name)}**: ${layerKind(layer)} of ${code(within ?? '')}`, [
    ...rows,
    ['Between', neighbours.join(' and ')],
  ]);
}

const layerKind = (layer: StackupLayer) =>
  layer.type === 'copper' ? (layer.plane ? 'plane' : 'signal layer') : layer.type;

function layerRows(layer: StackupLayer): Row[] {
  if (layer.type !== 'copper')
    return [
      [
        'Dielectric constant',
        `${show.ratio(layer.material.dkThrough.value)} at ${show.frequency(layer.material.dkThrough.atHz)}`,
      ],
      ['Loss tangent', show.ratio(layer.material.df.value)],
    ];
  const { roughness, conductivity } = layer.foil;
  const surface =
    roughness.kind === 'rms'
      ? `${show.length(roughness.rmsMeters)} rms`
      : roughness.kind === 'huray'
        ? `spheres of ${show.length(roughness.radiusMeters)}, ratio ${show.ratio(roughness.ratio)}`
        : 'smooth';
  return [
    ['Conductivity', show.conductivity(conductivity)],
    ['Roughness', surface],
  ];
}

function describeShared(
  analysis: Analysis,
  role: 'stackup' | 'material' | 'foil' | 'part',
  { file, name }: Identity,
): string | undefined {
  const value = sharedValue(analysis.parsed.get(file), role, name);
  if (value === undefined) return undefined;
  const rows: Row[] = [];
  if (role === 'stackup') {
    const stackup = analysis.model.names.stackups.find(
      (entry) => entry.name === name && entry.stackup?.place.file === file,
    )?.stackup;
    const copper = stackup?.layers.filter((layer) => layer.type === 'copper') ?? [];
    if (stackup) {
      rows.push(
        ['Copper layers', String(copper.length)],
        ['Thickness', show.length(stackup.layers.reduce((sum, layer) => sum + layer.thicknessMeters, 0))],
      );
      rows.push([
        'Signals',
        copper
          .filter(({ plane }) => !plane)
          .map((layer) => code(layer.name))
          .join(' '),
      ]);
    }
  } else if (isMapping(value)) {
    for (const [key, one] of Object.entries(value).slice(0, 7))
      if (typeof one === 'string' || typeof one === 'number') rows.push([plainText(key), code(String(one))]);
    if (role === 'part') {
      const users = analysis.model.elements.filter(
        (element) =>
          element.places.part &&
          Object.values(element.places).some((place) => place.file === file && place.path[1] === name),
      );
      if (users.length > 0) rows.push(['Placed as', users.map((element) => code(element.name)).join(', ')]);
    }
  }
  return page(`**${plainText(name)}**: ${role} in ${code(file)}`, rows);
}
