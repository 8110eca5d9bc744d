import { type Config, rulesOf } from '../config.js';
import type { Jets } from '../families/family.js';
import type { ProductRecords } from '../records.js';
import type { Exposed } from './exposed.js';

/**
 * Survivors of known age over the next `steps` steps of use of length `step` (in ageUnit), from their present ages. The
 * warranty limit and the delay are in ageUnit too.
 */
export function exposedAges(config: Config, records: ProductRecords, steps: number, step: number): Exposed {
  const rules = rulesOf(config, records.product);
  const limit = rules.warrantyDays ?? Infinity;
  const surviving = records.ages.filter((group) => group.outcome === 'surviving' && group.to < limit);
  const width = steps + 1;
  const chances = new Float64Array(surviving.length * width);
  const block = new Float64Array(16);
  const logSurvival = (jets: Jets, age: number): number => {
    const t = Math.min(age, limit) - rules.delayDays;
    if (t <= 0) return 0;
    jets.logSurvival(t, Math.log(t), block);
    return block[0] as number;
  };
  return {
    groups: surviving.map((group) => ({ units: group.quantity, planned: false })),
    periods: steps,
    columns: width,
    limited: limit < Infinity,
    chances: (jets) => {
      surviving.forEach((group, g) => {
        const start = logSurvival(jets, group.to);
        let before = start;
        for (let j = 0; j < width; j++) {
          const end = j < steps ? group.to + (j + 1) * step : limit;
          const after = j === steps && limit === Infinity ? before : Math.min(before, logSurvival(jets, end));
          chances[g * width + j] = Math.exp(before - start) * -Math.expm1(after - before);
          before = after;
        }
      });
      return chances;
    },
  };
}
