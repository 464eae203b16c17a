import { describe, expect, test } from 'vitest';
import { throughFile } from '../rules/testing-base';
import { defaultThresholds, reasonsOf } from './policy';
import { joinReviews } from './review';
import { BOARD, CHANNEL, edited, reviewed } from './testing';
import type { ChannelReview } from './types';

const written = ({ changes }: ChannelReview) => changes.filter(({ derived }) => !derived).map(({ words }) => words);
const derived = ({ changes }: ChannelReview) => changes.filter((one) => one.derived).map(({ words }) => words);
const on = (from: string, to: string, file = CHANNEL) => [file, from, to] as const;

describe('what changed', () => {
  test('a value, and the stub that follows from the layer', async () => {
    const review = await reviewed(edited([on('part: board.hole }', 'part: board.long-hole }')]));
    expect(written(review)).toEqual(['dive: part board.hole → board.long-hole']);
    expect(derived(review).join()).toMatch(/dive: bottom stub 0.3 mm → 3\.\d+ mm/);
    expect(review).toMatchObject({ state: 'changed', why: 'itself', causes: [] });
    expect(review.figures.map(({ name }) => name)).toContain('insertion-loss-at-nyquist');
  });
  test('a laminate that the channel uses, and no other part of the same file', async () => {
    const other = on('delay: 40 ps, impedance: 95 ohm', 'delay: 44 ps, impedance: 95 ohm', BOARD);
    const review = await reviewed(edited([on('df: 0.003', 'df: 0.009', BOARD), other]));
    expect(written(review)).toEqual(['material core: df 0.003 @ 10 GHz → 0.009 @ 10 GHz']);
    expect(review.why).toEqual([BOARD]);
    expect(review.figures.find(({ name }) => name === 'insertion-loss-at-nyquist')?.better).toBe(false);
  });
  test('a file of parts of which the channel uses none that changed says nothing', async () => {
    const review = await reviewed(
      edited([on('delay: 40 ps, impedance: 95 ohm', 'delay: 44 ps, impedance: 95 ohm', BOARD)]),
    );
    expect(review).toMatchObject({ state: 'no-effect', changes: [], figures: [] });
    const whole = joinReviews([review], { base: 'a', head: 'b', policy: 'any' });
    expect(whole).toMatchObject({ channels: [], unchanged: 1, failed: { reasons: [] } });
  });
  test('an element that moved has moved, and was neither removed nor added', async () => {
    const line = '  - { capacitor: coupling, value: 100 nF }\n';
    const head = edited([on(line, ''), on('  - { via: rise', `${line}  - { via: rise`)]);
    const review = await reviewed(head);
    expect(written(review)).toEqual(['coupling moved from place 3 to 6']);
  });
  test('a renamed element keeps its references and computes the same', async () => {
    const limit = on('- { insertion-loss: whole,', '- { insertion-loss: whole, between: [run, mate],');
    const base = edited([limit]);
    const review = await reviewed(
      edited([on('trace: run', 'trace: main-run'), on('[run, mate]', '[main-run, mate]')], base),
      {
        base,
      },
    );
    expect(written(review)).toEqual(['run renamed to main-run']);
    expect(review).toMatchObject({ state: 'no-effect', figures: [], appeared: [], gone: [] });
  });
  test.each([
    ['a comment', on('title:', '# a remark\ntitle:'), []],
    [
      'the order of keys',
      on('trace: run, stackup: board.main, layer: L3', 'trace: run, layer: L3, stackup: board.main'),
      [],
    ],
    ['a unit', on('length: 100 mm', 'length: 10 cm'), ['run: length 100 mm → 10 cm']],
    ['a title', on('title: Rule example', 'title: Other'), ['channel: title Rule example → Other']],
  ])('%s has no effect', async (_, edit, words) => {
    const review = await reviewed(edited([edit]));
    expect(written(review)).toEqual(words);
    expect(review).toMatchObject({ state: 'no-effect', figures: [], causes: [], smallestMarginFall: 0 });
    expect(review.changes.every(({ electrical }) => !electrical)).toBe(true);
  });
  test('a connector’s data that are others under the same name', async () => {
    const placed = on(
      'connector: mate, delay: 50 ps, impedance: 100 ohm, loss: 0.3 dB @ 5 GHz',
      'connector: mate, touchstone: thru.s4p, ports: { enter: [1, 3], leave: [2, 4] }',
    );
    const base = edited([placed]);
    const head = new Map(base).set('thru.s4p', { kind: 'text', text: throughFile({ gain: 0.9 }) });
    const review = await reviewed(head, { base });
    expect(written(review)).toEqual(['thru.s4p: its data changed']);
    expect(review).toMatchObject({ state: 'changed', why: ['thru.s4p'] });
    const unused = new Map(head).set('short.s4p', { kind: 'text' as const, text: throughFile({ gain: 0.9 }) });
    expect((await reviewed(unused, { base: head })).changes).toEqual([]);
  });
  test('an added element is added, and those behind it have not moved', async () => {
    const via = '  - { via: extra, part: board.hole, to: L3 }\n';
    const stub = '  - { stub: probe, length: 0.5 mm, impedance: 50 ohm, dk: 3.6 }\n';
    const review = await reviewed(edited([on('  - { trace: approach', `${stub}  - { trace: approach`)]));
    expect(written(review)).toEqual(['probe added: stub: probe, length: 0.5 mm, impedance: 50 ohm, dk: 3.6']);
    const back = await reviewed(edited([]), {
      base: edited([on('  - { trace: approach', `${stub}  - { trace: approach`)]),
    });
    expect(written(back)).toEqual(['probe removed: stub: probe, length: 0.5 mm, impedance: 50 ohm, dk: 3.6']);
    // a via that leads nowhere is an error, which the review names
    const broken = await reviewed(edited([on('  - { trace: approach', `${via}  - { trace: approach`)]));
    expect(broken.appeared.some(({ severity }) => severity === 'error')).toBe(true);
  });
  test('the same edit through an anchor changes each place that takes it', async () => {
    const base = edited([
      on('length: 10 mm, impedance: 100 ohm }', 'length: 10 mm, impedance: &z 100 ohm }'),
      on('length: 5 mm, impedance: 100 ohm }', 'length: 5 mm, impedance: *z }'),
    ]);
    const review = await reviewed(edited([on('&z 100 ohm', '&z 95 ohm')], base), { base });
    expect(written(review)).toEqual(['breakout: impedance 100 ohm → 95 ohm', 'approach: impedance 100 ohm → 95 ohm']);
  });
  test('a material under another name, and whoever names it, compute the same', async () => {
    const head = new Map(edited([])).set(BOARD, {
      kind: 'text',
      text: (edited([]).get(BOARD) as { text: string }).text
        .replaceAll('material: core', 'material: laminate')
        .replace('  core:', '  laminate:'),
    });
    const review = await reviewed(head);
    expect(review).toMatchObject({ state: 'no-effect', figures: [] });
    expect(review.changes.every(({ group }) => group === 0)).toBe(true);
    expect(written(review)).toContain('core renamed to laminate');
  });
  test('a tightened tolerance is told, and moves no nominal figure', async () => {
    const base = edited([on('length: 100 mm, impedance: 100 ohm', 'length: 100 mm, impedance: 100 ohm ± 10%')]);
    const review = await reviewed(edited([on('100 ohm ± 10%', '100 ohm ± 5%')], base), { base });
    expect(written(review)).toEqual(['run: impedance 100 ohm ± 10% → 100 ohm ± 5%']);
    expect(review).toMatchObject({ state: 'changed', figures: [] });
  });
  test('an inch less one rounding is the same length', async () => {
    const base = edited([on('length: 100 mm', 'length: 4.5 mil')]);
    expect((await reviewed(edited([on('length: 4.5 mil', 'length: 114.3 um')], base), { base })).state).toBe(
      'no-effect',
    );
  });
  test('a renamed file is one channel, and a parts file that moved with it is the same', async () => {
    const moved = new Map(
      edited([on('board: board.parts.yaml', 'board: ../boards/b.parts.yaml'), on('other: other', 'other: ../other')]),
    );
    for (const [from, to] of [
      [CHANNEL, 'lanes/rx0.channel.yaml'],
      [BOARD, 'boards/b.parts.yaml'],
    ]) {
      moved.set(to, moved.get(from)!);
      moved.delete(from);
    }
    const review = await reviewed(moved, { file: 'lanes/rx0.channel.yaml', from: CHANNEL });
    expect(review).toMatchObject({ state: 'no-effect', changes: [], renamedFrom: CHANNEL });
  });
});

