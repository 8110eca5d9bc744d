/** The documents of a run joined by product. */
import type { Config } from '../config.js';
import type {
  FitDocument,
  FitProduct,
  ForecastDocument,
  ForecastProduct,
  IntakeDocument,
  IntakeProduct,
  NotForecast,
  Segment,
} from '../records.js';
import { productKey, segmentText } from '../segment.js';
import { productName, slugOf } from './names.js';

/** The finished documents of a run; those of stages that did not run are null. */
export interface ReportInput {
  readonly table: IntakeDocument;
  readonly fit: FitDocument | null;
  readonly forecast: ForecastDocument | null;
  readonly settings: Config;
  /** Version of the program, for the foot of the page. */
  readonly version: string;
}

/** All that is known of one product (and segment). */
export interface ProductParts {
  readonly name: string;
  readonly slug: string;
  readonly table: IntakeProduct;
  readonly fit: FitProduct | null;
  readonly forecast: ForecastProduct | null;
  /** Why there is no forecast; null where there is one, or where none was asked for. */
  readonly missing: NotForecast | null;
}

/** Products in the order of the intake. */
export function productParts(input: ReportInput): readonly ProductParts[] {
  const fits = byProduct(input.fit?.products ?? []);
  const forecasts = byProduct(input.forecast?.products ?? []);
  return input.table.products.map((table) => {
    const fit = fits.get(identity(table)) ?? null;
    const forecast = forecasts.get(identity(table)) ?? null;
    const missing = forecast?.notForecast ?? fit?.notForecast ?? table.unusable;
    const { product, segment } = table;
    return {
      name: productName(product, segment),
      slug: slugOf(product, segment),
      table,
      fit,
      forecast,
      missing,
    };
  });
}

function byProduct<T extends { readonly product: string; readonly segment: Segment | null }>(
  products: readonly T[],
) {
  return new Map(products.map((product) => [identity(product), product]));
}

function identity(item: { readonly product: string; readonly segment: Segment | null }): string {
  return productKey(item.product, segmentText(item.segment));
}
