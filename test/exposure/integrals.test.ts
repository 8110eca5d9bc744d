/** The written-out sums for none and for two coordinates against the readable form, in the same numbers. */
import { expect, test } from 'vitest';
import { ageGrid } from '../../src/exposure/grid.js';
import { integralsOn } from '../../src/exposure/integrals.js';
import type { Jets } from '../../src/families/family.js';
import { weibull } from '../../src/families/weibull.js';

const grid = ageGrid([1, 30, 61, 92, 365], 0, 'fit');
const jets = weibull.jetsAt(weibull.free([700, 1.7]));

/** The same density with a third coordinate that nothing depends on, which takes the readable form. */
const padded: Jets = {
  logDensity: (age, logAge, out) => {
    jets.logDensity(age, logAge, out);
    out.set([out[0], out[1], out[2], 0, out[3], out[4], 0, out[5], 0, 0] as number[]);
  },
  logSurvival: (age, logAge, out) => {
    jets.logSurvival(age, logAge, out);
    out.set([out[0], out[1], out[2], 0, out[3], out[4], 0, out[5], 0, 0] as number[]);
  },
};

/** Places of value, two slopes and three curvatures in a jet of three coordinates. */
const places = [0, 1, 2, 4, 5, 7];

test.each(['left', 'right', 'middle', 'below', 'above'] as const)('%s', (which) => {
  const [none, two, three] = [0, 2, 3].map((k) => integralsOn(grid, k, true));
  none?.evaluate(jets);
  two?.evaluate(jets);
  three?.evaluate(padded);
  const count = none?.[which].length as number;
  expect(count).toBeGreaterThan(4);
  for (let i = 0; i < count; i++) {
    expect(none?.[which][i]).toBeCloseTo(three?.[which][10 * i] as number, 14);
    places.forEach((place, j) => {
      expect(two?.[which][6 * i + j]).toBeCloseTo(three?.[which][10 * i + place] as number, 13);
    });
  }
});
