import type { Fix } from '../report';
import type { Place } from '../text/types';
import { type Draft, headOf } from './draft';
import { type ModelReport, nameFixes, nameHint, quoted } from './reports';
import { copperLayers } from './stackups';
import type { Stackup } from './types';

/** Where the signal runs between two elements; `by` is the element that says so. */
interface Reached {
  readonly stackup: Stackup;
  /** Unknown behind a via whose end could not be derived. */
  readonly layer: string | undefined;
  readonly by: Draft;
}

/** These sit on the layer that is reached and leave it. */
const PASSED_OVER = new Set(['capacitor', 'stub']);

/**
 * Layers along the path: each trace's layer and each via's ends, derived from the nearest traces where they are not written; and
 * what does not fit together, each fault once.
 */
export function resolveLayers(drafts: readonly Draft[], reports: ModelReport[]): void {
  for (const draft of drafts) {
    if (draft.kind === 'trace') readTraceLayer(draft, reports);
    if (draft.kind === 'via') readViaLayers(draft, reports);
  }
  for (const draft of drafts) if (draft.kind === 'via' && draft.stackup) deriveEnds(drafts, draft, reports);
  walk(drafts, reports);
}

/** A layer's name as written at `key`, if the stackup has it and it may carry a signal; else a report. */
function signalLayer(
  draft: Draft,
  key: string,
  written: unknown,
  at: Place,
  reports: ModelReport[],
): string | undefined {
  const { stackup } = draft;
  if (typeof written !== 'string' || !stackup) return undefined;
  const layers = copperLayers(stackup);
  const signals = layers.filter(({ plane }) => !plane).map(({ name }) => name);
  const layer = layers.find(({ name }) => name === written);
  if (layer && !layer.plane) return written;
  reports.push(
    layer
      ? {
          rule: 'signal-on-plane',
          at,
          subject: draft.name,
          message: `${quoted(written)} is a plane of \`${stackup.name}\`; a signal runs on ${signals.map((name) => `\`${name}\``).join(', ') || 'no layer of it'}.`,
          related: [{ at: layer.place, message: `${quoted(written)} is a plane here.` }],
          fixes: nameFixes(at, '', signals),
        }
      : {
          rule: 'unknown-layer',
          at,
          subject: draft.name,
          message: `\`${stackup.name}\` has no copper layer ${quoted(written)}${nameHint(written, signals, 'layer')}`,
          fixes: nameFixes(at, written, signals),
        },
  );
  draft.incomplete = true;
  return key === 'span' || layer === undefined ? undefined : written;
}

function readTraceLayer(draft: Draft, reports: ModelReport[]): void {
  draft.layer = signalLayer(draft, 'layer', draft.values.layer, draft.places.layer, reports);
}

function readViaLayers(draft: Draft, reports: ModelReport[]): void {
  for (const end of ['from', 'to'] as const)
    draft[end] = signalLayer(draft, end, draft.values[end], draft.places[end], reports);
  const span = draft.values.span;
  if (!Array.isArray(span) || !draft.stackup) return;
  const names = copperLayers(draft.stackup).map(({ name }) => name);
  span.forEach((written, i) => {
    if (typeof written !== 'string' || names.includes(written)) return;
    const at: Place = { file: draft.places.span.file, path: [...draft.places.span.path, i] };
    draft.incomplete = true;
    reports.push({
      rule: 'unknown-layer',
      at,
      subject: draft.name,
      message: `\`${draft.stackup!.name}\` has no copper layer ${quoted(written)}${nameHint(written, names, 'layer')}`,
      fixes: nameFixes(at, written, names),
    });
  });
}

type Neighbour = { readonly layer: string } | 'none' | 'unreadable';

/** The layer on one side of a via, from the nearest element that sets one. */
function neighbour(drafts: readonly Draft[], via: Draft, step: -1 | 1): Neighbour {
  for (let at = via.index + step; drafts[at]; at += step) {
    const one = drafts[at];
    if (one.unknownKind) return 'unreadable';
    if (one.kind === 'trace' && (one.stackup || one.includedIn === undefined)) {
      if (one.stackup && one.stackup !== via.stackup) return 'unreadable'; // two stackups that meet have their own finding
      if (one.stackup && one.layer !== undefined) return { layer: one.layer };
      // A trace without stackup sets no layer; one whose stackup or layer cannot be read has its own finding.
      return Object.hasOwn(one.raw, 'stackup') || one.incomplete ? 'unreadable' : 'none';
    }
    if (one.kind === 'via' && one.stackup === via.stackup) {
      const near = step === 1 ? one.from : one.to;
      if (near !== undefined) return { layer: near };
      if (Object.hasOwn(one.raw, step === 1 ? 'from' : 'to')) return 'unreadable';
      if (one.includedIn === undefined) return 'none';
    } else if (one.kind === 'via') return 'unreadable'; // of no stackup, or of another: that has its own finding
    if (!PASSED_OVER.has(one.kind) && one.includedIn === undefined) return 'none';
  }
  return 'none';
}

