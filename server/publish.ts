import { CodeLensRefreshRequest, type Connection } from 'vscode-languageserver';
import { lensesOf } from '../src-core/assist/lenses';
import type { Renewed } from './analyses';
import { diagnosticsOf, otherFilesOf, type ResultIds } from './diagnostics';
import { previewChanged } from './protocol';
import { idOf, type Located } from './roots';
import type { Services } from './services';

const REFRESH_PAUSE = 10;

/** Tells the client what is new: findings by push, or by “ask again”; hints, lens and preview. */
export function publishRenewed(connection: Connection, services: Services, ids: ResultIds) {
  const { documents } = services;
  const lensTitles = new Map<string, string>();
  const previews = new Map<string, string>();
  const rounds = new Map<string, number>();
  const placedIn = new Map<string, readonly Located[]>();
  const wanted = new Set<'diagnostics' | 'hints' | 'lenses'>();

  const ask = (what: 'diagnostics' | 'hints' | 'lenses') => {
    if (wanted.size === 0) setTimeout(askNow, REFRESH_PAUSE);
    wanted.add(what);
  };
  const askNow = () => {
    const now = [...wanted];
    wanted.clear();
    for (const one of now) void refresh(one).catch(() => undefined);
  };
  const refresh = async (what: 'diagnostics' | 'hints' | 'lenses') => {
    if (what === 'diagnostics' && services.client.refreshDiagnostics) await connection.languages.diagnostics.refresh();
    if (what === 'hints' && services.client.refreshHints) await connection.languages.inlayHint.refresh();
    if (what === 'lenses' && services.client.refreshLenses) await connection.sendRequest(CodeLensRefreshRequest.type);
  };
  const push = (located: Located) => {
    const document = documents.at(located);
    const items = diagnosticsOf(services, located);
    void connection.sendDiagnostics({
      uri: documents.uriOf(located),
      ...(document && { version: document.version }),
      diagnostics: items,
    });
  };

  function renewed({ located, analysis, stage, cause }: Renewed): void {
    const id = idOf(located);
    const others = otherFilesOf(analysis).map((file) => ({ root: located.root, file }));
    const touched = [...others, ...(placedIn.get(id) ?? [])];
    placedIn.set(id, others);
    if (services.client.pullDiagnostics) {
      const isNews = (one: Located) =>
        documents.at(one) && ids.lastServed(idOf(one)) !== ids.idFor(idOf(one), diagnosticsOf(services, one));
      // Its own edit makes the client ask by itself.
      const own = stage === 'link' || cause === 'used' ? [located] : [];
      if ([...own, ...touched].some(isNews)) ask('diagnostics');
    } else {
      push(located);
      for (const one of touched) push(one);
    }
    if (cause === 'used' && stage === 'time') ask('hints');
    const title = lensesOf(analysis)[0]?.title ?? '';
    if (lensTitles.get(id) !== title) {
      lensTitles.set(id, title);
      ask('lenses');
    }
    const document = documents.at(located);
    if (document && analysis.model.file === located.file) {
      if (stage === 'time') rounds.set(id, (rounds.get(id) ?? 0) + 1);
      // The eye of the same text is news only if it was missing or old before.
      const state = `${rounds.get(id)} ${analysis.linkIsStale}`;
      if (previews.get(id) !== state) {
        previews.set(id, state);
        void connection.sendNotification(previewChanged, {
          uri: document.uri,
          version: document.version,
          stale: analysis.linkIsStale,
        });
      }
    }
  }
  return {
    renewed,
    ask,
    /** A closed file keeps no findings of ours, unless the client asks for those of closed files. */
    closed(located: Located, uri: string): void {
      const id = idOf(located);
      ids.forget(id);
      lensTitles.delete(id);
      previews.delete(id);
      rounds.delete(id);
      const others = placedIn.get(id) ?? [];
      placedIn.delete(id);
      if (services.client.pullDiagnostics) return;
      void connection.sendDiagnostics({ uri, diagnostics: [] });
      for (const one of others) push(one);
    },
    /** For files that no analysis speaks of. */
    push(located: Located): void {
      if (services.client.pullDiagnostics) ask('diagnostics');
      else push(located);
    },
  };
}
