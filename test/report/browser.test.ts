import { existsSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type Browser, chromium } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { PredictedCount } from '../../src/records.js';
import { slugOf } from '../../src/report/names.js';
import { type ReportInput, renderReport } from '../../src/report/report.js';
import { reportInput } from '../support/report-input.js';
import { readTemplates } from '../support/templates.js';

const executablePath = '/usr/bin/chromium';
const flags = ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-sync'];
const quiet = ['--disable-background-networking', '--disable-component-update'];
const input = reportInput();
const pages = new Map([
  ...renderReport(input, readTemplates(), { singleFile: false }),
  ['huge.html', renderReport(hugeInput(), readTemplates(), { singleFile: true }).get('index.html') ?? ''],
]);

/** Returns and costs of the sum a million times as large. */
function hugeInput(): ReportInput {
  const huge = (count: PredictedCount): PredictedCount => ({
    expected: count.expected * 1e6,
    plugIn: count.plugIn * 1e6,
    quantiles: Object.fromEntries(Object.entries(count.quantiles).map(([p, y]) => [p, y * 1e6])),
  });
  const { forecast } = input;
  if (forecast === null) throw new Error('the fixture has a forecast');
  const total = {
    ...forecast.total,
    periods: forecast.total.periods.map((p) => ({ ...p, ...huge(p), cumulative: huge(p.cumulative) })),
    costs: [{ currency: 'JPY', expectedCost: 16_034_335_301 }],
  };
  return { ...input, forecast: { ...forecast, total } };
}

/** Lines of every large figure, and by how many pixels it reaches beyond its place. */
const figuresOnScreen = `Array.from(document.querySelectorAll('.value span'), (span) => {
  const range = document.createRange();
  range.selectNodeContents(span);
  const place = span.closest('.figures > div').getBoundingClientRect();
  const lines = range.getClientRects().length;
  return { text: span.textContent, lines, over: range.getBoundingClientRect().right - place.right };
})`;

/** The pages on disk, opened in a real browser; skipped where there is none. */
describe.skipIf(!existsSync(executablePath))('in a browser', () => {
  let browser: Browser;
  let folder: string;

  beforeAll(async () => {
    folder = mkdtempSync(join(tmpdir(), 'report-'));
    for (const [name, text] of pages) {
      mkdirSync(dirname(join(folder, name)), { recursive: true });
      writeFileSync(join(folder, name), text);
    }
    browser = await chromium.launch({ executablePath, args: ['--headless', ...flags, ...quiet] });
  });

  afterAll(async () => {
    await browser?.close();
    rmSync(folder, { recursive: true, force: true });
  });

  async function open(name: string, width: number) {
    const page = await browser.newPage({ viewport: { width, height: 900 } });
    const [messages, requests]: [string[], string[]] = [[], []];
    page.on('console', (message) => messages.push(message.text()));
    page.on('pageerror', (error) => messages.push(error.message));
    page.on('request', (request) => requests.push(request.url()));
    const url = pathToFileURL(join(folder, name)).href;
    await page.goto(url);
    return { page, url, messages, requests };
  }

  it('asks for nothing beyond the file, says nothing, applies its style', async () => {
    for (const name of pages.keys()) {
      const { page, url, messages, requests } = await open(name, 1280);
      expect(messages).toEqual([]);
      expect(requests).toEqual([url]);
      expect(await page.evaluate('getComputedStyle(document.querySelector("h1")).fontWeight')).toBe('650');
      await page.close();
    }
  });

  it('never scrolls the page sideways', async () => {
    for (const name of pages.keys()) {
      for (const width of [320, 768, 1280]) {
        const { page } = await open(name, width);
        expect(await page.evaluate('document.documentElement.scrollWidth'), `${name} at ${width}`).toBe(
          width,
        );
        await page.close();
      }
    }
  });

  it('breaks no figure and cuts none, however large', async () => {
    for (const name of ['index.html', 'huge.html']) {
      for (const width of [360, 768, 1280]) {
        const { page } = await open(name, width);
        const figures: { text: string; lines: number; over: number }[] = await page.evaluate(figuresOnScreen);
        expect(figures.length).toBeGreaterThanOrEqual(4);
        for (const { text, lines, over } of figures) {
          expect(lines, `${text} at ${width}`).toBe(1);
          expect(over, `${text} at ${width}`).toBeLessThan(0.5);
        }
        await page.close();
      }
    }
  });

  it('leaves room for the labels of the vertical axis, on screen and on paper', async () => {
    for (const medium of ['screen', 'print'] as const) {
      const { page } = await open('huge.html', 360);
      await page.emulateMedia({ media: medium });
      const over: number[] = await page.evaluate(
        `Array.from(document.querySelectorAll('.drawing text[text-anchor="end"].tick'), (t) =>
          t.closest('.drawing').getBoundingClientRect().left - t.getBoundingClientRect().left)`,
      );
      expect(over.length).toBeGreaterThan(0);
      expect(Math.max(...over)).toBeLessThan(0.5);
      await page.close();
    }
  });

  it('stops the tabulator key only where there is something to do', async () => {
    const { page } = await open(`products/${slugOf('Brook 40', null)}.html`, 1280);
    const stops: string[] = await page.evaluate(
      `Array.from(document.querySelectorAll('[tabindex]'), (e) => e.getAttribute('aria-label'))`,
    );
    expect(stops).toEqual(['Nevada-style table']);
    const [target, lead]: [number, number] = await page.evaluate(
      `[document.querySelector(document.querySelector('.skip').hash), document.querySelector('.lead')]
        .map((e) => e.getBoundingClientRect().top)`,
    );
    expect(target).toBeLessThan(lead);
    await page.close();
  });

  it('draws bars on screen as high as the counts', async () => {
    const { page } = await open('index.html', 768);
    const history = input.forecast?.total.history.map((h) => h.returned) ?? [];
    const bars = 'document.querySelector("figure").querySelectorAll("[role=img] rect.bar")';
    const heights: number[] = await page.evaluate(
      `Array.from(${bars}, (b) => b.getBoundingClientRect().height)`,
    );
    expect(heights).toHaveLength(history.length);
    const unit = Math.max(...heights) / Math.max(...history);
    for (const [i, height] of heights.entries())
      expect(Math.abs(height - unit * (history[i] ?? 0))).toBeLessThan(0.05);
    await page.close();
  });

  it('follows a link from the glance at all products to a product and to its page', async () => {
    const { page } = await open('index.html', 1280);
    await page.getByRole('link', { name: 'Brook 40' }).first().click();
    await page
      .locator('article', { hasText: 'Brook 40' })
      .getByRole('link', { name: 'Full page' })
      .first()
      .click();
    expect(await page.locator('h1').textContent()).toBe('Brook 40');
    await page.close();
  });
});
