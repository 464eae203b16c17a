import { type CancellationToken, LSPErrorCodes, ResponseError } from 'vscode-languageserver';
import type { AnalyseOptions, Analysis, Inputs } from '../src-core/analysis';
import { fileKind } from '../src-core/inputs';
import type { FilePath, Files } from '../src-core/text/types';
import { idOf, type Located, type Root } from './roots';

export type Until = AnalyseOptions['until'];
const STAGES: readonly Until[] = ['model', 'time', 'link'];
const rank = (stage: Until | undefined) => (stage ? STAGES.indexOf(stage) : -1);

/** Milliseconds. A burst of key strokes is one analysis; the eye waits until typing rests. */
const EDIT_PAUSE = 5;
const REST_BEFORE_LINK = 15;
/** Whether somebody uses a part is told when typing rests: it changes no figure. */
const REST_BEFORE_DEPENDENTS = 300;
const TIME_FOR_ONE_FILE = 5000;

/** What the server hands in: the core's functions, files, a clock. Tests hand in their own. */
export interface AnalysesParts {
  readonly analyse: (inputs: Inputs, previous: Analysis | undefined, options: AnalyseOptions) => Analysis;
  readonly gather: (
    files: Files,
    file: FilePath,
    today: string,
    previous: Inputs | undefined,
    parsed: Analysis['parsed'] | undefined,
  ) => Promise<Inputs>;
  readonly filesOf: (root: Root) => Files;
  readonly today: () => string;
  readonly now: () => number;
  /** Lets messages in that have come meanwhile. */
  readonly pause: () => Promise<void>;
  /** Told before and after each piece of work; what it returns is waited for, so that it has left before the work begins. */
  readonly announce: (located: Located, running: boolean) => Promise<void>;
  readonly failed: (located: Located, error: unknown) => void;
}

/** A new result. `cause`: an edit of this very text, of a file that it uses, or only a later stage of the same text. */
export interface Renewed {
  readonly located: Located;
  readonly analysis: Analysis;
  readonly stage: Until;
  readonly cause: 'own' | 'used' | 'stage';
}

export interface Analyses {
  /** Keeps the file analysed from now on. */
  open(located: Located): void;
  close(located: Located): void;
  /** A text changed: itself and all that use it are renewed. `soon` in milliseconds. */
  changed(located: Located, soon?: number): void;
  /** Everything below a root is renewed, as after a change of the configuration. */
  allChanged(root?: Root, soon?: number): void;
  /** The analysis of the newest text, at least as far as `until`; undefined if the file is not open or broke the analysis. */
  current(located: Located, token?: CancellationToken, until?: Until): Promise<Analysis | undefined>;
  /** The newest result, which may be of an older text. */
  last(located: Located): Analysis | undefined;
  /** Why there is none although the file is open. */
  failure(located: Located): string | undefined;
  /** All open files with a result of their newest text. */
  all(): readonly { readonly located: Located; readonly analysis: Analysis }[];
  busy(): boolean;
  computed(): Readonly<Record<string, number>>;
  onRenewed(listener: (renewed: Renewed) => void): void;
}

interface Entry {
  readonly located: Located;
  /** Counts texts: of this file and of those that it uses. */
  generation: number;
  cause: 'own' | 'used';
  analysis?: Analysis;
  failure?: string;
  /** The generation that `analysis` or `failure` belongs to, and how far it went. */
  doneGeneration: number;
  doneStage?: Until;
  running?: Promise<void>;
  timer?: ReturnType<typeof setTimeout>;
  closed: boolean;
}

/** Whether its figures or findings may depend on the file, not only whether it is one that uses it. */
const isRead = ({ inputs }: Analysis, file: FilePath) => inputs.files.has(file) && !inputs.dependents?.includes(file);

const mayUse = (user: FilePath, parts: FilePath) =>
  fileKind(parts) === 'parts' && ['channel', 'parts'].includes(fileKind(user));

