import { analyse } from '../../src-core/analyse';
import type { Analysis } from '../../src-core/analysis';
import { CONFIG_NAME, fileKind, gatherInputs, parseCached } from '../../src-core/inputs';
import { show } from '../../src-core/quantity/show';
import type { Side } from '../../src-core/review/index';
import type { FileContent, FilePath } from '../../src-core/text/types';
import type { SideFiles } from '../git/revision';

/** A side with each file read once. */
export function keepReads(side: SideFiles): SideFiles {
  const kept = new Map<FilePath, Promise<FileContent>>();
  return {
    ...side,
    read(file) {
      let content = kept.get(file);
      if (!content) {
        content = side.read(file);
        kept.set(file, content);
      }
      return content;
    },
  };
}

const counts = (file: FilePath) => fileKind(file) !== 'other';

/** Files of ours, or that ours may name, whose contents differ; line ends alone are no difference. */
export async function changedPaths(base: SideFiles, head: SideFiles): Promise<ReadonlySet<FilePath>> {
  const changed = new Set<FilePath>();
  const [before, after] = [new Set(base.paths), new Set(head.paths)];
  for (const file of new Set([...base.paths, ...head.paths])) {
    if (!counts(file)) continue;
    if (!before.has(file) || !after.has(file)) changed.add(file);
    else if (base.identity(file) !== undefined && base.identity(file) === head.identity(file)) continue;
    else if (!sameContent(await base.read(file), await head.read(file))) changed.add(file);
  }
  return changed;
}

const normal = (text: string) => text.replace(/\r\n/g, '\n');

function sameContent(a: FileContent, b: FileContent): boolean {
  if (a.kind === 'text' && b.kind === 'text') return a.text === b.text || normal(a.text) === normal(b.text);
  return JSON.stringify(a) === JSON.stringify(b);
}

/** Whether a channel depends on one of the changed files, its nearest configuration included, that which is gone too. */
export async function dependsOn(
  side: SideFiles,
  file: FilePath,
  changed: ReadonlySet<FilePath>,
  today: string,
): Promise<readonly FilePath[]> {
  const { files } = await gatherInputs(side, file, today);
  const above = [...changed].filter(
    (path) => fileKind(path) === 'config' && file.startsWith(path.slice(0, -CONFIG_NAME.length)),
  );
  return [...new Set([...[...files.keys()].filter((path) => changed.has(path)), ...above])].sort();
}

/** The analysis of one side's channel, or why there is none. */
export async function analyseSide(
  side: SideFiles,
  file: FilePath,
  today: string,
  previous?: Analysis,
  outOfTime?: () => boolean,
): Promise<Side> {
  const inputs = await gatherInputs(side, file, today);
  const content = inputs.files.get(file);
  if (content?.kind === 'text') return { analysis: analyse(inputs, previous, { until: 'link', outOfTime }) };
  if (content?.kind === 'refused') return { missing: `is not read: ${content.reason}` };
  if (content?.kind === 'too-large') return { missing: `is larger than ${show.count(content.limit, 'byte')}` };
  return { missing: 'is not there' };
}

/** The configuration that holds at a path of one side, whether or not the file is there, as YAML gave it. */
export async function configAt(side: SideFiles, file: FilePath, today: string): Promise<unknown> {
  const { configFile, files } = await gatherInputs(side, file, today);
  const content = configFile === undefined ? undefined : files.get(configFile);
  return content?.kind === 'text' ? parseCached(configFile!, content.text).value : undefined;
}

/** An analysis without what only its own computing needs: many are kept until the review is printed. */
export const slim = (analysis: Analysis): Analysis => ({
  ...analysis,
  // an object of its own: what rules keep of the model they keep as long as it lives, networks and all
  model: { ...analysis.model },
  networks: undefined,
  cascade: undefined,
  time: undefined,
  link: undefined,
  kept: undefined,
  findings: analysis.findings.map(({ fixes: _fixes, ...finding }) => finding),
});
