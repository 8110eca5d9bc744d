/** Loglogistic: F(t) = 1 / (1 + exp(−(log t − location) / scale)); location and scale are of log age. */
import { logLocationScaleFamily } from './log-location-scale.js';
import { logistic } from './standard.js';

export const loglogistic = logLocationScaleFamily('loglogistic', logistic);
