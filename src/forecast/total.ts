import type { Config } from '../config.js';
import type { ForecastTotal } from '../records.js';
import type { ProductDraws } from './product.js';

export function totalForecast(_config: Config, _results: readonly ProductDraws[]): ForecastTotal {
  throw new Error('being written');
}
