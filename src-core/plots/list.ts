import { eyePlot } from './eye';
import { impedancePlot } from './impedance';
import { insertionLossPlot } from './insertion-loss';
import { returnLossPlot } from './return-loss';
import { singleBitPlot } from './single-bit';
import type { Plot } from './types';

/** In the order in which they are shown. A new plot is its file and a line here. */
export const plots: readonly Plot[] = [insertionLossPlot, returnLossPlot, impedancePlot, singleBitPlot, eyePlot];
