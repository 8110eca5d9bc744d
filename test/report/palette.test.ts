import { describe, expect, it } from 'vitest';
import { readTemplates } from '../support/templates.js';

const style = readTemplates()['style.css'] ?? '';
const [light = '', dark = ''] = [...style.matchAll(/:root \{(.*?)\}/gs)].map((match) => match[1]);
const schemes = [
  ['light', variables(light)],
  ['dark', { ...variables(light), ...variables(dark) }],
] as const;

function variables(block: string): Readonly<Record<string, string>> {
  return Object.fromEntries([...block.matchAll(/--([\w-]+): (#[0-9a-f]{6});/g)].map((m) => [m[1], m[2]]));
}

/** Relative luminance, WCAG 2.2, section 8 (definitions). */
function luminance(colour: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const c = Number.parseInt(colour.slice(at, at + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  }) as [number, number, number];
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(colours: Readonly<Record<string, string>>, a: string, b: string): number {
  const [low, high] = [a, b].map((name) => luminance(colours[name] ?? '')).toSorted((x, y) => x - y) as [
    number,
    number,
  ];
  return (high + 0.05) / (low + 0.05);
}

describe.each(schemes)('the %s palette', (_name, colours) => {
  // WCAG 2.2, success criterion 1.4.3: text 4.5 to 1; 1.4.11: parts of graphics 3 to 1.
  it('has text that can be read', () => {
    for (const text of ['ink', 'soft', 'accent']) {
      for (const ground of ['paper', 'wash']) expect(contrast(colours, text, ground)).toBeGreaterThan(4.5);
    }
  });

  it('has figures that can be read on every shade', () => {
    const inks = ['soft', 'ink', 'ink', 'ink', 'heat-4-ink', 'on-dark', 'on-dark'];
    for (const [shade, ink] of inks.entries()) {
      expect(contrast(colours, ink, `heat-${shade}`), `heat-${shade}`).toBeGreaterThan(4.5);
    }
  });

  it('has marks that can be told from the paper', () => {
    for (const mark of ['accent', 'past', 'planned'])
      expect(contrast(colours, mark, 'paper')).toBeGreaterThan(3);
  });

  it('has shades in order of lightness, so that they hold in grey', () => {
    const shades = Array.from({ length: 7 }, (_, shade) => luminance(colours[`heat-${shade}`] ?? ''));
    const sorted = shades.toSorted((a, b) => (colours === schemes[0][1] ? b - a : a - b));
    expect(shades).toEqual(sorted);
  });
});
