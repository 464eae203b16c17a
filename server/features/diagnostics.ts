import {
  type CancellationToken,
  type DocumentDiagnosticParams,
  type DocumentDiagnosticReport,
  DocumentDiagnosticReportKind,
  type FullDocumentDiagnosticReport,
  type ResultProgressReporter,
  type WorkspaceDiagnosticParams,
  type WorkspaceDiagnosticReport,
  type WorkspaceDiagnosticReportPartialResult,
  type WorkspaceDocumentDiagnosticReport,
} from 'vscode-languageserver';
import type { ClosedFiles } from '../closed-files';
import { diagnosticsOf, otherFilesOf, type ResultIds } from '../diagnostics';
import { located } from '../handler';
import { idOf, type Located } from '../roots';
import type { Services } from '../services';

/** A file's findings when the client asks for them; `unchanged` where they say the same as before. */
export const documentDiagnostics =
  (services: Services, ids: ResultIds, closed: ClosedFiles) =>
  async (
    { textDocument, previousResultId }: DocumentDiagnosticParams,
    token: CancellationToken,
  ): Promise<DocumentDiagnosticReport> => {
    const document = services.documents.get(textDocument.uri);
    if (!document) {
      const report = await closed.report(services.roots.locate(textDocument.uri), token);
      return report && report.resultId === previousResultId
        ? { kind: DocumentDiagnosticReportKind.Unchanged, resultId: report.resultId }
        : { kind: DocumentDiagnosticReportKind.Full, ...(report ?? { items: [] }) };
    }
    const at = await located(services, textDocument.uri, token);
    const items = diagnosticsOf(services, document.located);
    const resultId = ids.idFor(idOf(document.located), items);
    ids.served(idOf(document.located), resultId);
    const relatedDocuments =
      at && services.client.relatedDocuments
        ? relatedReports(services, document.located, otherFilesOf(at.analysis))
        : undefined;
    const related = relatedDocuments && Object.keys(relatedDocuments).length > 0 ? { relatedDocuments } : {};
    if (resultId === previousResultId) return { kind: DocumentDiagnosticReportKind.Unchanged, resultId, ...related };
    return { kind: DocumentDiagnosticReportKind.Full, resultId, items, ...related };
  };

/** Findings that an open file's analysis places in files that are not open: nobody else would show them. */
function relatedReports(
  services: Services,
  { root }: Located,
  files: readonly string[],
): Record<string, FullDocumentDiagnosticReport> {
  const reports: Record<string, FullDocumentDiagnosticReport> = {};
  for (const file of files) {
    if (services.documents.at({ root, file })) continue;
    reports[services.documents.uriOf({ root, file })] = {
      kind: DocumentDiagnosticReportKind.Full,
      items: diagnosticsOf(services, { root, file }),
    };
  }
  return reports;
}

/** Findings of files that are not open, one after the other while nothing is typed, handed over as they come. */
export const workspaceDiagnostics =
  (services: Services, closed: ClosedFiles) =>
  async (
    { previousResultIds }: WorkspaceDiagnosticParams,
    token: CancellationToken,
    _progress: unknown,
    partial?: ResultProgressReporter<WorkspaceDiagnosticReportPartialResult>,
  ): Promise<WorkspaceDiagnosticReport> => {
    const known = new Map(
      previousResultIds.map(({ uri, value }) => [idOf(services.documents.locate(uri)), { uri, value }]),
    );
    const items: WorkspaceDocumentDiagnosticReport[] = [];
    const give = (item: WorkspaceDocumentDiagnosticReport) =>
      partial ? partial.report({ items: [item] }) : items.push(item);
    for (const root of services.roots.all()) {
      const { workspaceDiagnostics: wanted } = await services.settings.of(root.uri);
      if (!wanted) continue;
      for (const file of await services.workspace.files(root, token)) {
        if (token.isCancellationRequested) return { items };
        const at = { root, file };
        const before = known.get(idOf(at));
        known.delete(idOf(at));
        if (services.documents.at(at)) continue;
        const report = await closed.report(at, token);
        if (!report) continue;
        const uri = services.roots.uriOf(at);
        if (report.resultId === before?.value)
          give({ kind: DocumentDiagnosticReportKind.Unchanged, uri, version: null, resultId: report.resultId });
        else if (report.items.length > 0 || before)
          give({ kind: DocumentDiagnosticReportKind.Full, uri, version: null, ...report });
      }
    }
    // Files that are gone, or no longer wanted, must not keep their findings.
    for (const [id, { uri }] of known) {
      const isOpen = services.documents.all().some((document) => idOf(document.located) === id);
      if (!isOpen && !token.isCancellationRequested)
        give({ kind: DocumentDiagnosticReportKind.Full, uri, version: null, items: [] });
    }
    return { items };
  };
