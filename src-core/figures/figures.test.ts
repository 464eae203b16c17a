import { describe, expect, test } from 'vitest';
import { figuresOf, ledgerOf, limitOutcomes, resonanceText, verdictOf } from './index';
import { frequenciesWithin, insertionLossAt, phaseDelay, worstReturnLoss } from './measures';
import { computedOf, elementThat, grid, limit, linkWithEye, networkThat } from './testing';

const quantity = (value: number, dimension: string, at?: number | 'nyquist') => ({
  value,
  dimension,
  at,
  text: '',
  unit: '',
  plus: 0,
  minus: 0,
  threeSigma: false,
});
const dB = (value: number, at?: number | 'nyquist') => quantity(value, 'loss', at);

describe('measures', () => {
  const linear = networkThat({ lossDb: (f) => f / 1e9, delaySeconds: 0.45e-9 }).differential;

  test('loss is straight in dB between grid points', () => {
    expect(insertionLossAt(linear, grid, 7e9)).toBeCloseTo(7, 9);
    expect(insertionLossAt(linear, grid, 7.2e9)).toBeCloseTo(7.2, 9);
  });
  test('beyond the grid its last point holds, at 0 Hz its first', () => {
    expect(insertionLossAt(linear, grid, 90e9)).toBeCloseTo(40, 9);
    expect(insertionLossAt(linear, grid, -1)).toBe(0);
  });
  test('a frequency on a grid point does not see the notch beside it', () => {
    const notched = networkThat({ lossDb: (f) => (f === 10.5e9 ? 60 : 3) }).differential;
    expect(insertionLossAt(notched, grid, 10e9 * (1 + 1e-12))).toBeCloseTo(3, 9);
  });
  test('the phase is unwrapped over several turns', () => {
    expect(phaseDelay(linear, grid, 10e9)).toBeCloseTo(0.45e-9, 18);
  });
  test('more delay than the grid can tell is told with the help of what is known of it', () => {
    const long = networkThat({ lossDb: () => 1, delaySeconds: 7.3e-9 }).differential;
    expect(phaseDelay(long, grid, 10e9, 7.1e-9)).toBeCloseTo(7.3e-9, 18);
  });
  test('the worst return loss is told with its frequency and end', () => {
    const s = networkThat({ returnLossDb: () => 20, returnLossAtReceiverDb: (f) => (f === 6e9 ? 9 : 30) }).differential;
    expect(worstReturnLoss(s, grid, 10e9)).toMatchObject({ frequencyHz: 6e9, end: 'receiver' });
    expect(worstReturnLoss(s, grid, 10e9).lossDb).toBeCloseTo(9, 9);
    expect(worstReturnLoss(s, grid, 5e9)).toMatchObject({ end: 'transmitter' });
  });
  test('a band is judged at both ends and at each grid point between', () => {
    expect([...frequenciesWithin(grid, 0.8e9, 2e9)]).toEqual([0.8e9, 1e9, 1.5e9, 2e9]);
    expect([...frequenciesWithin(grid, 1e9, 1e9)]).toEqual([1e9]);
    expect([...frequenciesWithin(grid, 39.7e9, 60e9)]).toEqual([39.7e9, 40e9]);
  });
});

