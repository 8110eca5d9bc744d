/** Weibull: S(t) = exp(−(t / scale)^shape); scale is the characteristic life. log T is location + scale · smallest extreme value. */
import { type Family, requirePositive } from './family.js';
import { logLocationScaleFamily } from './log-location-scale.js';
import { smallestExtremeValue } from './standard.js';

export const weibull: Family = {
  ...logLocationScaleFamily('weibull', smallestExtremeValue),
  parameterNames: ['scale', 'shape'],
  parameters: (free) => [Math.exp(free[0] as number), Math.exp(-(free[1] as number))],
  free: ([scale, shape]) =>
    Float64Array.of(
      Math.log(requirePositive('scale', scale as number)),
      -Math.log(requirePositive('shape', shape as number)),
    ),
  slopes: (free) => [Math.exp(free[0] as number), -Math.exp(-(free[1] as number))],
};
