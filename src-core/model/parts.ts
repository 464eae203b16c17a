import { entryKind, readValues } from '../format/index';
import { fileKind, joinPath } from '../inputs';
import type { ElementContext } from './elements';
import { lookUp } from './names';
import { isMapping, mappingAt } from './raw';
import { formatReports, placeIn, quoted } from './reports';
import { type Source, unreadable } from './sources';

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
    if (typeof touchstone === 'string' && !used) checkFile(context, source, name, touchstone);
  }
}

function checkFile({ sources, reports }: ElementContext, source: Source, part: string, written: string): void {
  const at = placeIn(source.file, ['parts', part, 'touchstone']);
  const joined = joinPath(source.file, written);
  if (joined.problem !== undefined)
    reports.push({
      rule: 'refused-file',
      at,
      subject: part,
      message: `The path ${quoted(written)} ${joined.problem}.`,
    });
  else if (fileKind(joined.file) !== 'touchstone') {
    reports.push({
      rule: 'refused-file',
      at,
      subject: part,
      message: `${quoted(written)} is no Touchstone file: its name ends with \`.s1p\` to \`.s4p\`.`,
    });
  } else if (sources.inputs.files.get(joined.file)?.kind !== 'text') {
    const [rule, message] = unreadable(sources.inputs, joined.file, written);
    reports.push({ rule, at, subject: part, message });
  }
}
