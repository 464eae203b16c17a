import type { Report } from '../report';
import type { Judged } from './types';

export type NamedReport = Report & { readonly rule: string; readonly subject?: string };

/**
 * What the stages said of themselves while they read: of texts, of the model, of elements. Each names the rule under which it
 * stands; the judge gives it that rule's severity, and a rule's file its paragraph.
 */
export function reportsOf({ inputs, parsed, model, networks }: Judged): readonly NamedReport[] {
  const isChannel = parsed.get(inputs.file)?.kind === 'channel';
  const texts = [...parsed.values()]
    // A configuration is judged where it stands, not in each channel below it.
    .filter(({ file, kind }) => file === inputs.file || (isChannel && kind !== 'config') || kind === 'parts')
    // What uses a parts file is judged there.
    .filter(({ file }) => !inputs.dependents?.includes(file) || model.files.includes(file))
    .flatMap(({ reports }) => reports);
  const elements = networks?.elements.flatMap(({ element, prepared }) =>
    (prepared?.notes ?? []).map((note) => ({ ...note, subject: element.name })),
  );
  return [...texts, ...model.reports, ...(elements ?? [])];
}

/** The check of a rule whose findings the stages report themselves. */
export const reportedByStages = () => [];