describe('what did it', () => {
  test('both ends of a layer swap are one group, beside another change; figures alone and without add up with what is together', async () => {
    const base = edited([on('{ via: dive, part: board.hole }', '{ via: dive, part: board.hole, to: L3 }')]);
    const swap = [on('to: L3 }', 'to: L6 }'), on('layer: L3', 'layer: L6')];
    const review = await reviewed(
      edited([...swap, on('length: 10 mm, impedance: 100 ohm }', 'length: 60 mm, impedance: 100 ohm }')], base),
      { base },
    );
    const groups = review.changes
      .filter(({ derived: follows }) => !follows)
      .map(({ subject, attribute, group }) => `${group} ${subject}.${attribute}`);
    expect(groups).toEqual(['1 breakout.length', '2 dive.to', '2 run.layer']);
    const loss = 'insertion-loss-at-nyquist';
    const step = (list: ChannelReview['figures'] | undefined) => {
      const change = list?.find(({ name }) => name === loss);
      return (change?.to?.value ?? 0) - (change?.from?.value ?? 0);
    };
    expect(review.causes).toHaveLength(2);
    const alone = review.causes.map((cause) => step(cause.alone));
    expect(alone[0]).toBeGreaterThan(0.3);
    expect(step(review.causes[0].without)).toBeLessThan(-0.3);
    const beyond = review.together?.find(({ name }) => name === loss)?.deltaText ?? '';
    expect(Number.parseFloat(beyond)).toBeCloseTo(step(review.figures) - alone[0] - alone[1], 1);
  });
  test('a group added to base has the figures of a file in which only it was written', async () => {
    const longer = on('length: 100 mm', 'length: 150 mm');
    const thinner = on('antipad: 0.7 mm', 'antipad: 0.6 mm', BOARD);
    const [both, one] = [await reviewed(edited([longer, thinner])), await reviewed(edited([longer]))];
    const alone = both.causes.find(({ words }) => words.includes('100 mm → 150 mm'))?.alone;
    expect(alone).toEqual(one.figures);
  });
});

