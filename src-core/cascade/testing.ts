import type { AnyElement } from '../model/types';
import { gridOf } from '../networks/grid';
import { type Abcd, cascadeAbcd, contextOf, equalLegs, lineOf, shuntSiemens, twoPortOf } from '../networks/testing';
import type { ElementNetwork, Networks, StubFact } from '../networks/types';

/** An element given by the chain matrix of a leg of 50 ohm at a frequency. */
export function legElement(
  name: string,
  at: (frequencyHz: number) => Abcd,
  stubs: readonly StubFact[] = [],
): ElementNetwork {
  const evaluate: ElementNetwork['evaluate'] = ({ frequencies, referenceOhms }) =>
    equalLegs(twoPortOf(frequencies, at, referenceOhms / 2));
  return {
    element: { kind: 'block', name } as AnyElement,
    prepared: { parameters: undefined, facts: { stubs }, notes: [] },
    network: equalLegs(new Float64Array()),
    through: false,
    evaluate,
  };
}

/** A matched line of a delay, its loss at 10 GHz growing with the root of frequency. */
export const lossyLine = (name: string, seconds: number, lossDb: number): ElementNetwork =>
  legElement(name, (f) => lineOf(50, 2 * Math.PI * f * seconds, (lossDb / 8.6859) * Math.sqrt(f / 10e9)));

/** An open branch of 50 ohm with a notch at a frequency; a little lossy, so that the notch has a bottom. */
export function stub(name: string, notchHz: number, nepers = 1e-3): ElementNetwork {
  const branch = (f: number): Abcd => {
    const [cosh, , c] = lineOf(50, (Math.PI / 2) * (f / notchHz), nepers * (f / notchHz));
    // Y of an open line: C/A
    const square = cosh[0] ** 2 + cosh[1] ** 2;
    return shuntSiemens([(c[0] * cosh[0] + c[1] * cosh[1]) / square, (c[1] * cosh[0] - c[0] * cosh[1]) / square]);
  };
  const fact: StubFact = {
    side: 'branch',
    lengthMeters: 1e-3,
    lengthRangeMeters: [1e-3, 1e-3],
    notchHz,
    lowestNotchHz: notchHz,
  };
  return legElement(name, branch, [fact]);
}

/** Networks of elements on a grid of 25 GBd, 512 points to 50 GHz. */
export function networksOf(elements: readonly ElementNetwork[]): Networks {
  const grid = gridOf(25e9, 8, 0);
  const context = contextOf(grid.frequencies);
  return {
    grid,
    context,
    elements: elements.map((element) =>
      element.network.differential.length ? element : { ...element, network: element.evaluate(context) },
    ),
    without: [],
  };
}

export { cascadeAbcd };