export function keepAnalyses(parts: AnalysesParts): Analyses {
  const entries = new Map<string, Entry>();
  const listeners: ((renewed: Renewed) => void)[] = [];
  const computed: Record<string, number> = {};
  let running = 0;

  const has = (entry: Entry, until: Until) =>
    entry.doneGeneration === entry.generation && rank(entry.doneStage) >= rank(until);

  /** One stage further, or nothing if the text changed meanwhile. */
  async function advance(entry: Entry, until: Until): Promise<void> {
    const { located, generation } = entry;
    const overtaken = () => entry.closed || entry.generation !== generation;
    running++;
    try {
      const inputs = await parts.gather(
        parts.filesOf(located.root),
        located.file,
        parts.today(),
        entry.analysis?.inputs,
        entry.analysis?.parsed,
      );
      // From the start: a text never seen is read first, so that a wait for names is short and a cancellation is heard.
      const stages = STAGES.filter(
        (stage) => rank(stage) <= rank(until) && (stage !== 'model' || !entry.analysis || until === 'model'),
      );
      for (const stage of stages) {
        if (overtaken()) return;
        if (has(entry, stage)) continue;
        await parts.announce(located, true);
        if (!overtaken()) step(entry, inputs, stage, generation);
        await parts.announce(located, false);
        await parts.pause();
      }
    } finally {
      running--;
    }
  }

  function step(entry: Entry, inputs: Inputs, stage: Until, generation: number): void {
    const isLaterStage = entry.doneGeneration === generation;
    const end = parts.now() + TIME_FOR_ONE_FILE;
    try {
      entry.analysis = parts.analyse(inputs, entry.analysis, {
        until: stage,
        keepGrid: stage === 'time',
        outOfTime: () => parts.now() > end,
      });
      entry.failure = undefined;
      for (const [name, times] of Object.entries(entry.analysis.computed))
        computed[name] = (computed[name] ?? 0) + times;
    } catch (error) {
      entry.analysis = undefined;
      entry.failure = error instanceof Error ? error.message : String(error);
      parts.failed(entry.located, error);
    }
    entry.doneGeneration = generation;
    entry.doneStage = entry.failure === undefined ? stage : 'link';
    if (!entry.analysis || stage === 'model') return;
    const renewed: Renewed = {
      located: entry.located,
      analysis: entry.analysis,
      stage,
      cause: isLaterStage && stage === 'link' ? 'stage' : entry.cause,
    };
    for (const listener of listeners) listener(renewed);
  }

  async function reach(entry: Entry, until: Until, token?: CancellationToken): Promise<void> {
    while (!entry.closed && !has(entry, until)) {
      if (token?.isCancellationRequested) throw new ResponseError(LSPErrorCodes.RequestCancelled, 'cancelled');
      entry.running ??= advance(entry, until).finally(() => {
        entry.running = undefined;
      });
      await entry.running;
    }
    if (token?.isCancellationRequested) throw new ResponseError(LSPErrorCodes.RequestCancelled, 'cancelled');
  }

  /** In the background: all but the eye at once, the eye when typing rests. */
  function schedule(entry: Entry, delay: number): void {
    clearTimeout(entry.timer);
    entry.timer = setTimeout(() => {
      reach(entry, 'time')
        .then(() => {
          if (entry.closed) return;
          clearTimeout(entry.timer);
          entry.timer = setTimeout(
            () => reach(entry, 'link').catch((error) => parts.failed(entry.located, error)),
            REST_BEFORE_LINK,
          );
        })
        .catch((error) => parts.failed(entry.located, error));
    }, delay);
  }

  function renew(entry: Entry, cause: Entry['cause'], delay: number): void {
    entry.generation++;
    entry.cause = cause;
    schedule(entry, delay);
  }

  const entryOf = (located: Located) => entries.get(idOf(located));
  return {
    open(located) {
      if (entryOf(located)) return;
      const entry: Entry = { located, generation: 1, doneGeneration: 0, cause: 'own', closed: false };
      entries.set(idOf(located), entry);
      schedule(entry, 0);
    },
    close(located) {
      const entry = entryOf(located);
      if (!entry) return;
      entry.closed = true;
      clearTimeout(entry.timer);
      entries.delete(idOf(located));
    },
    changed(located, soon = EDIT_PAUSE) {
      for (const entry of entries.values()) {
        if (entry.located.root.key !== located.root.key) continue;
        if (entry.located.file === located.file) renew(entry, 'own', soon);
        else if (!entry.analysis || isRead(entry.analysis, located.file)) renew(entry, 'used', soon);
        else if (mayUse(located.file, entry.located.file)) renew(entry, 'used', Math.max(soon, REST_BEFORE_DEPENDENTS));
      }
    },
    allChanged(root, soon = EDIT_PAUSE) {
      for (const entry of entries.values())
        if (!root || entry.located.root.key === root.key) renew(entry, 'used', soon);
    },
    async current(located, token, until = 'time') {
      const entry = entryOf(located);
      if (!entry) return undefined;
      await reach(entry, until, token);
      return entry.closed ? undefined : entry.analysis;
    },
    last: (located) => entryOf(located)?.analysis,
    failure: (located) => entryOf(located)?.failure,
    all: () =>
      [...entries.values()].flatMap(({ located, analysis, generation, doneGeneration }) =>
        analysis && generation === doneGeneration ? [{ located, analysis }] : [],
      ),
    busy: () => running > 0,
    computed: () => computed,
    onRenewed: (listener) => void listeners.push(listener),
  };
}
