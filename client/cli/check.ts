import { analyse } from '../../src-core/analyse';
import type { Analysis } from '../../src-core/analysis';
import type { Finding } from '../../src-core/report';
import type { FileContent, FilePath } from '../../src-core/text/types';
import { type Command, Refusal } from './command';
import { findFiles, openWorkspace, type Workspace } from './files';
import { fixFile } from './fix';
import { dependentsAmong, inputsFor } from './inputs';
import { concise } from './printers/concise';
import { github } from './printers/github';
import { gitlab } from './printers/gitlab';
import { json } from './printers/json';
import { junit } from './printers/junit';
import { sarif } from './printers/sarif';
import { text } from './printers/text';
import type { MakePrinter, Printer } from './printers/types';
import { startProgress } from './progress';
import { writeAtomically } from './write';

declare const LANEWRIGHT_VERSION: string;

const printers: Record<string, MakePrinter> = { text, concise, json, sarif, github, junit, gitlab };
const LEVELS = ['error', 'warning', 'info', 'hint'] as const;

export const check: Command = {
  name: 'check',
  summary: 'Findings and a one-line verdict for each channel.',
  arguments: '[FILES|FOLDERS|-]',
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
      value: 'LEVEL',
      choices: [...LEVELS, 'never'],
      help: 'The least severity that makes the status 1. Default: error.',
    },
    {
      name: 'stdin-filename',
      value: 'FILE',
      help: 'The name under which the text on standard input (`-`) is checked; paths in it are relative to this file.',
    },
    { name: 'fix', help: 'Apply the safe fixes: spelling, units, dead waivers.' },
    {
      name: 'unsafe-fixes',
      help: 'With --fix or --diff: also the computed design changes, the preferred one of each finding.',
    },
    { name: 'diff', help: 'Show what --fix would change; write nothing.' },
    {
      name: 'add-waivers',
      value: 'BY',
      help: 'Accept every present finding by a waiver in the name of BY, to adopt an old repository. Needs --until and --reason.',
    },
    { name: 'until', value: 'YYYY-MM-DD', help: 'Last day of the waivers that --add-waivers writes.' },
    { name: 'reason', value: 'TEXT', help: 'Reason of the waivers that --add-waivers writes.' },
    { name: 'quiet', short: 'q', help: 'Tell errors alone.' },
    { name: 'stats', help: 'Say on stderr how often each stage computed something.' },
  ],
  examples: [
    ['lanewright check', 'everything below the current folder'],
    ['lanewright check lanes --format json', 'for a program to read'],
    ['lanewright check --format text --format json=out.json', 'both at once'],
    ['lanewright check --format github --format sarif=lanes.sarif', 'in a build: notes at the lines, alerts in a file'],
    ['lanewright check - --stdin-filename lanes/rx0.channel.yaml', 'a text that is not on disk yet'],
  ],
  async run({ paths, options, terminal }) {
    const stdin = await readStdin(paths, options, terminal.readStdin);
    const workspace = openWorkspace(options, stdin?.overlay);
    const files = stdin ? [workspace.toFilePath(stdin.path)] : await findFiles(workspace, paths);
    if (files.length === 0) {
      terminal.note('lanewright: no channel, parts or config file here.\n');
    }
    const failOn = typeof options['fail-on'] === 'string' ? options['fail-on'] : 'error';
    const failing =
      failOn === 'never'
        ? new Set<string>()
        : new Set<string>(LEVELS.slice(0, LEVELS.indexOf(failOn as (typeof LEVELS)[number]) + 1));
    const print = openPrinters(options, workspace, terminal, failing);
    const progress = startProgress(terminal, files.length, 'files');
    const total: Record<string, number> = {};
    const told = eachOnce(files);
    let failed = false;
    let timedOut = false;
    let previous: Analysis | undefined;
    const withThoseWhoUse = dependentsAmong(workspace, files, paths);
    for (const [index, file] of files.entries()) {
      const read = async () => withThoseWhoUse(await inputsFor(workspace, file, options));
      const inputs = await read();
      let analysis = analyse(inputs, previous, { until: 'link', outOfTime: fiveSeconds() });
      analysis = await fixFile(analysis, {
        workspace,
        options,
        terminal,
        analyseAgain: async () => analyse(await read(), undefined, { until: 'link' }),
      });
      const shown = told.once(analysis);
      print.file(shown);
      failed ||= shown.findings.some(({ severity, waivedBy }) => !waivedBy && failing.has(severity));
      timedOut ||= analysis.timedOut ?? false;
      for (const [stage, count] of Object.entries(analysis.computed)) total[stage] = (total[stage] ?? 0) + count;
      previous = analysis;
      progress.at(index + 1);
    }
    progress.end();
    await print.end();
    if (options.stats) terminal.note(`${JSON.stringify(total)}\n`);
    return timedOut ? 2 : failed ? 1 : 0;
  },
};

