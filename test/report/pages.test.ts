import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import type { ForecastDocument } from '../../src/records.js';
import { slugOf } from '../../src/report/names.js';
import { renderReport } from '../../src/report/report.js';
import { tableRows } from '../support/html.js';
import { reportInput } from '../support/report-input.js';
import { fixtureProducts, hostileName } from '../support/report-products.js';
import { readTemplates } from '../support/templates.js';

const templates = readTemplates();
const input = reportInput();
const forecast = input.forecast as ForecastDocument;
const pages = renderReport(input, templates, { singleFile: false });
const single = renderReport(input, templates, { singleFile: true });

function page(name: string, from = pages): string {
  const text = from.get(name);
  if (text === undefined) throw new Error(`no page ${name}`);
  return text;
}

function productPage(product: string): string {
  return page(`products/${slugOf(product, null)}.html`);
}

/** The page's rule, worked without the report's own code: one decimal below 10, else whole, commas. */
function shown(value: number): string {
  const text = value.toFixed(1);
  return Number(text) < 10
    ? text
    : Math.round(value)
        .toFixed(0)
        .replace(/\B(?=(\d{3})+$)/g, ',');
}

/** The rule of a column: one decimal in all of it where any is below 10. */
function shownInColumn(values: readonly number[]): readonly string[] {
  const decimals = values.some((value) => Number(value.toFixed(1)) < 10) ? 1 : 0;
  const digits = { minimumFractionDigits: decimals, maximumFractionDigits: decimals };
  return values.map((value) => value.toLocaleString('en-US', digits));
}

describe('the set of pages', () => {
  it('is an index and a page a product, or one file', () => {
    const names = fixtureProducts.map((p) => `products/${slugOf(p.product, null)}.html`);
    expect([...pages.keys()].toSorted()).toEqual(['index.html', ...names].toSorted());
    expect([...single.keys()]).toEqual(['index.html']);
  });

  it('links every product page from the index, and none from the single file', () => {
    for (const name of pages.keys())
      if (name !== 'index.html') expect(page('index.html')).toContain(`href="${name}"`);
    expect(page('index.html', single)).not.toContain('href="products/');
    expect(page('index.html', single)).toContain('<table class="heat">');
  });

  it('is the same text every time', () => {
    expect([...renderReport(reportInput(), templates, { singleFile: false })]).toEqual([...pages]);
  });

  it('has no id twice on a page', () => {
    for (const text of [...pages.values(), ...single.values()]) {
      const ids = [...text.matchAll(/ id="([^"]*)"/g)].map((m) => m[1]);
      expect(ids.filter((id, i) => ids.indexOf(id) !== i)).toEqual([]);
    }
  });
});

