import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { capacitorKind } from '../elements/capacitor';
import type { AnyElement } from '../model/types';
import type { PrepareContext } from '../networks/types';
import { computeTime } from '../time/compute-time';
import { gridFor, modelOf } from '../time/testing';
import { computeLink } from './compute-link';
import { droopOf } from './droop';

/** A coupling capacitor as the model holds it. */
function capacitor(farads: number, name = 'coupling'): AnyElement {
  const place = { file: 'test.channel.yaml', path: ['path', 0] };
  const quantity = {
    value: farads,
    dimension: 'capacitance',
    text: '',
    unit: 'F',
    plus: 0,
    minus: 0,
    threeSigma: false,
  };
  return {
    kind: 'capacitor',
    name,
    index: 0,
    place,
    values: { value: quantity },
    places: {},
    derived: {},
    reversed: false,
    active: false,
    incomplete: false,
  } as AnyElement;
}

checkValues({
  id: 'N-17',
  what: 'Corner of 100 nF in each leg between 50 ohm of each leg, Hz',
  source: 'exact, 1/(2π C 100 ohm)',
  relativeTolerance: 5e-5, // the list gives five digits
  compute: () => 1 / (2 * Math.PI * droopOf(modelOf({ elements: [capacitor(100e-9)] }))!.timeConstantSeconds),
  rows: [{ expected: 15.915e3 }],
});

test('two capacitors in series halve the time constant, and the longest run sets the droop', () => {
  const model = modelOf({ longestRun: 100, elements: [capacitor(10e-9), capacitor(10e-9, 'second')] });
  const droop = droopOf(model)!;
  expect(droop.timeConstantSeconds).toBeCloseTo(100 * 5e-9, 15);
  expect(droop.share).toBeCloseTo(1 - Math.exp((-100 * 40e-12) / 500e-9), 12);
  expect(droop.capacitors).toEqual(['coupling', 'second']);
  expect(droopOf(modelOf())).toBeUndefined();
});

test('1 nF to 100 uF leave every cursor within 1e-4 of a short; droop alone takes from the eye', () => {
  const grid = gridFor(25e9, 8);
  const through = new Float64Array(8 * grid.points);
  for (let i = 0; i < grid.points; i++) through.set([0, 0, 1, 0, 1, 0, 0, 0], 8 * i);
  const change = { receiver: { noiseVolts: 1e-3 } };
  const short = modelOf(change);
  const wanted = computeLink(short, computeTime(short, { total: { differential: through } }, { grid }));
  let before = 0;
  for (const farads of [1e-9, 10e-9, 100e-9, 1e-6, 100e-6]) {
    const element = capacitor(farads);
    const model = modelOf({ ...change, elements: [element] });
    const prepared = capacitorKind.prepare(element, {} as PrepareContext)!;
    const context = { frequencies: grid.frequencies, referenceOhms: 100, singleEnded: false };
    const total = capacitorKind.network(prepared.parameters as never, context);
    const link = computeLink(model, computeTime(model, { total }, { grid }));
    link.cursors.forEach((value, i) => {
      expect(Math.abs(value - wanted.cursors[i])).toBeLessThan(1e-4 * wanted.mainCursorVolts);
    });
    const share = 1 - Math.exp((-40 * 40e-12) / (100 * farads));
    expect(link.droopVolts).toBeCloseTo(share, 9); // of a settled swing of 1 V
    expect(wanted.eyeHeightVolts - link.eyeHeightVolts).toBeCloseTo(share, 4);
    expect(link.eyeHeightVolts).toBeGreaterThan(before);
    before = link.eyeHeightVolts;
  }
});