/**
 * A channel's analysis also holds what is wrong in the parts files that it uses. Each such finding is told once: with its own file
 * if that is checked too, else with the first channel that meets it.
 */
function eachOnce(files: readonly FilePath[]) {
  const checked = new Set(files);
  const told = new Set<string>();
  const isNew = ({ at, rule, message }: Finding) => {
    const key = JSON.stringify([at, rule, message]);
    return !told.has(key) && Boolean(told.add(key));
  };
  return {
    once: (analysis: Analysis): Analysis => ({
      ...analysis,
      findings: analysis.findings.filter(
        (finding) => finding.at.file === analysis.inputs.file || (!checked.has(finding.at.file) && isNew(finding)),
      ),
    }),
  };
}

/** design section 8: five seconds for one file */
function fiveSeconds(): () => boolean {
  const end = performance.now() + 5000;
  return () => performance.now() > end;
}

async function readStdin(
  paths: readonly string[],
  options: Readonly<Record<string, unknown>>,
  read: () => Promise<string>,
) {
  const name = options['stdin-filename'];
  if (!paths.includes('-')) {
    if (name !== undefined) throw new Refusal('`--stdin-filename` goes with `-`, the text on standard input.');
    return undefined;
  }
  if (paths.length > 1) throw new Refusal('`-` stands alone: the text on standard input is one file.');
  if (typeof name !== 'string')
    throw new Refusal('`-` needs `--stdin-filename FILE`, so that paths in it can be found.');
  const content: FileContent = { kind: 'text', text: await read() };
  const workspace = openWorkspace(options as { root?: string });
  return { path: name, overlay: new Map<FilePath, FileContent>([[workspace.toFilePath(name), content]]) };
}

/** One printer a `--format`, each to its own file or to stdout. @throws Refusal where two would share stdout */
function openPrinters(
  options: Readonly<Record<string, unknown>>,
  workspace: Workspace,
  terminal: Parameters<Command['run']>[0]['terminal'],
  failing: ReadonlySet<string>,
): { file: Printer['file']; end(): Promise<void> } {
  const wanted = (options.format as readonly string[] | undefined) ?? ['text'];
  const targets = wanted.map((choice) => {
    const [name, ...rest] = choice.split('=');
    return { name, path: rest.length ? rest.join('=') : undefined, chunks: [] as string[] };
  });
  if (targets.filter(({ path }) => path === undefined).length > 1)
    throw new Refusal(
      'Only one `--format` can go to standard output; give the others a file: `--format json=out.json`.',
    );
  const open = targets.map((target) => ({
    ...target,
    printer: printers[target.name]({
      write: target.path === undefined ? terminal.out : (chunk) => void target.chunks.push(chunk),
      colour: target.path === undefined && terminal.colour,
      shown: workspace.shown,
      version: LANEWRIGHT_VERSION,
      quiet: options.quiet === true,
      ...(failing.size > 0 && { failing }),
    }),
  }));
  return {
    file: (analysis) => {
      for (const { printer } of open) printer.file(analysis);
    },
    async end() {
      for (const { printer, path, chunks } of open) {
        printer.end();
        if (path !== undefined) await writeAtomically(path, chunks.join(''));
      }
    },
  };
}
