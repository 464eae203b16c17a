/** What a reader of a report must know of its numbers: said on every page, in every format. */
export const caution =
  'These are planning estimates, computed from nominal values unless a finding says otherwise. They do not replace a full-wave model of a critical ' +
  'transition, a measurement, or the compliance test of the standard that governs the port: where they differ, those count.';

export interface Method {
  readonly what: string;
  readonly model: string;
  readonly holds: string;
}

/** The models behind the figures and where they hold; a finding `model-range` says where a file leaves that range. */
export const methods: readonly Method[] = [
  {
    what: 'Copper',
    model:
      'Skin effect joined to the DC resistance, at the declared temperature; Hammerstad and Jensen 1980 or Huray 2010 for roughness, with the reactance that belongs to it.',
    holds:
      'Hammerstad for shallow profiles, up to about 2 um rms; a low-profile foil above 20 GHz may lose more than it says.',
  },
  {
    what: 'Laminate',
    model: 'Causal wideband-Debye dielectric (Djordjević et al. 2001) through the declared Dk and Df.',
    holds: 'Df up to 0.2, within the band of the model.',
  },
  {
    what: 'Traces',
    model:
      'Quasi-TEM lines; closed forms of Hammerstad and Jensen, Kirschning and Jansen, Cohn, Wheeler for their cross-section.',
    holds:
      'Within the ratios that those authors give, typically 1 to 2 % of impedance; outer traces without mask and without their dispersion (at 40 GHz, 0.25 mm above the plane, they are some 2.5 % slower than computed); not where higher modes appear.',
  },
  {
    what: 'Declared loss',
    model:
      'Fitted by a√f + bf; the √f part with equal phase, the linear part with the dispersion that belongs to it; one impedance at all frequencies.',
    holds: 'As far as the points declared reach; with one point the split between the two parts is an assumption.',
  },
  {
    what: 'Vias',
    model: 'Barrel as line sections between planes, pads as capacitance, the rest beyond the layer as an open stub.',
    holds:
      'Impedance within some 10 to 15 %, while antipad and pitch are small against the wavelength; resonances between planes and between vias are not included.',
  },
  {
    what: 'Touchstone files',
    model: 'As measured or simulated, renormalised; continued to DC and tapered beyond the data.',
    holds: 'Within the range of the data.',
  },
  {
    what: 'Capacitors',
    model:
      'In the band their parasitics and pads; droop of the longest run in closed form from the terminations and the capacitances in series.',
    holds: 'While their corner lies far below the band.',
  },
  {
    what: 'Eye',
    model:
      'Statistical: linear, time-invariant, independent symbols; Gaussian noise, dual-Dirac and random jitter of the sampling instant, all at the target bit error ratio. ' +
      'Sampled where the first cursors before and after the main one balance (IEEE 802.3 Annex 93A).',
    holds:
      'For channels that spread a symbol; where a symbol arrives flat, a receiver may sample later and see more. Without crosstalk, without the clock recovery’s own jitter, without errors that a DFE passes on.',
  },
];
