import type { Config } from '../config.js';
import type { FitProduct, ProductRecords } from '../records.js';

export function fitProduct(_config: Config, _records: ProductRecords): FitProduct {
  throw new Error('being written');
}
