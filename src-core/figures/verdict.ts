import type { Analysis } from '../analysis';
import { show } from '../quantity/show';
import type { Finding } from '../report';
import type { Computed } from './computed';
import type { Figure, LimitOutcome, Verdict } from './types';

interface Judged extends Computed, Partial<Pick<Analysis, 'inputs' | 'parsed'>> {
  readonly figures: readonly Figure[];
  readonly limits: readonly LimitOutcome[];
  readonly findings: readonly Finding[];
  readonly timedOut?: boolean;
}

const counted = (n: number, one: string) => `${n} ${one}${n === 1 ? '' : 's'}`;

/** Loss and eye in brief, for channels whose limits do not tell them. */
function inBrief({ model, figures, limits }: Judged): readonly string[] {
  const figure = (name: string) => figures.find((one) => one.name === name)?.text;
  const [loss, height, width] = ['insertion-loss-at-nyquist', 'eye-height', 'eye-width'].map(figure);
  return [
    ...(loss && !limits.some(({ kind }) => kind === 'insertion-loss')
      ? [`${loss} at ${show.frequency(model.nyquistFrequency)}`]
      : []),
    ...(height && width && !limits.some(({ kind }) => kind === 'eye')
      ? [`eye ${height} × ${width.replace(/^~/, '')}`]
      : []),
  ];
}

const metText = ({ kind, actual, text }: LimitOutcome) =>
  kind === 'eye' ? `eye ${actual.text}` : kind === 'return-loss' ? `return loss ${actual.text}` : text;

function limitsText(judged: Judged): string {
  const { limits, findings } = judged;
  const accepted = (name: string) => findings.some(({ subject, waivedBy }) => subject === name && waivedBy);
  const failed = limits.filter(({ met, name }) => !met && !accepted(name));
  const brief = inBrief(judged);
  if (failed.length > 0) {
    const each = failed.map(({ name, text }) => `${name}: ${text}`).join('; ');
    return `fails ${failed.length} of ${counted(limits.length, 'limit')}: ${each}`;
  }
  const figures = [...limits.map((limit) => metText(limit) + (limit.met ? '' : ' (accepted)')), ...brief].join(', ');
  return `${limits.length > 0 ? 'meets its limits' : 'no limits declared'}${figures ? `: ${figures}` : ''}`;
}

/** Keys that are known and not used in this version, each told by a finding. */
const keysNotUsed = (findings: readonly Finding[]) =>
  findings.filter(({ rule }) => rule === 'reserved-key').map(({ at }) => String(at.path.at(-1)));

/** What the verdict's figures leave out: elements that are not complete, keys that are not used yet. */
export const leftOut = ({ networks, link, findings }: Computed & Pick<Judged, 'findings'>): readonly string[] => [
  ...new Set([...(networks?.without ?? []), ...(link?.without ?? []), ...keysNotUsed(findings)]),
];

/** A file that holds no channel has findings and no figures. */
function ofOther(kind: 'parts' | 'config', errors: number, warnings: number): Verdict {
  const what = kind === 'parts' ? 'a parts file' : 'a configuration';
  const told = [...(errors ? [counted(errors, 'error')] : []), ...(warnings ? [counted(warnings, 'warning')] : [])];
  return { state: errors ? 'errors' : warnings ? 'warnings' : 'good', text: [what, ...told].join('; ') };
}

/** The state of a channel in one line. Accepted findings count for nothing. */
export function verdictOf(judged: Judged): Verdict {
  const open = judged.findings.filter(({ waivedBy }) => !waivedBy);
  const errors = open.filter(({ severity }) => severity === 'error').length;
  const warnings = open.filter(({ severity }) => severity === 'warning').length;
  const kind = judged.inputs && judged.parsed?.get(judged.inputs.file)?.kind;
  if (kind === 'parts' || kind === 'config') return ofOther(kind, errors, warnings);
  if (!judged.cascade) {
    const why = judged.timedOut
      ? 'the time for one file was over'
      : errors > 0
        ? counted(errors, 'error')
        : 'line rate or path is missing';
    return { state: 'not-computed', text: `not computed: ${why}` };
  }
  const failed = judged.limits.some(({ met }) => !met);
  const counts = errors > 0 ? counted(errors, 'error') : warnings > 0 ? counted(warnings, 'warning') : '';
  const without = leftOut(judged);
  const acceptedCount = judged.findings.length - open.length;
  const parts = [
    limitsText(judged),
    ...(counts && !(failed && errors > 0) ? [counts] : []),
    ...(acceptedCount > 0 ? [`${counted(acceptedCount, 'finding')} accepted`] : []),
    ...(without.length > 0 ? [`without ${without.join(', ')}`] : []),
    ...(judged.linkIsStale && judged.link ? ['eye of an older text'] : []),
  ];
  return { state: errors > 0 ? 'errors' : warnings > 0 ? 'warnings' : 'good', text: parts.join('; ') };
}
