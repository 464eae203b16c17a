import type { AnalyseOptions, Analysis, Inputs } from './analysis';
import { type SettledChain, settledChain } from './cascade/settled';
import { figuresOf, ledgerOf, limitOutcomes, verdictOf } from './figures/index';
import { fileKind, parseCached } from './inputs';
import { keepSame } from './keep-same';
import { computeLink } from './link/compute-link';
import type { Link } from './link/types';
import { buildModel } from './model/build';
import type { Model } from './model/types';
import { judge } from './rules/judge';
import type { Judged } from './rules/types';
import { sameValue } from './same-value';
import { emptyModel } from './stages/empty-model';
import { type Fault, internalFindings, OutOfTime } from './stages/faults';
import { linkInputs } from './stages/link-inputs';
import { keepTouchstones, type Touchstones } from './stages/touchstones';
import type { ParsedFile } from './text/parsed';
import type { FilePath } from './text/types';
import { computeTime } from './time/compute-time';
import type { Time } from './time/types';

/** What is handed from one analysis to the next: each stage beside what it was computed from. */
interface Kept {
  readonly touchstones: Touchstones;
  readonly chain?: SettledChain;
  readonly time?: Made<Time>;
  readonly link?: Made<Link>;
}

/** A stage's result and the inputs that it belongs to. */
interface Made<T> {
  readonly result: T;
  readonly from: unknown;
}

/**
 * Everything known of one file, each stage a function of the one before and kept until its own input changes. It returns, whatever
 * the files hold: broken text gives findings, and a fault of ours one of rule `internal` while the other stages stand.
 * @param previous the last analysis of this file, of which unchanged stages are taken; undefined for a cold start
 */
export function analyse(inputs: Inputs, previous: Analysis | undefined, options: AnalyseOptions): Analysis {
  const kept = previous?.kept as Kept | undefined;
  const run = startRun(options);
  const parsed = parseFiles(inputs, previous, run);
  const model = modelOf(inputs, parsed, previous, run);
  run.count('model', model === previous?.model ? 0 : 1);

  const touchstones = keepTouchstones(inputs, kept?.touchstones);
  const { keepGrid } = options;
  const wanted = options.until !== 'model' && model.computable;
  const chain = wanted
    ? run.attempt('networks', () =>
        settledChain(model, touchstones.of, kept?.chain, { keepGrid, checkTime: run.checkTime }),
      )
    : undefined;
  run.count('networks', chain?.computed.networks ?? 0);
  run.count('products', chain?.computed.products ?? 0);
  for (const { element, failure } of chain?.networks.failures ?? []) {
    run.faults.push({ stage: element.name, error: failure, at: element.place });
  }

  const read = linkInputs(model);
  const time =
    chain &&
    run.stage('time', kept?.time, [chain.cascade, read], () => computeTime(model, chain.cascade, chain.networks));
  const result = time?.result;
  const linkFrom = [result, read];
  const fresh = options.until === 'link' || (kept?.link && sameInputs(kept.link.from, linkFrom));
  const link =
    result && (fresh ? run.stage('link', kept?.link, linkFrom, () => computeLink(model, result)) : kept?.link);

  const stages = {
    inputs,
    parsed,
    model,
    networks: chain?.networks,
    cascade: chain?.cascade,
    time: result,
    link: link?.result,
    linkIsStale: link !== undefined && !sameInputs(link.from, linkFrom),
  };
  const told = run.attempt('figures', () => keptFigures(stages, previous)) ?? noFigures;
  const judged: Judged = { ...stages, ...told, timedOut: run.timedOut() };
  const found = run.attempt('rules', () => judge(judged)) ?? [];
  const findings = [...internalFindings(inputs, run.faults), ...found];
  return {
    ...judged,
    findings,
    verdict: run.attempt('verdict', () => verdictOf({ ...judged, findings })) ?? {
      state: 'not-computed',
      text: 'not computed',
    },
    kept: {
      touchstones: touchstones.kept,
      chain: chain ?? kept?.chain,
      time: time ?? kept?.time,
      link: link ?? kept?.link,
    } satisfies Kept,
    computed: run.computed,
  };
}

