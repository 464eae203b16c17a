import { NotificationType, type Position, type Range, RequestType, type WorkspaceEdit } from 'vscode-languageclient';
import type { FileContent, Place } from '../../src-core/text/types';

/** The server's own requests and notifications; `server/protocol.ts` says what each means. `test/unit/own-protocol.test.ts` compares the two lists. */
export const readFileRequest = new RequestType<{ uri: string; root: string; limit: number }, FileContent, void>(
  'lanewright/readFile',
);
export const listFolderRequest = new RequestType<{ uri: string }, { name: string; kind: 'file' | 'folder' }[], void>(
  'lanewright/listFolder',
);
export const previewRequest = new RequestType<
  { uri: string },
  { uri: string; version: number | null; data: unknown } | null,
  void
>('lanewright/preview');
export const previewChanged = new NotificationType<{ uri: string; version: number | null; stale: boolean }>(
  'lanewright/previewChanged',
);
export const analysing = new NotificationType<{ uri: string; running: boolean }>('lanewright/analysing');
export const statusRequest = new RequestType<
  Record<string, never>,
  {
    version: string;
    openFiles: number;
    keptAnalyses: number;
    busy: boolean;
    skipped: readonly string[];
    computed: Readonly<Record<string, number>>;
    heapMegabytes?: number;
  },
  void
>('lanewright/status');
export const analyseAgain = new NotificationType<{ uri: string }>('lanewright/analyseAgain');
export const rangeRequest = new RequestType<{ uri: string; place: Place }, { uri: string; range: Range } | null, void>(
  'lanewright/range',
);
export const elementAtRequest = new RequestType<{ uri: string; position: Position }, { element: string | null }, void>(
  'lanewright/elementAt',
);
export const waiverRequest = new RequestType<
  { uri: string; rule: string; at: string; upTo?: string; until: string; by: string; reason: string },
  WorkspaceEdit | null,
  void
>('lanewright/waiver');
