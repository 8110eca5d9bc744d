/** Source: adaptive quadrature at 40 digits or more in mpmath, test/reference/cells.json and grouped.json. */
import { expect, test } from 'vitest';
import { cellProbability, survivorProbability } from '../../src/exposure/probability.js';
import { familyNamed } from '../../src/families/index.js';
import { loadCells } from '../reference/load.js';
import { near } from '../support/near.js';

for (const example of loadCells()) {
  test(`awkward cells: ${example.name}`, () => {
    const family = familyNamed(example.family);
    const free = family.free(family.parameterNames.map((p) => example.parameters[p] as number));
    const life = { family, free, delay: example.delay, limit: example.warranty ?? Infinity };
    const shipped = { from: example.cohort[0], to: example.cohort[1] };
    expect(example.cells.length).toBeGreaterThan(0);
    example.cells.forEach(([from, to], i) => {
      nearProbability(cellProbability(life, shipped, { from, to }), example.cellProbabilities[i] as number);
    });
    nearProbability(survivorProbability(life, shipped, example.cutOff), example.survivorProbability);
  });
}

/** Probabilities below 1e-30 are too small to matter; there the magnitude has to hold. */
function nearProbability(actual: number, expected: number): void {
  if (expected > 1e-30) near(actual, expected, 'cellProbability');
  else near(Math.log(actual), Math.log(expected), 'parameter', 'log of a vanishing probability');
}
