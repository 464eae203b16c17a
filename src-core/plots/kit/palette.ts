/** Colours of a drawing by role. Series differ by dash and name first, by colour second. */
export interface Palette {
  readonly text: string;
  readonly frame: string;
  readonly grid: string;
  readonly limit: string;
  readonly missed: string;
  readonly mark: string;
  readonly background: string;
  readonly series: readonly string[];
}

export type PaletteName = 'vars' | 'print';

/** On white: text at least 7:1, lines at least 3:1. */
const print: Palette = {
  text: '#24292f',
  frame: '#6b7280',
  grid: '#e3e6ea',
  limit: '#5c4a00',
  missed: '#b3261e',
  mark: '#24292f',
  background: '#ffffff',
  series: ['#1f5fa8', '#a2480a', '#2f6f3e', '#6a3d9a'],
};

const named = (name: string, fallback: string) => `var(--plot-${name}, ${fallback})`;

/** Custom properties that the page maps to the editor's theme, with the print colours behind them. */
const vars: Palette = {
  text: named('text', print.text),
  frame: named('frame', print.frame),
  grid: named('grid', print.grid),
  limit: named('limit', print.limit),
  missed: named('missed', print.missed),
  mark: named('mark', print.mark),
  background: named('background', print.background),
  series: print.series.map((colour, i) => named(`series-${i + 1}`, colour)),
};

export const palettes: Readonly<Record<PaletteName, Palette>> = { vars, print };

const dashes: readonly (string | undefined)[] = [undefined, '7 3', '2 3', '9 3 2 3', '12 4', '4 2'];

/** Line style of the series at `index`: after the last dash the pattern repeats. */
export const dashOf = (index: number): string | undefined => dashes[index % dashes.length];
export const colourOf = (palette: Palette, index: number): string => palette.series[index % palette.series.length];
