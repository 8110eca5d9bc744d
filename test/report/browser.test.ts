import { existsSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type Browser, chromium } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { renderReport } from '../../src/report/report.js';
import { reportInput } from '../support/report-input.js';
import { readTemplates } from '../support/templates.js';

const executablePath = '/usr/bin/chromium';
const flags = ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-sync'];
const quiet = ['--disable-background-networking', '--disable-component-update'];
const input = reportInput();
const pages = renderReport(input, readTemplates(), { singleFile: false });

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
