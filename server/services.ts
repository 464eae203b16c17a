import type { Connection } from 'vscode-languageserver';
import type { Analyses } from './analyses';
import type { ClientAbilities } from './client-abilities';
import type { Documents } from './documents';
import type { RootFiles } from './files';
import type { Root, Roots } from './roots';
import type { SettingsFollower } from './settings';
import type { Workspace } from './workspace';

/** What every handler may use. */
export interface Services {
  readonly connection: Connection;
  readonly client: ClientAbilities;
  readonly roots: Roots;
  readonly documents: Documents;
  readonly analyses: Analyses;
  readonly settings: SettingsFollower;
  readonly workspace: Workspace;
  readonly filesOf: (root: Root) => RootFiles;
  /** URIs (in one spelling) of files opened without analysis. */
  readonly skipped: Set<string>;
  readonly log: Log;
  readonly version: string;
  /** Of the packaged reference of rules; '' where there is none. */
  readonly rulesReference: () => string;
}

export interface Log {
  info(message: string): void;
  error(message: string): void;
}
