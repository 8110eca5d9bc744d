/** Loglogistic: F(t) = 1 / (1 + exp(−(log t − location) / scale)); location and scale are of log age. */
import { type Family, requireFinite, requirePositive } from './family.js';
import { logLocationScale, logLocationScaleJets, startOnLine } from './log-location-scale.js';
import { logistic } from './standard.js';

export const loglogistic: Family = {
  name: 'loglogistic',
  parameterNames: ['location', 'scale'],
  logLocationScale: true,
  spread: (free) => Math.exp(free[1] as number),
  parameters: (free) => [free[0] as number, Math.exp(free[1] as number)],
  free: ([location, scale]) =>
    Float64Array.of(
      requireFinite('location', location as number),
      Math.log(requirePositive('scale', scale as number)),
    ),
  slopes: (free) => [1, Math.exp(free[1] as number)],
  at: (free) => logLocationScale(logistic, free[0] as number, Math.exp(free[1] as number)),
  jetsAt: (free) => logLocationScaleJets(logistic, free[0] as number, free[1] as number),
  start: (near) => startOnLine(logistic, near),
};
