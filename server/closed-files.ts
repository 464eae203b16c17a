import type { CancellationToken, Diagnostic } from 'vscode-languageserver';
import type { AnalyseOptions, Analysis, Inputs } from '../src-core/analysis';
import { fileKind } from '../src-core/inputs';
import type { FilePath, Files } from '../src-core/text/types';
import { type ResultIds, toDiagnostic } from './diagnostics';
import { idOf, type Located } from './roots';
import type { Services } from './services';

export interface ClosedReport {
  readonly resultId: string;
  readonly items: Diagnostic[];
}

/** Findings of files that are not open. The analysis is thrown away, its findings are kept until a file that they depend on changes. */
export interface ClosedFiles {
  report(located: Located, token: CancellationToken): Promise<ClosedReport | undefined>;
  changed(located: Located): void;
  clear(): void;
}

export interface ClosedFilesParts {
  readonly services: Services;
  readonly ids: ResultIds;
  readonly analyse: (inputs: Inputs, previous: Analysis | undefined, options: AnalyseOptions) => Analysis;
  readonly gather: (files: Files, file: FilePath, today: string, previous?: Inputs) => Promise<Inputs>;
  readonly today: () => string;
  readonly now: () => number;
  readonly pause: () => Promise<void>;
  readonly announce: (located: Located, running: boolean) => Promise<void>;
}

const TIME_FOR_ONE_FILE = 5000;
const rest = () => new Promise((resolve) => setTimeout(resolve, 5));

export function keepClosedFiles({
  services,
  ids,
  analyse,
  gather,
  today,
  now,
  pause,
  announce,
}: ClosedFilesParts): ClosedFiles {
  const kept = new Map<
    string,
    { report: ClosedReport; root: string; isParts: boolean; dependsOn: ReadonlySet<FilePath> }
  >();
  const quiet = async (token: CancellationToken) => {
    while (services.analyses.busy() && !token.isCancellationRequested) await rest();
  };
  return {
    async report(located, token) {
      const id = idOf(located);
      const known = kept.get(id);
      if (known) return known.report;
      if (services.skipped.has(id)) return undefined;
      // What is being typed goes first.
      await quiet(token);
      if (token.isCancellationRequested) return undefined;
      const inputs = await gather(services.filesOf(located.root), located.file, today());
      const content = inputs.files.get(located.file);
      if (!content || content.kind === 'missing') return undefined;
      await announce(located, true);
      let items: Diagnostic[];
      try {
        const end = now() + TIME_FOR_ONE_FILE;
        const first = analyse(inputs, undefined, { until: 'time', outOfTime: () => now() > end });
        await pause();
        await quiet(token);
        const analysis = analyse(inputs, first, { until: 'link', outOfTime: () => now() > end + TIME_FOR_ONE_FILE });
        const text = analysis.parsed.get(located.file)?.text ?? '';
        items = analysis.findings
          .filter(({ at, waivedBy }) => at.file === located.file && !waivedBy)
          .map((finding) => toDiagnostic(services, located, analysis, finding, text));
      } catch (error) {
        services.log.error(
          `${located.file}: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`,
        );
        items = [];
      } finally {
        await announce(located, false);
      }
      const report = { resultId: ids.idFor(`closed ${id}`, items), items };
      kept.set(id, {
        report,
        root: located.root.key,
        isParts: fileKind(located.file) === 'parts',
        dependsOn: new Set(inputs.files.keys()),
      });
      await pause();
      return report;
    },
    changed({ root, file }) {
      // Of a parts file's names this one may now use others, or some for the first time.
      const mayUse = ['channel', 'parts'].includes(fileKind(file));
      for (const [id, entry] of kept) {
        if (entry.root !== root.key) continue;
        if (entry.dependsOn.has(file) || (mayUse && entry.isParts)) kept.delete(id);
      }
    },
    clear: () => kept.clear(),
  };
}