describe('a page by itself', () => {
  const all = [...pages.values(), ...single.values()];

  it('allows only its own style, by its hash', () => {
    for (const text of all) {
      const style = /<style>(.*?)<\/style>/s.exec(text)?.[1] ?? '';
      const hash = createHash('sha256').update(style, 'utf8').digest('base64');
      expect(text).toContain(`content="default-src 'none'; style-src 'sha256-${hash}';`);
    }
  });

  it('hashes the style as a browser reads it, whatever its line ends', () => {
    const crlf = { ...templates, 'style.css': (templates['style.css'] ?? '').replaceAll('\n', '\r\n') };
    expect(renderReport(input, crlf, { singleFile: false }).get('index.html')).toBe(page('index.html'));
  });

  it('has no script, no inline style, no address beyond the report', () => {
    for (const text of all) {
      expect(text).not.toMatch(/<script|\sstyle=|\son[a-z]+="|javascript:/i);
      expect(text.match(/(?:src|href)="(?!#|products\/|\.\.\/index\.html)[^"]*"/g)).toBeNull();
      expect(text).not.toMatch(/https?:|@import|url\((?!#)/);
    }
  });

  it('shows hostile names as text', () => {
    expect(productPage(hostileName)).toContain(
      '<h1 id="content">&lt;script&gt;alert(&quot;x&quot;)&lt;/script&gt; &amp; &#x27;quoted&#x27; {{braces}}',
    );
  });

  it('gives every chart a title, a description and its numbers', () => {
    for (const text of all) {
      const charts =
        text.match(
          /<svg role="img"[^>]*>\s*<title id="[^"]+">[^<]+<\/title>\s*<desc id="[^"]+">[^<]+<\/desc>/g,
        ) ?? [];
      expect(charts).toHaveLength(text.split('role="img"').length - 1);
    }
    expect(productPage('Brook 40')).toContain('Recorded returns by month, as numbers');
    expect(productPage('Brook 40')).toContain('Nonparametric estimate, as numbers');
  });

  it('holds no NaN, undefined or null', () => {
    for (const text of all) expect(text).not.toMatch(/NaN|undefined|\bnull\b|\[object/);
  });
});

describe('numbers on the page', () => {
  it('shows the forecast of each product as forecast.json has it', () => {
    for (const product of forecast.products.filter((p) => p.notForecast === null)) {
      const rows = tableRows(productPage(product.product), 'numbers forecast');
      expect(rows).toHaveLength(product.periods.length);
      const single = shownInColumn(product.periods.map((period) => period.expected));
      const summed = shownInColumn(product.periods.map((period) => period.cumulative.expected));
      for (const [i, period] of product.periods.entries()) {
        const q = (count: typeof period.cumulative, lower: string, upper: string) =>
          `${(count.quantiles[lower] ?? -1).toLocaleString('en-US')} to ${(count.quantiles[upper] ?? -1).toLocaleString('en-US')}`;
        const counts = [period, period.cumulative].flatMap((count, column) => [
          [single, summed][column]?.[i],
          q(count, '0.1', '0.9'),
          q(count, '0.025', '0.975'),
        ]);
        expect(rows[i]?.slice(1, 7)).toEqual(counts);
      }
    }
  });

  it('draws bars as high as the counts', () => {
    const history = forecast.total.history.map((h) => h.returned);
    const chart = page('index.html').split('</figure>')[0] ?? '';
    const heights = [...chart.matchAll(/<rect class="bar" [^>]*height="([\d.]+)"><title>/g)].map((m) =>
      Number(m[1]),
    );
    expect(heights).toHaveLength(history.length);
    const unit = Math.max(...heights) / Math.max(...history);
    for (const [i, height] of heights.entries())
      expect(Math.abs(height - unit * (history[i] ?? 0))).toBeLessThan(0.02);
  });

  it('says the headline with its interval', () => {
    const [next, last] = [forecast.total.periods[0], forecast.total.periods.at(-1)];
    const { expected, quantiles } = next as NonNullable<typeof next>;
    const lead = /<p class="lead">(.*?)<\/p>/.exec(page('index.html'))?.[1] ?? '';
    expect(lead).toContain(
      `For 4 of 5 products, expect ${shown(expected)} returns in November 2026, with 80\u00a0% probability between ${quantiles['0.1']} and ${quantiles['0.9']}`,
    );
    expect(lead).toContain(`${shown(last?.cumulative.expected ?? 0)} over the 12 months to 31 October 2027`);
  });

  it('fills the heat map with the table, survivors last', () => {
    const product = input.table.products.find((p) => p.product === 'Brook 40');
    const rows = tableRows(productPage('Brook 40'), 'heat');
    for (const [i, row] of (product?.table?.rows ?? []).entries()) {
      const cells = row.returned.map((units, column) =>
        column < i ? '' : units === 0 ? '·' : String(units),
      );
      expect(rows[i]?.slice(2, 2 + cells.length)).toEqual(cells);
      expect(rows[i]?.at(-1)).toBe(String(row.survivors));
    }
  });

  it('puts every warning of a product where the page that is mailed shows its headline', () => {
    const index = page('index.html');
    const at = `id="findings-${slugOf('Spring 5', null)}"`;
    expect(index).toContain(`href="#findings-${slugOf('Spring 5', null)}">see warning</a>`);
    const list = index.slice(index.indexOf(at)).split('</ul>')[0];
    expect(list).toContain('<strong>warning:</strong> only 9 returns; the interval is wide');
    expect(index.split('see warning')).toHaveLength(2);
    for (const text of [productPage('Spring 5'), page('index.html', single)])
      expect(text.split('only 9 returns')).toHaveLength(2);
    expect(productPage('Spring 5').indexOf('only 9 returns')).toBeLessThan(
      productPage('Spring 5').indexOf('<main>'),
    );
  });

  it('gives a sum a column of cost for each currency, that adds up', () => {
    const index = page('index.html');
    const rows = tableRows(index.slice(index.indexOf('id="table-total-title"')), 'numbers forecast');
    for (const [i, period] of forecast.total.periods.entries()) {
      const amounts = rows[i]?.slice(-2).map((text) => text.replaceAll(',', '').split('\u00a0'));
      expect(amounts?.map(([currency]) => currency)).toEqual(['CHF', 'EUR']);
      for (const [currency, amount] of amounts ?? []) {
        const parts = forecast.products.filter((product) => product.currency === currency);
        const cost = parts.reduce((sum, product) => sum + (product.periods[i]?.expectedCost ?? 0), 0);
        expect(Math.abs(Number(amount) - cost), period.period).toBeLessThanOrEqual(0.5);
      }
    }
  });

  it('lists each currency of the cost apart', () => {
    expect(page('index.html')).toMatch(/<span>CHF\u00a0[\d,]+<\/span> <span>EUR\u00a0[\d,]+<\/span>/);
  });
});
