import { describe, expect, it } from 'vitest';
import { near, type Quantity, tolerances } from './near.js';

describe('near', () => {
  const relative = Object.keys(tolerances).filter((k) => k !== 'logLikelihood') as Quantity[];

  it.each(relative)('judges %s by its share of the expected number', (quantity) => {
    const tolerance = tolerances[quantity];
    const allowed = 'relative' in tolerance ? tolerance.relative : Number.NaN;
    for (const expected of [3e-200, 0.25, -7, 4e15]) {
      near(expected * (1 + 0.9 * allowed), expected, quantity);
      near(expected * (1 - 0.9 * allowed), expected, quantity);
      expect(() => near(expected * (1 + 1.1 * allowed), expected, quantity)).toThrow(quantity);
      expect(() => near(expected * (1 - 1.1 * allowed), expected, quantity)).toThrow(quantity);
    }
  });

  it('judges a log likelihood by its absolute difference', () => {
    near(-3134.26 + 9e-8, -3134.26, 'logLikelihood');
    expect(() => near(-3134.26 + 1.1e-7, -3134.26, 'logLikelihood')).toThrow('absolute difference 1.10e-7');
  });

  it('shows both numbers, how far they are apart and what was compared', () => {
    expect(() => near(2, 1, 'parameter', 'shape')).toThrow(
      'parameter of shape: actual 2, expected 1, relative difference 1.00e+0, allowed 0.000001',
    );
  });

  it('lets nothing that is no number pass', () => {
    for (const actual of [Number.NaN, undefined, null, Infinity]) {
      expect(() => near(actual, 1, 'parameter')).toThrow();
      expect(() => near(actual, 1, 'logLikelihood')).toThrow();
    }
    expect(() => near(1, Number.NaN, 'parameter')).toThrow();
    expect(() => near(1e-300, 0, 'tail')).toThrow();
    near(-Infinity, -Infinity, 'tail');
  });
});
