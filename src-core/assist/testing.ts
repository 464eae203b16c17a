import { analyse } from '../analyse';
import type { AnalyseOptions, Analysis } from '../analysis';
import { gatherInputs } from '../inputs';
import type { FilePath } from '../text/types';

/** Splits a text at `‸`, which marks the cursor in tests. */
export function atCursor(marked: string): { text: string; offset: number } {
  const offset = marked.indexOf('‸');
  if (offset === -1) throw new Error('no ‸ in the text');
  return { text: marked.slice(0, offset) + marked.slice(offset + 1), offset };
}

export const BOARD = `lanewright: 1
materials:
  core: { dk: 3.4 @ 10 GHz, df: 0.004 @ 10 GHz }
foils:
  smooth: { conductivity: 58 MS/m }
stackups:
  main:
    - { copper: L1, thickness: 40 um, foil: smooth }
    - { dielectric: d1, material: core, thickness: 110 um }
    - { copper: L2, thickness: 17 um, plane: true }
    - { dielectric: d2, material: core, thickness: 200 um }
    - { copper: L3, thickness: 17 um }
    - { dielectric: d3, material: core, thickness: 200 um }
    - { copper: L4, thickness: 17 um, plane: true }
parts:
  mate:
    kind: connector
    delay: 60 ps
    impedance: 96 ohm
    loss: 0.5 dB @ 5 GHz
`;

/** Before \`path\`, so that a test need write its elements only. */
export const HEAD = `lanewright: 1
line-rate: 10 Gb/s
use:
  board: board.parts.yaml
`;

export const LANE = 'lane.channel.yaml';

/** The analysis of a lane beside `board.parts.yaml`; other files as given. */
export async function analysed(
  text: string,
  others: Readonly<Record<FilePath, string>> = {},
  until: AnalyseOptions['until'] = 'link',
  file = LANE,
): Promise<Analysis> {
  const texts: Record<FilePath, string> = { 'board.parts.yaml': BOARD, ...others, [file]: text };
  const read = async (path: FilePath) =>
    Object.hasOwn(texts, path) ? { kind: 'text' as const, text: texts[path] } : { kind: 'missing' as const };
  return analyse(await gatherInputs({ read }, file, '2026-12-01'), undefined, { until });
}
