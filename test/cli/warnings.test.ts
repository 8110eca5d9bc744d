import { expect, test } from 'vitest';
import { warningsText } from '../../src/cli/print/warnings.js';
import type { Finding, MonthEnd } from '../../src/records.js';

const finding = (severity: Finding['severity'], message: string): Finding => ({
  code: 'c',
  severity,
  message,
});
const product = (name: string, findings: readonly Finding[]) => ({ product: name, segment: null, findings });
const result = {
  table: { findings: [finding('warning', 'the records end early'), finding('note', 'small')] },
  fit: { products: [product('A\n', [finding('warning', 'the curve leaves')])] },
  forecast: { products: [product('B', [finding('note', 'small'), finding('warning', 'wide')])] },
} as unknown as MonthEnd;

test('warnings of the records come first, those of products where they are not printed anyway', () => {
  expect(warningsText(result, false)).toBe('warning: the records end early\n');
  const lines = warningsText(result, true).trimEnd().split('\n');
  expect(lines).toHaveLength(3);
  expect(lines[1]).toMatch(/^warning: A.*: the curve leaves$/);
  expect(lines[2]).toBe('warning: B: wide');
});
