import type { Config } from '../config.js';
import type { FitProduct, ForecastProduct, ProductRecords } from '../records.js';

/** A product's forecast with the draws behind it, for sums over products. */
export interface ProductDraws {
  readonly product: ForecastProduct;
}

export function forecastProduct(_config: Config, _records: ProductRecords, _fit: FitProduct): ProductDraws {
  throw new Error('being written');
}
