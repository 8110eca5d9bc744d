/** Fields of the records by kind of input: what `columns` may map to a header. */
export const recordFields = {
  shipments: ['product', 'unit', 'ship_date', 'quantity'],
  returns: ['product', 'unit', 'ship_date', 'return_date', 'quantity'],
  withdrawals: ['product', 'unit', 'ship_date', 'date', 'quantity'],
  plan: ['product', 'ship_period', 'quantity'],
  table: ['product', 'shipped_in', 'shipped'],
  ages: ['product', 'outcome', 'quantity', 'age', 'age_from', 'age_to'],
} as const;

/** Keys and names that later versions will have; they are refused, never ignored. */
export const notBuilt: ReadonlySet<string> = new Set([
  ...['segmentBy', 'backtest', 'query', 'season', 'driftMonths', 'discountTiming', 'discountRate'],
  ...['serviceLag', 'recordingLag', 'afterWarranty', 'warrantyFrom', 'afterReturn', 'lentShape'],
  ...['dateIs', 'unknownUnit', 'reversals', 'returnsSince', 'registerSince'],
  ...['in_service_date', 'warranty_months', 'recorded_date', 'cause', 'amount'],
  ...['generalized-gamma', 'inverse-gaussian', 'birnbaum-saunders', 'normal', 'logistic'],
  ...['smallest-extreme-value', 'gompertz'],
]);
