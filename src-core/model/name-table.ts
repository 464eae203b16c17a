import type { ElementKindName } from '../../schemas/format/types';
import { isMapping, mappingAt } from '../raw';
import { namesAtHand, type Shared, type WritableName } from './names';
import { placeIn } from './reports';
import type { Sources } from './sources';
import type { Shelves } from './stackups';
import type { NameEntry, NameTable } from './types';

/** Parts, stackups, materials and foils at hand, by the names under which the analysed file may write them. */
export function nameTable(sources: Sources, shelves: Shelves): NameTable {
  const table = (role: Shared) => namesAtHand(sources, sources.own, role);
  const entry = (role: Shared, { file, name, writtenAs }: WritableName): NameEntry => ({
    name,
    writtenAs,
    place: placeIn(file, [role, name], 'key'),
  });
  return {
    parts: table('parts').map((one) => {
      const part = mappingAt(sources.all.get(one.file)?.raw, 'parts')[one.name];
      const kind = isMapping(part) && typeof part.kind === 'string' ? { kind: part.kind as ElementKindName } : {};
      return { ...entry('parts', one), ...kind };
    }),
    stackups: table('stackups').map((one) => {
      const stackup = shelves.stackup(one.file, one.name);
      return { ...entry('stackups', one), ...(stackup && { stackup }) };
    }),
    materials: table('materials').map((one) => entry('materials', one)),
    foils: table('foils').map((one) => entry('foils', one)),
  };
}
