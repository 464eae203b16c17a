import type { AnalyseOptions } from '../../src-core/analysis';
import { fileKind } from '../../src-core/inputs';
import {
  type ChannelPair,
  type ChannelReview,
  joinReviews,
  type PairedFile,
  type Policy,
  pairFiles,
  policies,
  type ReviewSettings,
  reviewChannel,
  settingsOf,
} from '../../src-core/review/index';
import type { FilePath } from '../../src-core/text/types';
import type { SideFiles } from '../git/revision';
import { type Command, type OptionValues, Refusal } from './command';
import { startProgress } from './progress';
import { reviewGithub, reviewGitlab, reviewJunit, reviewSarif } from './review-printers/builds';
import { reviewJson } from './review-printers/json';
import { markdown } from './review-printers/markdown';
import { reviewText } from './review-printers/text';
import type { ReviewPrinter } from './review-printers/types';
import { analyseSide, changedPaths, configAt, dependsOn, keepReads, slim } from './review-side';
import { openSides } from './review-sides';
import { writeAtomically } from './write';

declare const LANEWRIGHT_VERSION: string;

const printers: Record<string, ReviewPrinter> = {
  text: reviewText,
  json: reviewJson,
  md: markdown,
  sarif: reviewSarif,
  github: reviewGithub,
  junit: reviewJunit,
  gitlab: reviewGitlab,
};

/** Below the 65,536 characters that the common forges take for a comment. */
const MOST_MARKDOWN = 60_000;

export const review: Command = {
  name: 'review',
  summary: 'What a change did to each channel.',
  arguments: '[BASE] [HEAD]',
  options: [
    {
      name: 'format',
      short: 'f',
      value: 'FORMAT[=FILE]',
      choices: Object.keys(printers),
      multiple: true,
      help: 'How to print; may be given several times, each with a file of its own. Default: text.',
    },
    {
      name: 'fail-on',
      value: 'POLICY',
      choices: policies,
      help: 'What makes the status 1: any error, what got worse, any change. Default: that of the base’s config, else regression.',
    },
    {
      name: 'max-length',
      value: 'BYTES',
      help: `Most bytes of the Markdown: the worst first, then a count. Default: ${MOST_MARKDOWN}.`,
    },
    { name: 'no-causes', help: 'Do not compute which of several changes did what.' },
  ],
  examples: [
    ['lanewright review', 'the working tree against where it left the main line'],
    ['lanewright review main my-branch', 'two revisions'],
    ['lanewright review HEAD~1 HEAD --format md=comment.md', 'Markdown for a pull request'],
    ['lanewright review old/ new/', 'two folders; two files likewise'],
  ],
  async run({ paths, options, terminal }) {
    if (options.config !== undefined || options['no-config'])
      throw new Refusal(
        'Each side of a review is judged by its own config: `--config` and `--no-config` do not go with it.',
      );
    const today = dayOf(options);
    const targets = targetsOf(options);
    const maxLength = lengthOf(options);
    const policy = policies.find((one) => one === options['fail-on']);
    const sides = await openSides(paths, typeof options.root === 'string' ? options.root : process.cwd());
    try {
      const [base, head] = [keepReads(sides.base), keepReads(sides.head)];
      const work = sides.files ? twoFiles(sides.files) : await touched(base, head, today);
      const progress = startProgress(terminal, work.pairs.length, 'channels');
      const channels: ChannelReview[] = [];
      const settings = new Map<FilePath, ReviewSettings>();
      for (const [index, { paired, changedFiles }] of work.pairs.entries()) {
        const pair = await analysed(paired, changedFiles, base, head, today);
        const channel = reviewChannel(pair, { outOfTime: fiveSeconds, withoutCauses: options['no-causes'] === true });
        const own = settingsOf(await configAt(base, paired.base ?? channel.file, today));
        settings.set(channel.file, { ...own, ...(policy && { policy }) });
        channels.push(kept(channel));
        progress.at(index + 1);
      }
      progress.end();
      const result = joinReviews(channels, {
        base: base.name,
        head: head.name,
        policy: policy ?? inOneWord(settings.values()),
        settings,
        unchanged: work.unchanged,
      });
      for (const { print, file } of targets) {
        const text = print(result, {
          version: LANEWRIGHT_VERSION,
          colour: file === undefined && terminal.colour,
          maxLength,
        });
        if (file === undefined) terminal.out(text);
        else await writeAtomically(file, text);
      }
      if (channels.some(({ head: analysis }) => analysis?.timedOut)) return 2;
      return result.failed.reasons.length > 0 ? 1 : 0;
    } finally {
      sides.close();
    }
  },
};