describe('limits', () => {
  const outcome = (kind: string, values: object, ...computed: Parameters<typeof computedOf>) => {
    const [whole, more] = computed;
    return limitOutcomes(computedOf(whole, { ...more, model: { limits: [limit(kind, 'it', values)] } }))[0];
  };
  const lossy = { lossDb: (f: number) => f / 1e9 };

  test.each([
    [10, true],
    [9.999, false],
  ])('insertion loss of 10 dB at Nyquist against %d dB: met is %s', (allowed, met) => {
    expect(outcome('insertion-loss', { max: [dB(allowed, 'nyquist')] }, lossy).met).toBe(met);
  });
  test('a mask is straight in dB over frequency; the point with the least in hand is told', () => {
    const bent = { lossDb: (f: number) => (f === 6e9 ? 7.5 : f / 1e9) };
    const result = outcome('insertion-loss', { max: [dB(2, 1e9), dB(11, 10e9)] }, bent);
    expect(result).toMatchObject({ met: false, atHz: 6e9 });
    expect(result.limit.value).toBeCloseTo(7, 9);
    expect(result.text).toBe('7.5 dB of 7 dB at 6 GHz');
  });
  test('a mask says nothing beyond its ends', () => {
    expect(
      outcome('insertion-loss', { max: [dB(2, 1e9), dB(6, 5e9)] }, { lossDb: (f) => (f > 5e9 ? 90 : 0) }).met,
    ).toBe(true);
  });
  test.each([
    ['transmitter', 12, true],
    ['receiver', 12, false],
    [undefined, 12, false],
    [undefined, 8, true],
  ] as const)('return loss seen from %s, at least %d dB: met is %s', (at, min, met) => {
    const whole = { returnLossDb: () => 15, returnLossAtReceiverDb: () => 8.0001 };
    expect(outcome('return-loss', { at, band: { fromHz: 1e9, toHz: 5e9, text: '' }, min: dB(min) }, whole).met).toBe(
      met,
    );
  });
  test.each([
    [0.05, 0.4, 0.04, 0.3, true, 'fits'],
    [0.05, 0.4, 0.05, 0.4, true, 'just fits'],
    [0.05, 0.4, 0.0501, 0.3, false, 'too high'],
    [0.05, 0.4, 0.04, 0.41, false, 'too wide'],
  ])(
    'an eye of %d V by %d UI against %d V by %d UI: met is %s, it %s',
    (height, width, wantedHeight, wantedWidth, met) => {
      const values = { height: quantity(wantedHeight, 'voltage'), width: quantity(wantedWidth, 'unitInterval') };
      expect(outcome('eye', values, {}, { link: linkWithEye(height, width) }).met).toBe(met);
    },
  );
  test('height and width hold, but the corner of the rhombus cuts the contour', () => {
    const link = linkWithEye(0.05, 0.4);
    link.density.openings[0].upper[40] = 0.004;
    const values = { height: quantity(0.045, 'voltage'), width: quantity(0.38, 'unitInterval') };
    expect(outcome('eye', values, {}, { link })).toMatchObject({
      met: false,
      text: 'eye 50 mV × 0.4 UI, at least 45 mV × 0.38 UI, whose corners cut the contour',
    });
  });
  test('an eye that is late passes a rhombus that is late with it, up to a quarter of its width', () => {
    const values = { height: quantity(0.02, 'voltage'), width: quantity(0.24, 'unitInterval') };
    const lateBy = (columns: number) => {
      const link = linkWithEye(0.05, 0.4);
      const [{ upper }] = link.density.openings;
      const moved = upper.map((_, i) => upper[i - columns] ?? 0);
      const openings = [{ upper: moved, lower: moved.map((edge) => -edge) }];
      return outcome('eye', values, {}, { link: { ...link, density: { ...link.density, openings } } }).met;
    };
    expect([3, 6, 9].map(lateBy)).toEqual([true, true, false]);
  });
  test('a width may be a time', () => {
    const values = { width: quantity(21e-12, 'time') };
    expect(outcome('eye', values, {}, { link: linkWithEye(0.05, 0.4) })).toMatchObject({
      met: false,
      actual: { unit: 'UI' },
    });
  });
  test('without a link the eye has no outcome', () => {
    expect(outcome('eye', { height: quantity(0.05, 'voltage') }, {})).toBeUndefined();
  });
});

