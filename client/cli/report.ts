import { analyse } from '../../src-core/analyse';
import type { Analysis } from '../../src-core/analysis';
import { type Command, Refusal } from './command';
import { openWorkspace } from './files';
import { inputsFor } from './inputs';
import { writeAtomically } from './write';

declare const LANEWRIGHT_VERSION: string;

/** Loaded when asked for: the pages' code is not needed by `check`. */
const pages: Record<string, (analysis: Analysis, plot: string | undefined) => Promise<string>> = {
  html: async (analysis) => (await import('../report/index')).reportHtml(analysis, { version: LANEWRIGHT_VERSION }),
  md: async (analysis) => (await import('../report/index')).reportMarkdown(analysis, { version: LANEWRIGHT_VERSION }),
  svg: async (analysis, plot) => (await import('../report/index')).reportSvg(analysis, plot),
};

export const report: Command = {
  name: 'report',
  summary: 'A page with pictures: verdict, ledger, limits, findings, plots.',
  arguments: 'FILE',
  options: [
    {
      name: 'format',
      short: 'f',
      value: 'FORMAT',
      choices: Object.keys(pages),
      help: 'How to write it. Default: html.',
    },
    {
      name: 'plot',
      value: 'NAME',
      help: 'With --format svg: one plot alone, such as insertion-loss. Default: all, one below the other.',
    },
    { name: 'output', short: 'o', value: 'FILE', help: 'Where to write. Default: standard output.' },
    {
      name: 'fail-on',
      value: 'LEVEL',
      choices: ['error', 'warning', 'info', 'hint', 'never'],
      help: 'The least severity that makes the status 1. Default: never: a report is written of any channel.',
    },
  ],
  examples: [
    ['lanewright report lanes/rx0.channel.yaml -o rx0.html', 'a page of its own, nothing else needed to show it'],
    ['lanewright report lanes/rx0.channel.yaml --format svg --plot eye -o eye.svg', 'one picture'],
  ],
  async run({ paths, options, terminal }) {
    if (paths.length !== 1) throw new Refusal('`lanewright report` takes one channel file.');
    const workspace = openWorkspace(options);
    const analysis = analyse(await inputsFor(workspace, workspace.toFilePath(paths[0]), options), undefined, {
      until: 'link',
    });
    const page = await pages[typeof options.format === 'string' ? options.format : 'html'](
      analysis,
      typeof options.plot === 'string' ? options.plot : undefined,
    );
    if (typeof options.output === 'string') await writeAtomically(options.output, page);
    else terminal.out(page);
    const levels = ['error', 'warning', 'info', 'hint'];
    const failing = levels.slice(0, levels.indexOf(String(options['fail-on'] ?? 'never')) + 1);
    return analysis.findings.some(({ severity, waivedBy }) => !waivedBy && failing.includes(severity)) ? 1 : 0;
  },
};
