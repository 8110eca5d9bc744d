/** Lognormal: F(t) = Φ((log t − location) / scale); location and scale are of log age. */
import { logLocationScaleFamily } from './log-location-scale.js';
import { normal } from './standard.js';

export const lognormal = logLocationScaleFamily('lognormal', normal);
