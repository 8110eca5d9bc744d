import { describe, expect, it } from 'vitest';
import type { ForecastDocument } from '../../src/records.js';
import { slugOf } from '../../src/report/names.js';
import { type ReportInput, renderReport } from '../../src/report/report.js';
import { tableRows } from '../support/html.js';
import { agesInput, reportInput } from '../support/report-input.js';
import { fixtureProducts } from '../support/report-products.js';
import { readTemplates } from '../support/templates.js';

const templates = readTemplates();
const input = reportInput();
const forecast = input.forecast as ForecastDocument;
const pages = renderReport(input, templates, { singleFile: false });

function page(name: string, from = pages): string {
  return from.get(name) ?? '';
}

function productPage(product: string): string {
  return page(`products/${slugOf(product, null)}.html`);
}

describe('what is missing is said', () => {
  it('names products that are not forecast, with the reason', () => {
    const notice = /<section class="notice".*?<\/section>/s.exec(page('index.html'))?.[0] ?? '';
    expect(notice).toContain(
      '<strong>Well 9</strong>: no returns in the records; lend a shape or wait for returns',
    );
    expect(productPage('Well 9')).toContain('No forecast: no returns in the records');
  });

  it('renders a run in which nothing could be forecast', () => {
    const none = reportInput(fixtureProducts.filter((p) => p.missing));
    expect(page('index.html', renderReport(none, templates, { singleFile: true }))).toContain(
      'No product could be forecast.',
    );
  });

  it('renders a product without a single return', () => {
    const [brook] = fixtureProducts as [(typeof fixtureProducts)[number]];
    const none = reportInput([{ ...brook, scale: 1e12, planned: 0 }]);
    const text = page('index.html', renderReport(none, templates, { singleFile: true }));
    expect(text).toContain('Expect 0.0 returns in November 2026, with 80\u00a0% probability between 0 and 0');
    expect(text).not.toMatch(/NaN|Infinity/);
  });

  it('says when no survivor can be returned, and why', () => {
    const lead = (survivors: number, untilWarranty: number) => {
      const none = { expected: 0, plugIn: 0, quantiles: { '0.025': 0, '0.1': 0, '0.9': 0, '0.975': 0 } };
      const empty = (product: ForecastDocument['products'][number]) => ({
        ...product,
        untilWarrantyEnds: { ...none, expected: untilWarranty },
        periods: product.periods.map((period) => ({ ...period, ...none, cumulative: none })),
      });
      const products = forecast.products.map(empty);
      const table = {
        ...input.table,
        products: input.table.products.map((product) => ({ ...product, survivors })),
      };
      const changed = { ...input, table, forecast: { ...forecast, products } };
      const text = page(
        `products/${slugOf('Brook 60 S', null)}.html`,
        renderReport(changed, templates, { singleFile: false }),
      );
      return /<p class="lead">(.*?)<\/p>/.exec(text)?.[1];
    };
    const over = 'expect no returns over the 12 months to 31 October 2027.';
    expect(lead(0, 0)).toBe(`No unit is left that could be returned: ${over}`);
    expect(lead(40, 0)).toBe(`All survivors are past their warranty: ${over}`);
    expect(lead(40, 3)).toMatch(/^Expect 0\.0 returns/);
  });

  it('says how many products a sum holds, in the lead, the heading and the caption', () => {
    const text = page('index.html');
    expect(text).toContain('<p class="lead">For 4 of 5 products, expect');
    expect(text).toContain('<h2 id="total">4 of 5 products</h2>');
    expect(text).toContain('Expected returns of 4 of 5 products, with intervals');
  });

  it('names the products that a sum of costs leaves out', () => {
    expect(page('index.html')).toContain('without the returns of Spring 5 for which no cost is set');
  });

  it('renders what earlier stages left', () => {
    const tableOnly: ReportInput = { ...input, fit: null, forecast: null };
    const text = page('index.html', renderReport(tableOnly, templates, { singleFile: true }));
    expect(text).toContain('Nothing has been forecast yet');
    expect(text).toContain('<table class="heat">');
  });

  it('tells the rest of a period from the whole ones', () => {
    const cut = (product: ForecastDocument['products'][number]) => ({
      ...product,
      periods: product.periods.map((period, i) => ({ ...period, partial: i === 0 })),
    });
    const total = {
      ...forecast.total,
      periods: forecast.total.periods.map((period, i) => ({ ...period, partial: i === 0 })),
    };
    const partial = { ...forecast, horizon: 11, products: forecast.products.map(cut), total };
    const rest = renderReport({ ...input, forecast: partial }, templates, { singleFile: false });
    const text = page(`products/${slugOf('Brook 40', null)}.html`, rest);
    expect(text).toContain('returns in December 2026, with 80\u00a0% probability between');
    expect(text).toContain('from 1 November 2026 to 31 October 2027');
    expect(text).not.toContain('over the 11 months');
    expect(page('index.html', rest)).toContain(
      '<th scope="col">From 1 November 2026 to 31 October 2027</th>',
    );
    expect(text).toContain('in the rest of November 2026 expect');
    expect(text).toContain('<th scope="row">rest of Nov 2026</th>');
  });

  it('sums a long table to quarters, keeping every unit', () => {
    const long = reportInput([{ ...(fixtureProducts[0] as (typeof fixtureProducts)[number]), months: 60 }]);
    const rows = tableRows(page('index.html', renderReport(long, templates, { singleFile: true })), 'heat');
    expect(rows).toHaveLength(21);
    const survivors = rows.reduce((sum, row) => sum + Number(row.at(-1)?.replace(',', '')), 0);
    expect(survivors).toBe(long.table.products[0]?.survivors);
  });

  it('renders ages without a calendar', () => {
    const text = page('index.html', renderReport(agesInput(), templates, { singleFile: true }));
    expect(text).toContain('in the next 500 hours of use, with 80\u00a0% probability between');
    expect(text).toContain('<th scope="row">500 to 1,000 hours from now</th>');
    expect(text).not.toMatch(/as of|November|Until warranty ends/);
  });

  it('says what is missing where ages have no step', () => {
    const ages = agesInput();
    const text = page(
      'index.html',
      renderReport({ ...ages, settings: { ...ages.settings, ageStep: null }, forecast: null }, templates, {
        singleFile: true,
      }),
    );
    expect(text).toContain('No forecast: <code>ageStep</code>');
    expect(text).not.toContain('The intervals come from repeated draws');
    expect(text).not.toContain('without interval');
  });

  it('refuses templates that lack a part', () => {
    const { 'style.css': _, ...rest } = templates;
    expect(() => renderReport(input, rest, { singleFile: true })).toThrow('missing template style.css');
  });
});
