import { cascadeOf } from '../cascade/cascade';
import { elementKinds } from '../elements/index';
import { figureNamed, figuresOf } from '../figures/index';
import type { Figure } from '../figures/types';
import { computeLink } from '../link/compute-link';
import type { AnyElement } from '../model/types';
import type { Networks } from '../networks/types';
import type { Fix } from '../report';
import { computeTime } from '../time/compute-time';
import { latestOf } from './kept';
import type { Judged } from './types';
import { modelWith, prepareChanged } from './what-if';

/** The channel's networks with one element changed, on the grid that they have. undefined where it cannot be computed. */
function networksWith(judged: Judged, after: AnyElement): Networks | undefined {
  const prepared = prepareChanged(judged, after);
  if (!prepared || !judged.networks) return undefined;
  const kind = elementKinds[after.kind];
  const evaluate = (context: Networks['context']) => kind.network(prepared.parameters, context);
  const network = evaluate(judged.networks.context);
  const elements = judged.networks.elements.map((one) =>
    one.element.index === after.index ? { element: after, prepared, network, through: false, evaluate } : one,
  );
  return { ...judged.networks, elements };
}

/** Figures of the whole channel with one element changed: the same stages as an analysis, from the network of that element on. */
function figuresWith(judged: Judged, after: AnyElement): readonly Figure[] {
  const networks = networksWith(judged, after);
  if (!networks) return [];
  const model = modelWith(judged.model, after);
  const cascade = cascadeOf(networks, judged.cascade);
  const hasLink = judged.link && !judged.linkIsStale;
  const time = hasLink ? computeTime(model, cascade, networks) : undefined;
  const link = time && computeLink(model, time);
  return figuresOf({ model, networks, cascade, time, link, linkIsStale: false });
}

/** What a title tells, in words: loss where it changes, and the eye. */
const TOLD = [
  ['insertion-loss-at-nyquist', 'loss at Nyquist'],
  ['eye-height', 'eye height'],
  ['eye-width', 'eye width'],
] as const;

function gainOf(before: readonly Figure[], after: readonly Figure[]): readonly string[] {
  return TOLD.flatMap(([name, words]) => {
    const [was, becomes] = [figureNamed(before, name), figureNamed(after, name)];
    return was && becomes && was.text !== becomes.text ? [`${words} from ${was.text} to ${becomes.text}`] : [];
  });
}

/** A fix that can tell, when it is shown, what it does to loss and eye of the whole channel: computed once for each link, then kept. */
export function withGain(judged: Judged, after: AnyElement, fix: Fix): Fix {
  let told: { of: Judged['link']; fix: Fix } | undefined;
  const resolve = () => {
    const now = latestOf(judged);
    if (told && told.of === now.link) return told.fix;
    const title = [fix.title, ...gainOf(figuresOf(now), figuresWith(now, after))].join(', ');
    told = { of: now.link, fix: { ...fix, title } };
    return told.fix;
  };
  return { ...fix, resolve };
}