function deriveEnds(drafts: readonly Draft[], via: Draft, reports: ModelReport[]): void {
  const lacking: ('from' | 'to')[] = [];
  for (const end of ['from', 'to'] as const) {
    if (Object.hasOwn(via.raw, end)) {
      if (via[end] === undefined) via.incomplete = true;
      continue;
    }
    const found = neighbour(drafts, via, end === 'from' ? -1 : 1);
    if (typeof found === 'object') {
      via[end] = found.layer;
      via.derived[end] = found.layer;
    } else {
      if (found === 'none') lacking.push(end);
      via.incomplete = true;
    }
  }
  if (lacking.length > 0) reports.push(missingEnds(via, lacking));
}

function missingEnds(via: Draft, ends: readonly ('from' | 'to')[]): ModelReport {
  const outer = outerLayers(via.stackup!);
  const at: Place = { file: via.place.file, path: via.place.path };
  const other = ends[0] === 'from' ? via.to : via.from;
  const offered = ends.length === 1 ? outer.filter((name) => name !== other) : outer;
  const fixes: Fix[] = (offered.length > 0 ? offered : outer).map((name, i) => {
    // Where both ends are open, the other outer layer is the other end.
    const texts = ends.map((end, e) => [end, e === 0 ? name : (outer[1 - i] ?? name)] as const);
    return {
      title: `Write ${texts.map(([end, text]) => `\`${end}: ${text}\``).join(' and ')}`,
      edits: texts.map(([end, text]) => ({ op: 'set', at, key: end, text, after: 'stackup' }) as const),
    };
  });
  const sides = ends.map((end) => (end === 'from' ? 'before' : 'after'));
  return {
    rule: 'layer-order',
    at: headOf(via),
    subject: via.name,
    message: `No trace of \`${via.stackup!.name}\` stands ${sides.join(' or ')} \`${via.name}\`, so its ${ends.map((end) => `\`${end}\``).join(' and ')} cannot be derived: write the layer.`,
    fixes,
  };
}

const outerLayers = (stackup: Stackup): string[] => {
  const layers = copperLayers(stackup);
  const outer = layers.length === 0 ? [] : [layers[0], layers[layers.length - 1]];
  return [...new Set(outer.map(({ name }) => name))];
};

/** From the transmitter on: what each element expects of the layer that is reached, and what it leaves. */
function walk(drafts: readonly Draft[], reports: ModelReport[]): void {
  let reached: Reached | undefined;
  for (const draft of drafts) {
    if (draft.kind === 'trace') reached = atTrace(draft, reached, reports);
    else if (draft.kind === 'via') reached = atVia(draft, reached, reports);
    else if (draft.kind === 'capacitor') atCapacitor(draft, reached, reports);
    else if (draft.kind !== 'stub') reached = undefined;
    if (draft.unknownKind) reached = undefined;
  }
}

function betweenStackups(draft: Draft, reached: Reached): ModelReport {
  return {
    rule: 'layer-order',
    // a part of another file is no fault where it stands
    at: draft.places.stackup.file === draft.place.file ? draft.places.stackup : headOf(draft),
    subject: draft.name,
    message: `\`${draft.name}\` is in \`${draft.stackup!.name}\`, \`${reached.by.name}\` before it in \`${reached.stackup.name}\`: a connector, cable, package or block has to stand between two stackups.`,
    related: [{ at: reached.by.places.stackup, message: `\`${reached.by.name}\` is in \`${reached.stackup.name}\`.` }],
  };
}

function atTrace(draft: Draft, reached: Reached | undefined, reports: ModelReport[]): Reached | undefined {
  const { stackup, layer } = draft;
  if (!stackup || layer === undefined) return undefined;
  const own: Reached = { stackup, layer, by: draft };
  if (!reached) return own;
  if (reached.stackup !== stackup) reports.push(betweenStackups(draft, reached));
  else if (reached.layer !== undefined && reached.layer !== layer)
    reports.push(wrongLayer(draft, layer, reached.layer, reached.by));
  return own;
}