describe('findings, limits and rules', () => {
  test('a limit that allows more, a waiver and a rule that judges less come as rows of their own', async () => {
    const head = edited([
      on('max: 12 dB', 'max: 14 dB'),
      on('limits:', 'waivers:\n  - { rule: eye, at: main, until: 2027-03-01, by: me, reason: later }\nlimits:'),
      on('lanewright: 1\n', 'lanewright: 1\nrules: { stub-resonance: off }\n', 'lanewright.config.yaml'),
    ]);
    const review = await reviewed(head);
    expect(review.loosened.map(({ words }) => words)).toEqual([
      'rule stub-resonance: severity warning → off',
      'whole: max 12 dB @ nyquist → 14 dB @ nyquist',
    ]);
    expect(review.waivers.map(({ subject, attribute }) => `${subject} ${attribute}`)).toEqual([
      'waiver of eye at main added',
    ]);
    expect(review.state).toBe('changed');
  });
  test('a tightened limit is no loosened one, and what fails it appears', async () => {
    const review = await reviewed(edited([on('max: 12 dB', 'max: 1 dB')]));
    expect(review.loosened).toEqual([]);
    expect(review.appeared.map(({ rule }) => rule)).toEqual(['insertion-loss']);
    expect(review.verdict.from?.state).toBe('good');
    expect(review.verdict.to?.state).toBe('errors');
  });
});

describe('the policy', () => {
  const reasons = (review: ChannelReview, policy: 'error' | 'regression' | 'any') =>
    reasonsOf(review, policy, defaultThresholds).length;
  test('a reserve that falls by less and by more than the threshold', async () => {
    const little = await reviewed(edited([on('length: 100 mm', 'length: 101 mm')]));
    const much = await reviewed(edited([on('length: 100 mm', 'length: 160 mm')]));
    expect([reasons(little, 'error'), reasons(little, 'regression'), reasons(little, 'any')]).toEqual([0, 0, 1]);
    expect(reasons(much, 'error')).toBe(0);
    expect(reasons(much, 'regression')).toBeGreaterThan(0);
  });
  test('an old error fails `error` alone; a new one fails every policy', async () => {
    const old = edited([on('max: 12 dB', 'max: 1 dB')]);
    const kept = await reviewed(edited([on('title: Rule', 'title: A rule')], old), { base: old });
    expect([reasons(kept, 'error'), reasons(kept, 'regression'), reasons(kept, 'any')]).toEqual([1, 0, 0]);
    const fresh = await reviewed(old);
    expect([reasons(fresh, 'error'), reasons(fresh, 'regression'), reasons(fresh, 'any')].every((n) => n > 0)).toBe(
      true,
    );
  });
  test('a head that cannot be computed is never green, under any policy', async () => {
    const review = await reviewed(edited([on('line-rate: 10 Gb/s\n', '')]));
    expect(review.state).toBe('broken');
    expect([reasons(review, 'error'), reasons(review, 'regression'), reasons(review, 'any')]).toEqual([1, 1, 1]);
    expect(review.notes.join()).toMatch(/HEAD .*not computed/);
  });
});

test('the worst stands first', async () => {
  const reviews = await Promise.all([
    reviewed(edited([on('title: Rule', 'title: A rule')])),
    reviewed(edited([on('length: 100 mm', 'length: 101 mm')])),
    reviewed(edited([on('length: 100 mm', 'length: 160 mm')])),
    reviewed(edited([on('line-rate: 10 Gb/s\n', '')])),
  ]);
  const { channels } = joinReviews(reviews, { base: 'a', head: 'b', policy: 'regression' });
  expect(channels.map((one) => reviews.indexOf(one))).toEqual([3, 2, 1, 0]);
});
