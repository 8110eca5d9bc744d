/** The scenarios of warranty.json as the stages take them. */
import type { Config } from '../../src/config.js';
import type { Family } from '../../src/families/family.js';
import { familyNamed } from '../../src/families/index.js';
import type { ProductRecords } from '../../src/records.js';
import type { WarrantyScenario } from '../reference/load.js';
import { configWith, datedProduct, plainRules } from './data.js';

/** The settings of a scenario. */
export function scenarioConfig(scenario: WarrantyScenario, changes: Partial<Config> = {}): Config {
  const { asOf, period, horizon, warrantyMonths, warrantyDays, delayDays } = scenario;
  const delayReason = delayDays > 0 ? 'transit' : null;
  const everyProduct = { ...plainRules, warrantyMonths, warrantyDays, delayDays, delayReason };
  return configWith({ asOf, period, horizon, everyProduct, ...changes });
}

/** The records of a scenario under a product name. */
export function scenarioRecords(scenario: WarrantyScenario, product = 'W'): ProductRecords {
  const cohort = ([from, to, shipped]: WarrantyScenario['cohorts'][number]) => ({ from, to, shipped });
  const cell = ([cohort, from, to, quantity]: WarrantyScenario['returned'][number]) => ({
    cohort,
    from,
    to,
    quantity,
  });
  return datedProduct(product, scenario.cohorts.map(cohort), scenario.returned.map(cell), {
    withdrawn: scenario.withdrawn.map(cell),
    planned: scenario.planned.map(cohort),
  });
}

/** The family of an answer and its given parameters as free coordinates. */
export function givenLife(answer: WarrantyScenario['answers'][number]): {
  readonly family: Family;
  readonly free: Float64Array;
} {
  const family = familyNamed(answer.family);
  return {
    family,
    free: family.free(family.parameterNames.map((name) => answer.parameters[name] as number)),
  };
}
