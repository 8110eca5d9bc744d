import { type Complaint, invalid } from './check.js';
import { pathText } from './path.js';
import type { Rules } from './products.js';

/**
 * Rules laid over each other key by key, the later over the earlier, the flags over all. A warranty given by flag is the
 * whole warranty: one in days takes back the settings' months, and the other way round.
 */
export function layRules(layers: readonly Rules[], flags: Rules): Rules {
  const { warrantyMonths, warrantyDays, ...others }: Rules = Object.assign({}, ...layers);
  const byFlag = flags.warrantyMonths !== undefined || flags.warrantyDays !== undefined;
  const settings: Rules = byFlag ? others : Object.assign({}, ...layers);
  const sameDelay = flags.delayDays === undefined || flags.delayDays === (settings.delayDays ?? 0);
  const reason = sameDelay ? {} : { delayReason: 'given on the command line, by --delay-days' };
  return { ...settings, ...flags, ...reason };
}

/**
 * What no single key shows: a delay without a reason or beyond the warranty, a cost without a currency. Only keys of
 * `said`, the product's own words, are complained about; the others are under `*`.
 * @param laid the rules as they will hold.
 */
export function rulesComplaints(product: string, said: Rules, laid: Rules): Complaint[] {
  const says = (...keys: readonly (keyof Rules)[]) => keys.some((key) => key in said);
  const path = (key: keyof Rules) => ['products', product, key];
  const missing = (key: keyof Rules, neededBy: keyof Rules, remedy: string): Complaint => {
    const message = `missing ${pathText(path(key))}, needed by ${neededBy}`;
    return {
      code: 'missing-value',
      message,
      remedy,
      path: path(says(neededBy) ? neededBy : key),
      at: 'value',
    };
  };
  const delay = laid.delayDays ?? 0;
  const complaints: Complaint[] = [];
  if (says('delayDays', 'delayReason') && delay > 0 && !laid.delayReason) {
    complaints.push(missing('delayReason', 'delayDays', 'say why units cannot come back earlier'));
  }
  if (says('costPerReturn', 'currency') && laid.costPerReturn && !laid.currency) {
    complaints.push(missing('currency', 'costPerReturn', 'add the code of the currency, such as EUR'));
  }
  const limit = Math.min((laid.warrantyMonths ?? Infinity) * 31, laid.warrantyDays ?? Infinity);
  if (says('delayDays', 'warrantyDays', 'warrantyMonths') && delay >= limit) {
    complaints.push(invalid(path('delayDays'), delay, 'less than the warranty lasts'));
  }
  return complaints;
}

/** With ages there are no calendar months; what `said` says of them is refused. */
export function agesComplaints(product: string, said: Rules): Complaint[] {
  if (said.warrantyMonths === undefined || said.warrantyMonths === null) return [];
  const path = ['products', product, 'warrantyMonths'];
  const message = `invalid ${pathText(path)}, not allowed beside ages`;
  const remedy = 'use warrantyDays, which is in the unit of the ages';
  return [{ code: 'conflicting-input', message, remedy, path, at: 'key' }];
}