/** The policy of all configurations, where they agree; each channel is judged by its own in any case. */
function inOneWord(settings: Iterable<ReviewSettings>): Policy {
  const told = new Set([...settings].map(({ policy = 'regression' }) => policy));
  return told.size === 1 ? [...told][0] : 'regression';
}

interface Work {
  readonly pairs: readonly { readonly paired: PairedFile; readonly changedFiles?: readonly FilePath[] }[];
  readonly unchanged: number;
}

const twoFiles = (files: { readonly base: FilePath; readonly head: FilePath }): Work => ({
  pairs: [{ paired: files }],
  unchanged: 0,
});

/** The channels that a change touches: by their own text, or through a file that they use on either side. */
async function touched(base: SideFiles, head: SideFiles, today: string): Promise<Work> {
  const changed = await changedPaths(base, head);
  const channels = (side: SideFiles) => side.paths.filter((file) => fileKind(file) === 'channel');
  const [before, after] = [channels(base), channels(head)];
  const textsOf = async (side: SideFiles, files: readonly FilePath[], others: readonly FilePath[]) => {
    const there = new Set(others);
    const texts = new Map<FilePath, string>();
    for (const file of files) {
      const content = there.has(file) ? undefined : await side.read(file);
      texts.set(file, content?.kind === 'text' ? content.text : '');
    }
    return texts;
  };
  const paired = pairFiles(await textsOf(base, before, after), await textsOf(head, after, before));
  const pairs: { paired: PairedFile; changedFiles: readonly FilePath[] }[] = [];
  for (const one of changed.size > 0 ? paired : []) {
    const through = new Set<FilePath>();
    // head first: where a channel and all that it uses there is as it was, base used the same
    for (const [side, file] of [
      [head, one.head],
      [base, one.base],
    ] as const) {
      if (file === undefined || (side === base && one.base === one.head && through.size === 0)) continue;
      for (const path of await dependsOn(side, file, changed, today)) through.add(path);
    }
    if (through.size > 0 || one.base !== one.head) pairs.push({ paired: one, changedFiles: [...through].sort() });
  }
  return { pairs, unchanged: paired.length - pairs.length };
}

async function analysed(
  { base: from, head: to }: PairedFile,
  changedFiles: readonly FilePath[] | undefined,
  base: SideFiles,
  head: SideFiles,
  today: string,
): Promise<ChannelPair> {
  const before = from === undefined ? undefined : await analyseSide(base, from, today, undefined, fiveSeconds());
  const after = to === undefined ? undefined : await analyseSide(head, to, today, before?.analysis, fiveSeconds());
  return {
    file: (to ?? from)!,
    ...(from !== undefined && to !== undefined && from !== to && { renamedFrom: from }),
    ...(before && { base: before }),
    ...(after && { head: after }),
    ...(changedFiles && { changedFiles }),
  };
}

const kept = ({ base, head, ...review }: ChannelReview): ChannelReview => ({
  ...review,
  appeared: review.appeared.map(({ fixes: _fixes, ...finding }) => finding),
  gone: review.gone.map(({ fixes: _fixes, ...finding }) => finding),
  ...(base && { base: slim(base) }),
  ...(head && { head: slim(head) }),
});

/** design section 8: five seconds for one file */
function fiveSeconds(): NonNullable<AnalyseOptions['outOfTime']> {
  const end = performance.now() + 5000;
  return () => performance.now() > end;
}

function dayOf({ date }: OptionValues): string {
  const today = typeof date === 'string' ? date : new Date().toISOString().slice(0, 10);
  if (!/^\d{4}-\d{2}-\d{2}$/.test(today) || Number.isNaN(Date.parse(today)))
    throw new Refusal(`\`--date ${today}\` is not a day: write YYYY-MM-DD.`);
  return today;
}

function lengthOf({ 'max-length': written }: OptionValues): number {
  if (written === undefined) return MOST_MARKDOWN;
  const length = Number(written);
  if (!Number.isInteger(length) || length < 1000)
    throw new Refusal(`\`--max-length ${String(written)}\` is no length: a whole number of bytes from 1000.`);
  return length;
}

function targetsOf({ format }: OptionValues): { print: ReviewPrinter; file?: string }[] {
  const targets = ((format as readonly string[] | undefined) ?? ['text']).map((choice) => {
    const [name, ...rest] = choice.split('=');
    return { print: printers[name], ...(rest.length && { file: rest.join('=') }) };
  });
  if (targets.filter(({ file }) => file === undefined).length > 1)
    throw new Refusal(
      'Only one `--format` can go to standard output; give the others a file: `--format json=out.json`.',
    );
  return targets;
}
