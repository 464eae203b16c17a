import { NotificationType, type Position, type Range, RequestType, type WorkspaceEdit } from 'vscode-languageserver';
import type { FileContent, Place } from '../src-core/text/types';

/** The requests and notifications beyond the language server protocol; the extension uses these names too. */

/** Server to client, where the server has no disk: the text of a file, at most `limit` bytes of it. */
export const readFileRequest = new RequestType<{ uri: string; root: string; limit: number }, FileContent, void>(
  'lanewright/readFile',
);
/** Server to client, where the server has no disk: the entries of a folder. */
export const listFolderRequest = new RequestType<{ uri: string }, { name: string; kind: 'file' | 'folder' }[], void>(
  'lanewright/listFolder',
);

/** Client to server: what the preview draws of a file, `null` if there is nothing yet. */
export const previewRequest = new RequestType<
  { uri: string },
  { uri: string; version: number | null; data: unknown } | null,
  void
>('lanewright/preview');
/** Server to client: ask again. `stale`: only the eye is older than the text. */
export const previewChanged = new NotificationType<{ uri: string; version: number | null; stale: boolean }>(
  'lanewright/previewChanged',
);
/** Server to client, before and after each piece of work on a file: what was running is then known if the server dies. */
export const analysing = new NotificationType<{ uri: string; running: boolean }>('lanewright/analysing');

export interface ServerStatus {
  readonly version: string;
  readonly openFiles: number;
  readonly keptAnalyses: number;
  readonly busy: boolean;
  /** Opened without analysis since their analysis ended the server twice. */
  readonly skipped: readonly string[];
  /** How often each stage computed something, since the start. */
  readonly computed: Readonly<Record<string, number>>;
  readonly heapMegabytes?: number;
}
/** Client to server: counts for the status item and for "copy report", no contents. */
export const statusRequest = new RequestType<Record<string, never>, ServerStatus, void>('lanewright/status');
/** Client to server: analyse these after all, the user asked for it. */
export const analyseAgain = new NotificationType<{ uri: string }>('lanewright/analyseAgain');

/** What the extension hands over at the start. */
export interface InitializationOptions {
  /** URIs of files to open without analysis. */
  readonly skip?: readonly string[];
  /** URI of the packaged reference of rules; a rule's name is its anchor. */
  readonly rulesReference?: string;
  /** Version of the extension. */
  readonly version?: string;
  /** `YYYY-MM-DD` for waivers; today, UTC, if left out. For tests. */
  readonly today?: string;
}

/** The command behind the code action “Accept this finding…”, carried out by the extension, which asks reason, name and date. */
export const acceptFindingCommand = 'lanewright.acceptFinding';
/** Its one argument. `at`: the element or limit that a waiver names; `value`: as the finding writes it, proposed as `up-to`. */
export interface AcceptFinding {
  readonly uri: string;
  readonly rule: string;
  readonly at: string;
  readonly value?: string;
  readonly message: string;
}
/** Client to server: the edit that writes a waiver into the channel, for the newest text. `null` if the file is not open. */
export const waiverRequest = new RequestType<
  { uri: string; rule: string; at: string; upTo?: string; until: string; by: string; reason: string },
  WorkspaceEdit | null,
  void
>('lanewright/waiver');

/** Client to server: where a place stands in the newest text, for a click in the preview. */
export const rangeRequest = new RequestType<{ uri: string; place: Place }, { uri: string; range: Range } | null, void>(
  'lanewright/range',
);
/** Client to server: the element whose lines hold a position, for the preview's mark. */
export const elementAtRequest = new RequestType<{ uri: string; position: Position }, { element: string | null }, void>(
  'lanewright/elementAt',
);
