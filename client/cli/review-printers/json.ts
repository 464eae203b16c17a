import { REVIEW_OUTPUT_VERSION, type ReviewedChannel, type ReviewOutput } from '../../../schemas/outputs/review';
import type { Analysis } from '../../../src-core/analysis';
import type { Figure } from '../../../src-core/figures/types';
import type { Finding } from '../../../src-core/report';
import type { Change, ChannelReview, FigureChange } from '../../../src-core/review/index';
import { inertJson } from '../printers/escape';
import { locate } from '../printers/positions';
import type { ReviewPrinter } from './types';

/** For a program: `schemas/review-output.schema.json`. */
export const reviewJson: ReviewPrinter = (review, { version }) => {
  const { base, head, channels, unchanged, notes, failed } = review;
  const output: ReviewOutput = {
    version: REVIEW_OUTPUT_VERSION,
    tool: { name: 'lanewright', version },
    base,
    head,
    channels: channels.map(channelOf),
    unchanged,
    notes: [...notes],
    failed: { policy: failed.policy, reasons: [...failed.reasons] },
  };
  return `${inertJson(output)}\n`;
};

function channelOf(channel: ChannelReview): ReviewedChannel {
  const { file, renamedFrom, lane, title, state, why, verdict, causes, together, smallestMarginFall, notes } = channel;
  const there = channel.head ?? channel.base;
  const changes = (list: readonly Change[]) => list.map((change) => changeOf(change, there));
  return {
    file,
    ...(renamedFrom !== undefined && { renamedFrom }),
    ...(lane !== undefined && { lane }),
    title,
    state,
    because: why === 'itself' ? [] : [...why],
    changes: changes(channel.changes),
    figures: channel.figures.map(figureChangeOf),
    appeared: channel.appeared.map((finding) => findingOf(finding, channel.head)),
    gone: channel.gone.map((finding) => findingOf(finding, channel.base)),
    waivers: changes(channel.waivers),
    loosened: changes(channel.loosened),
    verdict: { ...(verdict.from && { from: { ...verdict.from } }), ...(verdict.to && { to: { ...verdict.to } }) },
    causes: causes.map(({ group, words, alone, without }) => ({
      group,
      words,
      alone: alone.map(figureChangeOf),
      without: without.map(figureChangeOf),
    })),
    ...(together && { together: together.map(figureChangeOf) }),
    ...(smallestMarginFall !== undefined && { smallestMarginFall }),
    notes: [...notes],
  };
}

const START = { start: { line: 1, column: 1 }, end: { line: 1, column: 1 } };

const locationOf = (at: Finding['at'], range: Finding['range'], analysis: Analysis | undefined) =>
  analysis ? locate({ at, range }, analysis) : { file: at.file, range: START };

const changeOf = (change: Change, analysis: Analysis | undefined): ReviewedChannel['changes'][number] => {
  const { subject, attribute, from, to, derived = false, electrical, words, at, group } = change;
  return {
    subject,
    attribute,
    ...(from !== undefined && { from }),
    ...(to !== undefined && { to }),
    derived,
    electrical,
    words,
    location: locationOf(at, undefined, analysis),
    group,
  };
};

const findingOf = ({ rule, severity, message, subject, at, range }: Finding, analysis: Analysis | undefined) => ({
  rule,
  severity,
  message,
  ...(subject !== undefined && { subject }),
  location: locationOf(at, range, analysis),
});

const figureOf = ({ name, title, value, unit, text, note }: Figure) => ({
  name,
  title,
  value,
  unit,
  text,
  ...(note !== undefined && { note }),
});

const figureChangeOf = ({ name, title, from, to, deltaText, better }: FigureChange) => ({
  name,
  title,
  ...(from && { from: figureOf(from) }),
  ...(to && { to: figureOf(to) }),
  deltaText,
  ...(better !== undefined && { better }),
});