type Run = ReturnType<typeof startRun>;

/** Counts, faults and the clock of one analysis. */
function startRun({ outOfTime }: AnalyseOptions) {
  const faults: Fault[] = [];
  const computed: Record<string, number> = {};
  let over = false;
  const count = (stage: string, times: number) => {
    if (times > 0) computed[stage] = (computed[stage] ?? 0) + times;
  };
  const checkTime = () => {
    if (outOfTime?.()) throw new OutOfTime();
  };
  /** Undefined where the stage broke or the time was over. What tells the result needs no time to speak of and is always heard. */
  const attempt = <T>(stage: string, compute: () => T): T | undefined => {
    try {
      return compute();
    } catch (error) {
      if (error instanceof OutOfTime) over = true;
      else faults.push({ stage, error });
      return undefined;
    }
  };
  const stage = <T>(
    name: string,
    before: Made<T> | undefined,
    from: readonly unknown[],
    compute: () => T,
  ): Made<T> | undefined => {
    if (before && sameInputs(before.from, from)) return before;
    const result = attempt(name, () => {
      checkTime();
      return compute();
    });
    if (result === undefined) return undefined;
    count(name, 1);
    return { result, from };
  };
  return { faults, computed, count, checkTime, attempt, stage, timedOut: () => over };
}

/** Results of stages by identity, plain values by what they hold. */
const sameInputs = (a: unknown, b: readonly unknown[]): boolean => {
  const [stage, values] = a as readonly unknown[];
  return stage === b[0] && sameValue(values, b[1]);
};

/** Texts as parsed; one whose text is the same is the same object. */
function parseFiles({ files }: Inputs, previous: Analysis | undefined, run: Run): ReadonlyMap<FilePath, ParsedFile> {
  const parsed = new Map<FilePath, ParsedFile>();
  for (const [file, content] of files) {
    const kind = fileKind(file);
    if (content.kind !== 'text' || kind === 'touchstone' || kind === 'other') continue;
    const before = previous?.parsed.get(file);
    if (before?.text === content.text) {
      parsed.set(file, before);
      continue;
    }
    run.count('parsed', 1);
    const read = run.attempt(file, () => parseCached(file, content.text, before));
    parsed.set(file, read ?? { file, kind, text: content.text, value: null, reports: [], syntax: undefined });
  }
  return parsed;
}

/** The model before, where nothing that it is made of changed, or where what changed says the same. */
function modelOf(inputs: Inputs, parsed: Analysis['parsed'], previous: Analysis | undefined, run: Run): Model {
  if (previous && sameFiles(inputs, previous.inputs)) return previous.model;
  const model = run.attempt('model', () => buildModel(inputs, parsed)) ?? emptyModel(inputs);
  return previous ? keepSame(model, previous.model) : model;
}

function sameFiles(a: Inputs, b: Inputs): boolean {
  if (a === b) return true;
  const others = ({ files, ...rest }: Inputs) => rest;
  if (a.files.size !== b.files.size || !sameValue(others(a), others(b))) return false;
  return [...a.files].every(([file, content]) => b.files.get(file) === content);
}

type Stages = Omit<Judged, 'ledger' | 'figures' | 'limits' | 'timedOut'>;
type Told = Pick<Analysis, 'ledger' | 'figures' | 'limits'>;
const noFigures: Told = { ledger: undefined, figures: [], limits: [] };

/** Figures depend on the stages alone, not on ranges. */
function keptFigures(stages: Stages, previous: Analysis | undefined): Told {
  const names = ['model', 'networks', 'cascade', 'time', 'link', 'linkIsStale'] as const;
  if (previous && names.every((name) => previous[name] === stages[name])) {
    const { ledger, figures, limits } = previous;
    return { ledger, figures, limits };
  }
  return { ledger: ledgerOf(stages), figures: figuresOf(stages), limits: limitOutcomes(stages) };
}
