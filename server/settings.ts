import { type Connection, DidChangeConfigurationNotification, type InitializeParams } from 'vscode-languageserver';

/** What a user may set; every key has the prefix `lanewright.`, and may differ by folder. */
export interface Settings {
  readonly hints: {
    readonly loss: boolean;
    readonly stub: boolean;
    readonly derived: boolean;
    readonly defaults: boolean;
  };
  readonly lens: boolean;
  /** Findings of files that are not open. */
  readonly workspaceDiagnostics: boolean;
}

export const DEFAULT_SETTINGS: Settings = {
  hints: { loss: true, stub: true, derived: true, defaults: true },
  lens: true,
  workspaceDiagnostics: true,
};

export interface SettingsFollower {
  of(uri: string): Promise<Settings>;
  onChange(listener: () => void): void;
  listen(params: InitializeParams): void;
  /** After the handshake: asks to be told of changes. */
  register(): void;
}

/** Asks the client for settings by resource and keeps the answers until the client says that they changed. */
export function followSettings(connection: Connection): SettingsFollower {
  const kept = new Map<string, Promise<Settings>>();
  const listeners: (() => void)[] = [];
  let canAsk = false;
  let canRegister = false;
  let pushed: Settings = DEFAULT_SETTINGS;
  connection.onDidChangeConfiguration(({ settings }) => {
    kept.clear();
    if (settings && typeof settings === 'object' && 'lanewright' in settings)
      pushed = settingsFrom(settings.lanewright);
    for (const listener of listeners) listener();
  });
  return {
    async of(uri) {
      if (!canAsk) return pushed;
      let answer = kept.get(uri);
      if (!answer) {
        answer = connection.workspace
          .getConfiguration({ scopeUri: uri, section: 'lanewright' })
          .then(settingsFrom)
          .catch(() => DEFAULT_SETTINGS);
        if (kept.size > 500) kept.clear();
        kept.set(uri, answer);
      }
      return answer;
    },
    onChange: (listener) => void listeners.push(listener),
    listen({ capabilities }) {
      canAsk = capabilities.workspace?.configuration === true;
      canRegister = capabilities.workspace?.didChangeConfiguration?.dynamicRegistration === true;
    },
    register() {
      if (canRegister)
        connection.client
          .register(DidChangeConfigurationNotification.type, { section: 'lanewright' })
          .catch(() => undefined);
    },
  };
}

/** Takes what has the right type and the default for the rest: settings are typed by hand. */
export function settingsFrom(given: unknown): Settings {
  const at = (value: unknown, key: string): unknown =>
    value && typeof value === 'object' ? (value as Record<string, unknown>)[key] : undefined;
  const flag = (value: unknown, byDefault: boolean) => (typeof value === 'boolean' ? value : byDefault);
  const hints = at(given, 'hints');
  return {
    hints: {
      loss: flag(at(hints, 'loss'), true),
      stub: flag(at(hints, 'stub'), true),
      derived: flag(at(hints, 'derived'), true),
      defaults: flag(at(hints, 'defaults'), true),
    },
    lens: flag(at(given, 'lens'), true),
    workspaceDiagnostics: flag(at(given, 'workspaceDiagnostics'), true),
  };
}
