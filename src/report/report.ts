/** Finished documents and template text → pages. Draws numbers, never computes statistics. */
import { indexView, pageFrame } from './index-view.js';
import { type ProductParts, productParts, type ReportInput } from './parts.js';
import { productDetail } from './product-view.js';
import { compileTemplates } from './templates.js';

export type { ReportInput } from './parts.js';

/**
 * Renders the report: `index.html`, and `products/<slug>.html` for every product unless all is to be in one file.
 * @param templates path below templates/ → text. @throws Error when a template is missing.
 */
export function renderReport(
  input: ReportInput,
  templates: Readonly<Record<string, string>>,
  options: { readonly singleFile: boolean },
): ReadonlyMap<string, string> {
  const render = compileTemplates(templates);
  const products = productParts(input);
  const pages = new Map([['index.html', render('index', indexView(input, products, options.singleFile))]]);
  if (options.singleFile) return pages;
  for (const parts of products) {
    pages.set(`products/${parts.slug}.html`, render('product', productPage(input, parts)));
  }
  return pages;
}

function productPage(input: ReportInput, parts: ProductParts) {
  return {
    ...pageFrame(input),
    pageTitle: parts.name,
    singleFile: false,
    product: productDetail(input, parts),
  };
}