function wrongLayer(draft: Draft, layer: string, reached: string, by: Draft): ModelReport {
  const at = draft.places.layer;
  const byVia = by.kind === 'via';
  const fixes: Fix[] = [{ title: `Change the layer to \`${reached}\``, edits: [{ op: 'value', at, text: reached }] }];
  if (byVia && Object.hasOwn(by.raw, 'to') && by.from !== layer) {
    fixes.push({
      title: `Let \`${by.name}\` go to \`${layer}\``,
      edits: [{ op: 'value', at: by.places.to, text: layer }],
    });
  }
  return {
    rule: 'layer-order',
    at,
    subject: draft.name,
    message: byVia
      ? `\`${draft.name}\` runs on \`${layer}\`, but the via \`${by.name}\` before it reaches \`${reached}\`.`
      : `\`${draft.name}\` runs on \`${layer}\`, but \`${by.name}\` before it on \`${reached}\`: a via is missing between them.`,
    related: [
      {
        at: byVia ? (by.places.to ?? by.place) : by.places.layer,
        message: `\`${by.name}\` ${byVia ? 'reaches' : 'runs on'} \`${reached}\`.`,
      },
    ],
    fixes,
  };
}

function atVia(draft: Draft, reached: Reached | undefined, reports: ModelReport[]): Reached | undefined {
  const { stackup, from, to } = draft;
  if (!stackup) return undefined;
  if (reached && reached.stackup !== stackup) reports.push(betweenStackups(draft, reached));
  else if (reached?.layer !== undefined && from !== undefined && reached.layer !== from) {
    const at = draft.places.from;
    reports.push({
      rule: 'layer-order',
      at,
      subject: draft.name,
      message: `\`${draft.name}\` is written to leave \`${from}\`, but \`${reached.by.name}\` before it ${reached.by.kind === 'via' ? 'reaches' : 'runs on'} \`${reached.layer}\`.`,
      related: [
        {
          at: reached.by.places[reached.by.kind === 'via' ? 'to' : 'layer'] ?? reached.by.place,
          message: `\`${reached.layer}\` is reached here.`,
        },
      ],
      fixes: [
        { title: `Change it to \`${reached.layer}\``, edits: [{ op: 'value', at, text: reached.layer }] },
        { title: 'Remove it: it is derived', edits: [{ op: 'remove', at }] },
      ],
    });
  } else if (from !== undefined && to !== undefined && !checkSpan(draft, stackup, from, to, reports)) {
    return undefined; // where it ends is in doubt: what follows is not held against it
  }
  return { stackup, layer: to, by: draft };
}

/** Whether a via's layers differ and its span holds both; else a report. */
function checkSpan(draft: Draft, stackup: Stackup, from: string, to: string, reports: ModelReport[]): boolean {
  if (from === to) {
    draft.incomplete = true;
    const written = (['to', 'from'] as const).find((end) => Object.hasOwn(draft.raw, end));
    reports.push({
      rule: 'layer-order',
      at: written ? draft.places[written] : headOf(draft),
      subject: draft.name,
      message: `Both ends of \`${draft.name}\` are on \`${from}\`: a via joins two layers.`,
      fixes: [{ title: `Remove \`${draft.name}\``, edits: [{ op: 'remove', at: draft.place }] }],
    });
    return false;
  }
  const span = draft.values.span;
  if (!Array.isArray(span) || span.length !== 2) return true;
  const names = copperLayers(stackup).map(({ name }) => name);
  const [first, last] = span.map((name) => names.indexOf(name as string)).sort((a, b) => a - b);
  if (first < 0) return true;
  const outside = [from, to].filter((name) => names.indexOf(name) < first || names.indexOf(name) > last);
  if (outside.length === 0) return true;
  draft.incomplete = true;
  const wanted = [first, last, names.indexOf(from), names.indexOf(to)];
  const text = `[${names[Math.min(...wanted)]}, ${names[Math.max(...wanted)]}]`;
  reports.push({
    rule: 'layer-order',
    at: draft.places.span,
    subject: draft.name,
    message: `\`${draft.name}\` spans \`${names[first]}\` to \`${names[last]}\` and does not reach ${outside.map((name) => `\`${name}\``).join(' or ')}.`,
    fixes: [{ title: `Change the span to \`${text}\``, edits: [{ op: 'value', at: draft.places.span, text }] }],
  });
  return false;
}

function atCapacitor(draft: Draft, reached: Reached | undefined, reports: ModelReport[]): void {
  if (reached?.layer === undefined || draft.includedIn !== undefined) return;
  const outer = outerLayers(reached.stackup);
  if (outer.includes(reached.layer)) return;
  reports.push({
    rule: 'layer-order',
    at: headOf(draft),
    subject: draft.name,
    message: `\`${draft.name}\` sits on an outer layer, ${outer.map((name) => `\`${name}\``).join(' or ')}, but \`${reached.by.name}\` before it ${reached.by.kind === 'via' ? 'reaches' : 'runs on'} \`${reached.layer}\`: a via is missing.`,
    related: [{ at: reached.by.place, message: `\`${reached.layer}\` is reached here.` }],
  });
}
