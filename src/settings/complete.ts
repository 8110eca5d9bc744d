import type { Config, InputConfig, ProductRules } from '../config.js';
import { compareText } from '../csv.js';
import { familyNames } from '../families/index.js';
import type { Said } from './inputs.js';
import type { Rules, StatedProducts } from './products.js';

/** Every default of the settings. */
export function completeConfig(said: Said, every: Rules, named: StatedProducts['named']): Config {
  return {
    title: said.title ?? 'Warranty return forecast',
    asOf: said.asOf ?? null,
    period: said.period ?? 'month',
    horizon: said.horizon ?? 12,
    levels: [...(said.levels ?? [0.8, 0.95])].sort((a, b) => a - b),
    draws: said.draws ?? 4000,
    seed: said.seed ?? 1,
    candidates: said.candidates ?? familyNames,
    maxRejectShare: said.maxRejectShare ?? 0.01,
    ageUnit: said.ageUnit ?? 'day',
    ageStep: said.ageStep ?? null,
    shipments: completeInput(said.shipments),
    returns: completeInput(said.returns),
    withdrawals: completeInput(said.withdrawals),
    plan: completeInput(said.plan),
    table: completeInput(said.table),
    tableWithdrawn: completeInput(said.tableWithdrawn),
    ages: completeInput(said.ages),
    everyProduct: completeRules(every),
    namedProducts: named.map(({ product, rules }) => ({ product, rules: completeRules(rules) })),
  };
}

function completeInput(said: Said['shipments']): InputConfig {
  return {
    files: said?.files ?? [],
    columns: (said?.columns ?? {}) as Record<string, string>,
    dateFormat: said?.dateFormat ?? null,
    encoding: said?.encoding ?? null,
  };
}

function completeRules(said: Rules): ProductRules {
  const costs = [...(said.costPerReturn ?? [])].sort((a, b) => compareText(a.from ?? '', b.from ?? ''));
  return {
    warrantyMonths: said.warrantyMonths ?? null,
    warrantyDays: said.warrantyDays ?? null,
    delayDays: said.delayDays ?? 0,
    delayReason: said.delayReason ?? null,
    costPerReturn: costs,
    currency: costs.length === 0 ? null : (said.currency ?? null),
  };
}
