/** Source: the grouped table v1 of test/reference/grouped.json, in closed form with mpmath at 45 digits. */
import { expect, test } from 'vitest';
import { parseIsoDate, parsePeriod } from '../../src/calendar.js';
import { cellProbability, survivorProbability } from '../../src/exposure/probability.js';
import { familyNamed } from '../../src/families/index.js';
import { loadGrouped } from '../reference/load.js';
import { near } from '../support/near.js';

const table = loadGrouped();
const months = table.shipMonths.map((label) => parsePeriod(label) as { from: number; to: number });
const cutOff = (parseIsoDate(table.asOf) as number) + 1;

test.each(table.fits.map((fit) => [fit.family, fit] as const))(
  '%s: every cell and survivor within 1e-9',
  (name, fit) => {
    const family = familyNamed(name);
    const free = family.free(family.parameterNames.map((parameter) => fit.parameters[parameter] as number));
    const life = { family, free, delay: 0, limit: Infinity };
    expect(fit.cellProbabilities.flat()).toHaveLength(78);
    months.forEach((cohort, i) => {
      fit.cellProbabilities[i]?.forEach((expected, j) => {
        const month = months[i + j] as { from: number; to: number };
        near(cellProbability(life, cohort, month), expected, 'cellProbability', `${i} ${j}`);
      });
      near(
        survivorProbability(life, cohort, cutOff),
        fit.survivorProbabilities[i] as number,
        'cellProbability',
        `S ${i}`,
      );
    });
  },
);
