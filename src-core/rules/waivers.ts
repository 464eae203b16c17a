import { quoted } from '../model/reports';
import type { Waiver } from '../model/types';
import { nearest } from '../quantity/nearest';
import { inSi, unitNamed } from '../quantity/units';
import type { Finding, Fix, Report } from '../report';
import type { Judged } from './types';

/** What waivers did to findings, and what is wrong with the waivers themselves. */
export interface Waived {
  readonly findings: readonly Finding[];
  readonly dead: readonly Report[];
  readonly outgrown: readonly Report[];
  readonly outdated: readonly Report[];
}

const matches = (waiver: Waiver, finding: Finding) => waiver.rule === finding.rule && waiver.at === finding.subject;

/** A shown value in its parts: `9.06 dB`. */
function partsOf(valueText = '') {
  const shown = /^~?(-?\d+(?:\.(\d+))?)\s*(.*)$/.exec(valueText);
  return shown ? { digits: Number(shown[1]), decimals: shown[2]?.length ?? 0, unit: shown[3] } : undefined;
}

/** A waiver of another dimension than the finding's compares with nothing. Shares and bare numbers are ratios. */
const isComparable = ({ upTo }: Waiver, { valueText }: Finding) =>
  !upTo || (unitNamed(partsOf(valueText)?.unit ?? '')?.dimension ?? 'ratio') === upTo.dimension;

/** True where a finding is no worse than what the waiver accepts. A waiver without `up-to` accepts any value. */
function covers(waiver: Waiver, finding: Finding): boolean {
  const { value, worse } = finding;
  if (!waiver.upTo || value === undefined) return true;
  if (!isComparable(waiver, finding)) return false;
  return worse === 'lower' ? value >= waiver.upTo.value : value <= waiver.upTo.value;
}

/** The day after `until` is the first on which it does not hold. Both are `YYYY-MM-DD`, which sort as text. */
const isOver = ({ until }: Waiver, today: string) => until < today;

/** Safe where it accepts nothing; one that is over or outgrown is a person's to renew or give up. */
const remove = (waiver: Waiver, { safe = false } = {}): Fix => ({
  title: 'Remove this waiver',
  edits: [{ op: 'remove', at: { ...waiver.place, on: 'entry' } }],
  ...(safe && { safe }),
});

/** `up-to: 2.4` where the finding is in dB: the unit was left out. */
function addUnit({ upTo, place }: Waiver, { valueText }: Finding): readonly Fix[] {
  const unit = partsOf(valueText)?.unit ?? '';
  if (upTo?.unit !== '' || unit === '') return [];
  const text = `${upTo.text} ${unit}`;
  const edit = { op: 'value', at: { ...place, path: [...place.path, 'up-to'] }, text } as const;
  return [{ title: `Write ${quoted(text)}`, edits: [edit], preferred: true }];
}

const at = (waiver: Waiver, key: string) => ({ ...waiver.place, path: [...waiver.place.path, key] });

function outdatedReport(waiver: Waiver): Report {
  return {
    at: at(waiver, 'until'),
    message: `This waiver of ${quoted(waiver.rule)} at ${quoted(waiver.at)} held until ${waiver.until}; its finding counts again.`,
    fixes: [remove(waiver)],
  };
}

function outgrownReport(waiver: Waiver, finding: Finding): Report {
  const written = waiver.upTo!.text;
  const comparison = isComparable(waiver, finding)
    ? `worse than the ${written} that this waiver accepts`
    : `which cannot be compared with the ${quoted(written)} of this waiver`;
  return {
    at: at(waiver, 'up-to'),
    message: `${quoted(waiver.rule)} at ${quoted(waiver.at)} is now ${finding.valueText ?? finding.value}, ${comparison}; its finding counts again.`,
    related: [{ at: finding.at, message: finding.message }],
    fixes: [...(isComparable(waiver, finding) ? [] : addUnit(waiver, finding)), remove(waiver)],
  };
}

function deadReport(waiver: Waiver, rules: readonly string[]): Report {
  const place = at(waiver, 'rule');
  if (rules.includes(waiver.rule)) {
    const message = `This waiver matches nothing: there is no finding of ${quoted(waiver.rule)} at ${quoted(waiver.at)}.`;
    return { at: place, message, fixes: [remove(waiver, { safe: true })], tags: ['unnecessary'] };
  }
  const near = nearest(waiver.rule, rules);
  const message = `This waiver matches nothing: ${quoted(waiver.rule)} is not a rule${near ? `; did you mean \`${near}\`?` : '.'}`;
  const rename: readonly Fix[] = near
    ? [{ title: `Write \`${near}\``, edits: [{ op: 'value', at: place, text: near }], preferred: true, safe: true }]
    : [];
  return { at: place, message, fixes: [...rename, remove(waiver, { safe: true })] };
}

const returned = (finding: Finding, waiver: Waiver, why: string): Finding => ({
  ...finding,
  related: [...(finding.related ?? []), { at: waiver.place, message: why }],
});

interface Judging {
  /** Names of all rules. */
  readonly rules: readonly string[];
  /** Whether a rule could run at all: only then is a waiver without a finding dead. */
  readonly ran: (rule: string) => boolean;
}

/** Applies waivers to findings, in their order; a finding is accepted by the first that covers it. */
export function applyWaivers(findings: readonly Finding[], { model, inputs }: Judged, { rules, ran }: Judging): Waived {
  const dead: Report[] = [];
  const outgrown: Report[] = [];
  const outdated: Report[] = [];
  let result = findings;
  for (const waiver of model.waivers) {
    const matching = result.filter((finding) => matches(waiver, finding));
    if (matching.length === 0) {
      if (ran(waiver.rule) || !rules.includes(waiver.rule)) dead.push(deadReport(waiver, rules));
      continue;
    }
    const over = isOver(waiver, inputs.today);
    if (over) outdated.push(outdatedReport(waiver));
    const beyond = matching.find((finding) => !covers(waiver, finding));
    if (!over && beyond) outgrown.push(outgrownReport(waiver, beyond));
    result = result.map((finding) => {
      if (!matches(waiver, finding)) return finding;
      if (over) return returned(finding, waiver, `It was accepted until ${waiver.until} by ${waiver.by}.`);
      if (!covers(waiver, finding))
        return returned(finding, waiver, `It was accepted up to ${waiver.upTo!.text} only, by ${waiver.by}.`);
      return { ...finding, waivedBy: waiver.place };
    });
  }
  return { findings: result, dead, outgrown, outdated };
}

/** A value as it may stand in `up-to`: as in the finding's text, rounded to the worse side so that it covers the value itself. */
export function acceptedText({ value, valueText, worse }: Report): string | undefined {
  const shown = partsOf(valueText);
  if (!shown || value === undefined) return undefined;
  const unit = unitNamed(shown.unit);
  const exact = unit ? value / inSi('1', unit) : shown.unit === '%' ? value * 100 : value;
  const steps = exact * 10 ** shown.decimals;
  const outward = worse === 'lower' ? Math.floor(steps + 1e-9) : Math.ceil(steps - 1e-9);
  return `${(outward / 10 ** shown.decimals).toFixed(shown.decimals)}${shown.unit ? ` ${shown.unit}` : ''}`;
}
