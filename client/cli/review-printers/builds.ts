import type { Analysis } from '../../../src-core/analysis';
import type { Finding } from '../../../src-core/report';
import type { Change, ChannelReview } from '../../../src-core/review/index';
import { visible } from '../printers/escape';
import { github } from '../printers/github';
import { gitlab } from '../printers/gitlab';
import { junit } from '../printers/junit';
import { sarifDocument } from '../printers/sarif';
import { toldFile } from '../printers/told';
import type { MakePrinter } from '../printers/types';
import type { ReviewPrinter } from './types';

const keyOf = ({ at, rule, message }: Finding) => JSON.stringify([at, rule, message]);

/** What a parts file has wrong is said by every channel that uses it; it is told once. */
function onceEach() {
  const told = new Set<string>();
  return (findings: readonly Finding[]) =>
    findings.filter((finding) => {
      const key = keyOf(finding);
      return !told.has(key) && Boolean(told.add(key));
    });
}

/** A printer of `check` fed with what a review found in each channel of the head. */
function printed(make: MakePrinter, findingsOf: (channel: ChannelReview, head: Analysis) => readonly Finding[]) {
  const print: ReviewPrinter = (review, { version }) => {
    let out = '';
    const write = (text: string) => {
      out += text;
    };
    const printer = make({ write, version, colour: false, shown: (file) => file, quiet: false });
    const once = onceEach();
    for (const channel of review.channels)
      if (channel.head) printer.file({ ...channel.head, findings: once(findingsOf(channel, channel.head)) });
    printer.end();
    return out;
  };
  return print;
}

/** A rule loosened or a waiver added is seen before what it hides. */
const asFinding =
  (rule: string) =>
  ({ at, subject, words }: Change): Finding => ({ rule, severity: 'warning', at, subject, message: words });

/** Annotations: what is new, at its lines, and below why the review fails. */
export const reviewGithub: ReviewPrinter = (review, context) => {
  const annotations = printed(github, ({ loosened, waivers, appeared }) => [
    ...loosened.map(asFinding('loosened')),
    ...waivers.map(asFinding('waiver')),
    ...appeared.filter(({ waivedBy }) => !waivedBy),
  ])(review, context);
  const { policy, reasons } = review.failed;
  return annotations + reasons.map((reason) => `fails by \`${policy}\`: ${visible(reason)}\n`).join('');
};

/** Every finding of the channels that the change touches: the forge compares with its own report of the base. */
export const reviewGitlab = printed(gitlab, (_, head) => head.findings);

export const reviewJunit = printed(junit, (_, head) => head.findings);

/** Every finding of the channels that the change touches, new, as before or gone. */
export const reviewSarif: ReviewPrinter = (review, { version }) => {
  const document = sarifDocument(version);
  const [once, onceGone] = [onceEach(), onceEach()];
  for (const { head, base, appeared, gone } of review.channels) {
    if (head) {
      const findings = once(head.findings);
      const fresh = new Set(appeared.map(keyOf));
      const file = toldFile({ ...head, findings });
      const states = new Map(
        file.findings.map(
          (finding, index) => [finding, fresh.has(keyOf(findings[index])) ? 'new' : 'unchanged'] as const,
        ),
      );
      document.add(file, (finding) => states.get(finding));
    }
    if (base) document.add(toldFile({ ...base, findings: onceGone(gone) }), () => 'absent');
  }
  return document.text();
};
