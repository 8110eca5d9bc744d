import * as z from 'zod';
import { familyNames } from '../families/index.js';
import { recordFields } from './known.js';
import {
  currencyCode,
  datePattern,
  distinct,
  encodingLabel,
  isoDay,
  positive,
  real,
  text,
  whole,
} from './values.js';

/** Keys by name with what each may hold; every key may be left out. */
export type Keys = Readonly<Record<string, z.ZodType>>;

/** What was said of `K`: sound values only. */
export type Stated<K extends Keys> = { readonly [Name in keyof K]?: z.output<K[Name]> };

/** What is said of a product. Null takes back what `*` says. */
export const ruleKeys = {
  warrantyMonths: whole(1, 1200).nullable(),
  warrantyDays: positive.nullable(),
  delayDays: real(0),
  delayReason: text.nullable(),
  costPerReturn: z.preprocess(datedAmounts, amounts()).nullable(),
  currency: currencyCode.nullable(),
};

/** What is said of the run. `products` stands beside these: its keys are data. */
export const settingKeys = {
  title: text,
  asOf: isoDay,
  period: z.enum(['week', 'month', 'quarter'], 'week, month or quarter'),
  horizon: whole(1, 240),
  levels: distinct(level(), 'a list of numbers between 0 and 1', 8),
  draws: whole(100, 100_000),
  seed: whole(0, Number.MAX_SAFE_INTEGER),
  candidates: distinct(z.enum(familyNames, familyNames.join(', ')), 'a list of families'),
  maxRejectShare: real(0, 1),
  ageUnit: text,
  ageStep: positive,
  shipments: input(recordFields.shipments),
  returns: input(recordFields.returns),
  withdrawals: input(recordFields.withdrawals),
  plan: input(recordFields.plan),
  table: inputOrPath(recordFields.table),
  tableWithdrawn: inputOrPath(recordFields.table),
  ages: inputOrPath(recordFields.ages),
};

/** Five decimals at most, so that both ends of an interval have a quantile key of six. */
function level() {
  const allowed = 'a number between 0 and 1 with at most five decimals';
  return z
    .number(allowed)
    .gt(0, allowed)
    .lt(1, allowed)
    .refine((p) => Number(p.toFixed(5)) === p, allowed);
}

function input(fields: readonly string[]) {
  return keyed('an object with', {
    files: z.array(text, 'a list of paths or patterns'),
    columns: keyed('an object with headers for', Object.fromEntries(fields.map((field) => [field, text]))),
    dateFormat: datePattern,
    encoding: encodingLabel,
  });
}

function inputOrPath(fields: readonly string[]) {
  return z.preprocess((value) => (typeof value === 'string' ? { files: [value] } : value), input(fields));
}

/** An object with these keys and no other. The complaint about another key lists them, parted by ", ". */
function keyed<S extends Record<string, z.ZodType>>(allowed: string, shape: S) {
  const names = Object.keys(shape).join(', ');
  const error = ({ code }: { code?: string }) =>
    code === 'unrecognized_keys' ? names : `${allowed} ${names}`;
  return z.strictObject(shape, { error }).partial();
}

function amounts() {
  const allowed = 'an amount of 0 or more, or a list of objects with from and amount';
  const error = ({ code }: { code?: string }) => (code === 'unrecognized_keys' ? 'from, amount' : allowed);
  const entry = z.strictObject({ from: isoDay.nullable(), amount: real(0) }, { error });
  const froms = 'a list whose entries begin on different dates';
  return z
    .array(entry, allowed)
    .min(1, allowed)
    .refine((list) => new Set(list.map(({ from }) => from)).size === list.length, froms);
}

/** A plain amount is in force since ever. */
function datedAmounts(value: unknown): unknown {
  return Array.isArray(value) || value === null ? value : [{ from: null, amount: value }];
}
