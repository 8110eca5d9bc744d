/** Source: 60-digit mpmath values, test/reference/tails.json. */
import { expect, test } from 'vitest';
import { familyNamed } from '../../src/families/index.js';
import { loadTails } from '../reference/load.js';
import { near } from '../support/near.js';

for (const { family: name, parameters, rows } of loadTails()) {
  const family = familyNamed(name);
  const free = family.free(family.parameterNames.map((p) => parameters[p] as number));
  test(`${name} ${JSON.stringify(parameters)} keeps both tails`, () => {
    expect(rows.length).toBeGreaterThan(5);
    const life = family.at(free);
    for (const row of rows) {
      near(life.logSurvival(row.x), row.logSurvival, 'tail', `log survival at ${row.x}`);
      near(life.logCdf(row.x), row.logCdf, 'tail', `log cdf at ${row.x}`);
      near(life.logDensity(row.x), row.logDensity, 'tail', `log density at ${row.x}`);
      near(
        Math.exp(life.logDensity(row.x) - life.logSurvival(row.x)),
        row.hazard,
        'tail',
        `hazard at ${row.x}`,
      );
      near(
        life.quantile(Math.log(row.p), row.tail),
        row.quantile,
        'tail',
        `quantile of ${row.p} ${row.tail}`,
      );
    }
  });
}
