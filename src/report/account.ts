/** What went in: files with their rows and hashes, and the settings that count. */
import type { ProductRules } from '../config.js';
import { familyLabel } from '../family-label.js';
import type { FileAccount, IntakeDocument, IntakeProduct } from '../records.js';
import { dateText } from './dates.js';
import { countText, measureText, percentText, rateText } from './numbers.js';
import type { ReportInput } from './parts.js';
import { plural } from './period-words.js';

/** A name and what stands for it. */
export interface Entry {
  readonly label: string;
  readonly value: string;
}

/** Whether returns were set aside whose units then count as censored where the return could not be (README). */
export function censorsReturns(files: readonly FileAccount[]): boolean {
  return files.some(({ codes }) => censoring.some((code) => (codes[code] ?? 0) > 0));
}

const censoring = ['beyond-warranty', 'before-delay'];

/** Rows of partials/files.hbs. */
export function fileRows(files: readonly FileAccount[]) {
  return files.map((file) => ({
    file: file.file,
    role: file.role.replace('-', ' '),
    read: countText(file.read),
    used: countText(file.used),
    rejected: countText(file.rejected),
    setAside: countText(file.setAside),
    codes: Object.entries(file.codes)
      .map(([code, rows]) => `${countText(rows)} ${code}`)
      .join(', '),
    unusedColumns: file.unusedColumns.join(', '),
    bytes: countText(file.bytes),
    sha256: file.sha256,
  }));
}

/** The settings of the run. */
export function settingEntries({ settings, table }: ReportInput): readonly Entry[] {
  const calendar = table.asOf !== null;
  const entry = (label: string, value: string | null) => (value === null ? [] : [{ label, value }]);
  return [
    ...entry('As-of date', table.asOf === null ? null : dateText(table.asOf)),
    ...entry('Period', calendar ? table.period : null),
    ...entry('Unit of age', calendar ? null : table.ageUnit),
    ...entry('Step of use', calendar || settings.ageStep === null ? null : measureText(settings.ageStep)),
    ...entry(
      'Horizon',
      `${settings.horizon} ${calendar ? table.period : 'step'}${settings.horizon === 1 ? '' : 's'}`,
    ),
    ...entry('Levels of the intervals', settings.levels.map(percentText).join(', ')),
    ...entry('Draws', countText(settings.draws)),
    ...entry('Seed', String(settings.seed)),
    ...entry('Candidates', settings.candidates.map(familyLabel).join(', ')),
    ...entry('Share of rows that may be rejected', percentText(settings.maxRejectShare)),
  ];
}

/** What the analyst set for one product, and what the records say of it. */
export function productEntries(
  product: IntakeProduct,
  rules: ProductRules,
  { ageUnit, files }: IntakeDocument,
): readonly Entry[] {
  const entry = (label: string, value: string | null) => (value === null ? [] : [{ label, value }]);
  const { firstShipped, lastShipped } = product;
  const dates = firstShipped !== null && lastShipped !== null;
  return [
    ...entry('Units', countText(product.units)),
    ...entry('Returned', countText(product.returns)),
    ...entry(
      censorsReturns(files) ? 'Withdrawn, or censored where a return was set aside' : 'Withdrawn',
      countText(product.withdrawn),
    ),
    ...entry('Survivors', countText(product.survivors)),
    ...entry('Shipped', dates ? `${dateText(firstShipped)} to ${dateText(lastShipped)}` : null),
    ...entry('Planned shipments', plannedText(product)),
    ...entry('Resolution', resolutions[product.resolution]),
    ...entry('Warranty', warrantyText(rules, ageUnit)),
    ...entry('Known delay', delayText(rules, ageUnit)),
    ...entry('Cost per return', costText(rules)),
    ...entry('Rejected returns', product.rejectedReturns === 0 ? null : countText(product.rejectedReturns)),
  ];
}

const resolutions = {
  day: 'dated to the day',
  period: 'by period; within it a unit is equally likely on any day',
  age: 'ages, without a calendar',
};

function plannedText({ planned }: IntakeProduct): string | null {
  const units = planned.reduce((sum, shipment) => sum + shipment.quantity, 0);
  const [first, last] = [planned[0], planned.at(-1)];
  if (first === undefined || last === undefined) return null;
  return `${countText(units)} units, ${dateText(first.from)} to ${dateText(last.to)}`;
}

function warrantyText(rules: ProductRules, ageUnit: string): string {
  const limits = [
    ...(rules.warrantyMonths === null ? [] : [`${rules.warrantyMonths} months from shipment`]),
    ...(rules.warrantyDays === null ? [] : [`${measureText(rules.warrantyDays)} ${plural(ageUnit)} of age`]),
  ];
  return limits.length === 0 ? 'no limit set' : limits.join(' or, where earlier, ');
}

function delayText(rules: ProductRules, ageUnit: string): string {
  if (rules.delayDays === 0) return 'none';
  return `${measureText(rules.delayDays)} ${plural(ageUnit)}: ${rules.delayReason ?? ''}`;
}

function costText(rules: ProductRules): string {
  if (rules.costPerReturn.length === 0) return 'not set';
  const amount = ({ from, amount }: ProductRules['costPerReturn'][number]) =>
    `${rateText(amount, rules.currency)}${from === null ? '' : ` from ${dateText(from)}`}`;
  return rules.costPerReturn.map(amount).join(', ');
}
