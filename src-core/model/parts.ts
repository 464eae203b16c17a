import { entryKind, readValues } from '../format/index';
import { isMapping, mappingAt } from '../raw';
import type { ElementContext } from './elements';
import { lookUp } from './names';
import { formatReports, placeIn } from './reports';
import type { Source } from './sources';
import { touchstoneFile } from './touchstone';

/** What is wrong with the parts of a file, whether an element names them or not. */
export function readParts(context: ElementContext, source: Source): void {
  const { reports, sources } = context;
  if (source.parsed.kind !== 'parts' || source.newer) return;
  for (const [name, part] of Object.entries(mappingAt(source.raw, 'parts'))) {
    const path = ['parts', name];
    const chosen = entryKind('parts', part);
    if (chosen.problem || !isMapping(part)) {
      if (chosen.problem) reports.push(...formatReports([chosen.problem], source.file, path, name));
      continue;
    }
    const { values, problems } = readValues(chosen.schema as 'part-via', part);
    reports.push(...formatReports(problems, source.file, path, name));
    const { stackup, touchstone } = values as { stackup?: unknown; touchstone?: unknown };
    const used = context.usedParts.has(`${source.file}\n${name}`); // an element has reported its names already
    if (typeof stackup === 'string' && !used)
      lookUp(sources, source.file, 'stackups', stackup, placeIn(source.file, [...path, 'stackup']), reports, name);
    if (typeof touchstone === 'string' && !used) {
      const named = touchstoneFile(sources, source.file, touchstone);
      const at = placeIn(source.file, [...path, 'touchstone']);
      if (named.file === undefined) reports.push({ rule: named.rule, at, subject: name, message: named.message });
    }
  }
}
