/** Exponential: S(t) = exp(−t / scale). */
import { type Family, requirePositive } from './family.js';
import { logLocationScale } from './log-location-scale.js';
import { smallestExtremeValue } from './standard.js';

export const exponential: Family = {
  name: 'exponential',
  parameterNames: ['scale'],
  logLocationScale: true,
  spread: () => 1,
  parameters: (free) => [Math.exp(free[0] as number)],
  free: ([scale]) => Float64Array.of(Math.log(requirePositive('scale', scale as number))),
  slopes: (free) => [Math.exp(free[0] as number)],
  at: (free) => logLocationScale(smallestExtremeValue, free[0] as number, 1),
  jetsAt: (free) => {
    const location = free[0] as number;
    return {
      logDensity: (_age, logAge, out) => {
        const w = Math.exp(logAge - location);
        out[0] = -location - w;
        out[1] = w - 1;
        out[2] = -w;
      },
      logSurvival: (_age, logAge, out) => {
        const w = Math.exp(logAge - location);
        out[0] = -w;
        out[1] = w;
        out[2] = -w;
      },
    };
  },
  start: ({ ages, cdf }) => Float64Array.of(Math.log(ages[1]) - Math.log(-Math.log1p(-cdf[1]))),
};
