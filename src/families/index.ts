import { exponential } from './exponential.js';
import type { Family } from './family.js';
import { gamma } from './gamma.js';
import { loglogistic } from './loglogistic.js';
import { lognormal } from './lognormal.js';
import { weibull } from './weibull.js';

/** Every family that can be fitted, in the order of the default candidates. */
export const families: readonly Family[] = [exponential, weibull, lognormal, loglogistic, gamma];

/** Their names. */
export const familyNames: readonly string[] = families.map((family) => family.name);

/** The family of a name. @throws RangeError when there is none. */
export function familyNamed(name: string): Family {
  const family = families.find((candidate) => candidate.name === name);
  if (family === undefined)
    throw new RangeError(`unknown family ${name}, must be one of ${familyNames.join(', ')}`);
  return family;
}