describe('the ledger', () => {
  const elements = [
    elementThat('first', { lossDb: () => 4, delaySeconds: 1e-10 }, { budget: dB(5, 'nyquist') as never, owner: 'us' }),
    elementThat('second', { lossDb: () => 7, delaySeconds: 3e-10 }, { owner: 'us' }),
  ];
  const computed = computedOf(
    { lossDb: () => 12 },
    {
      elements,
      model: {
        limits: [limit('insertion-loss', 'all', { max: [dB(24, 'nyquist')] })],
        owners: [{ name: 'us', budget: dB(10) as never, place: { file: '', path: [] } }],
      },
    },
  );

  test('own losses add up along the path, and what is missing to the whole is reflections', () => {
    const ledger = ledgerOf(computed)!;
    expect(ledger.rows.map(({ cumulativeDb }) => Math.round(cumulativeDb))).toEqual([4, 11]);
    expect(ledger.rows[1].cumulativeShare).toBeCloseTo(11 / 24, 9);
    expect(ledger.reflectionsDb).toBeCloseTo(1, 9);
  });
  test('budgets and owners are held against own loss', () => {
    const ledger = ledgerOf(computed)!;
    expect(ledger.rows[0].budget).toMatchObject({ allowedDb: 5, text: '4 dB of 5 dB at 10 GHz' });
    expect(ledger.owners).toEqual([
      { owner: 'us', allowedDb: 10, spentDb: expect.closeTo(11, 9), text: '11 dB of 10 dB at 10 GHz' },
    ]);
  });
  test('an element that is not computed has a row without figures', () => {
    const rows = ledgerOf({
      ...computed,
      networks: { ...computed.networks!, elements: [{ ...elements[0], through: true }] },
    })!.rows;
    expect(rows).toMatchObject([{ element: 'first', figures: [], cumulativeDb: 0 }]);
  });
});

describe('figures and verdict', () => {
  const none = { findings: [], limits: [] };

  test('names of parameters carry their mode in a pair only', () => {
    const titles = (signalling: 'differential' | 'single-ended') =>
      figuresOf(computedOf({}, { model: { signalling } }))
        .map(({ title }) => title)
        .join();
    expect(titles('differential')).toContain('SDD21');
    expect(titles('single-ended')).toContain('(S21)');
    expect(titles('single-ended')).not.toContain('SDD');
  });
  test('a figure of an older text is marked', () => {
    const computed = { ...computedOf({}, { link: linkWithEye(0.061, 0.48) }), linkIsStale: true };
    expect(figuresOf(computed).find(({ name }) => name === 'eye-height')?.text).toBe('~61 mV');
  });
  test('a resonance is written in one way', () => {
    expect(
      resonanceText({ frequencyHz: 27.6e9, depthDb: 12, lossDb: 20, quality: 9, elements: ['dive', 'rise'] }),
    ).toBe('27.6 GHz, 12 dB deep, by dive or rise');
  });
  test('one line tells what is met', () => {
    const computed = computedOf(
      { lossDb: () => 18.2 },
      {
        link: linkWithEye(0.061, 0.48),
        model: { limits: [limit('insertion-loss', 'all', { max: [dB(24, 'nyquist')] })] },
      },
    );
    const judged = { ...computed, figures: figuresOf(computed), limits: limitOutcomes(computed), findings: [] };
    expect(verdictOf(judged)).toEqual({
      state: 'good',
      text: 'meets its limits: 18.2 dB of 24 dB at 10 GHz, eye 61 mV × 0.48 UI',
    });
  });
  test('one line tells what fails, what was accepted and what was left out', () => {
    const computed = computedOf(
      { lossDb: () => 26 },
      { model: { limits: [limit('insertion-loss', 'all', { max: [dB(24, 'nyquist')] })] } },
    );
    const limits = limitOutcomes(computed);
    const finding = {
      rule: 'insertion-loss',
      severity: 'error',
      subject: 'all',
      at: { file: '', path: [] },
      message: '',
    } as const;
    const judged = {
      ...computed,
      networks: { ...computed.networks!, without: ['dive'] },
      figures: figuresOf(computed),
      limits,
    };
    expect(verdictOf({ ...judged, findings: [finding] })).toEqual({
      state: 'errors',
      text: 'fails 1 of 1 limit: all: 26 dB of 24 dB at 10 GHz; without dive',
    });
    expect(verdictOf({ ...judged, findings: [{ ...finding, waivedBy: finding.at }] })).toEqual({
      state: 'good',
      text: 'meets its limits: 26 dB of 24 dB at 10 GHz (accepted); 1 finding accepted; without dive',
    });
  });
  test('without networks nothing is claimed', () => {
    const computed = { ...computedOf({}), networks: undefined, cascade: undefined };
    expect(verdictOf({ ...computed, figures: [], ...none })).toEqual({
      state: 'not-computed',
      text: 'not computed: line rate or path is missing',
    });
  });
});
