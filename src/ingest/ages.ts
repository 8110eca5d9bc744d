import { type Config, rulesOf } from '../config.js';
import { compareText } from '../csv.js';
import type { AgeGroup, ProductRecords, Progress, Source } from '../records.js';
import { readAge } from './agerow.js';
import { outOfBounds, outOfBoundsText } from './bounds.js';
import { missingValue, productAt, type Row, refOf } from './cells.js';
import { findColumns } from './columns.js';
import { tooManyBeforeDelay } from './product.js';
import { byteProgress } from './progress.js';
import type { Reading } from './reading.js';
import { readRows } from './rows.js';
import { type FileTally, newTally, setAsideRow } from './tally.js';

/** What the ages files say of one product. */
interface AgedProduct {
  readonly groups: Map<string, AgeGroup>;
  beforeDelay: number;
  returns: number;
}

/**
 * Reads units whose age is known without a calendar. A warranty in days and a delay bound the ages in their own unit; returned
 * units that are out of bounds count as surviving at their age.
 */
export async function readAges(
  config: Config,
  sources: readonly Source[],
  progress: Progress,
): Promise<Reading> {
  const products = new Map<string, AgedProduct>();
  const tallies = sources.map((source) => newTally(source, 'ages'));
  for (const tally of tallies) {
    const begin = (header: string[]) => {
      tally.columns = findColumns('ages', tally.source.name, header, config.ages);
      return (cells: string[], line: number) => takeRow(config, tally, { cells, line }, products);
    };
    tally.read = await readRows(
      tally.source,
      config.ages.encoding,
      begin,
      await byteProgress(tally, progress),
    );
  }
  const names = [...products.keys()].sort(compareText);
  const list = names.map((name) => agedRecords(config, name, products.get(name) as AgedProduct, tallies));
  return { products: list, tallies, findings: [] };
}

function takeRow(config: Config, tally: FileTally, row: Row, products: Map<string, AgedProduct>): void {
  const age = readAge(tally, row);
  if (age === null) return;
  const product = productAt(tally, row, tally.columns?.at('product') ?? -1);
  if (product === '') {
    missingValue(tally, row, 'product');
    return;
  }
  const aged = products.get(product) ?? { groups: new Map(), beforeDelay: 0, returns: 0 };
  products.set(product, aged);
  addGroup(aged.groups, bounded(config, tally, row, product, aged, age));
}

/** The group, or what it counts as where no return is possible at its age. */
function bounded(
  config: Config,
  tally: FileTally,
  row: Row,
  product: string,
  aged: AgedProduct,
  age: AgeGroup,
): AgeGroup {
  if (age.outcome === 'surviving') return age;
  aged.returns += age.quantity;
  const rules = rulesOf(config, product);
  const code = outOfBounds(age, { from: 0, to: 0 }, rules.warrantyDays ?? Infinity, rules.delayDays);
  if (code === null) return age;
  setAsideRow(
    refOf(tally, row),
    code,
    age.exact ? 'age' : 'age_from',
    outOfBoundsText(code, rules, 'surviving'),
  );
  if (code === 'before-delay') aged.beforeDelay += age.quantity;
  return { outcome: 'surviving', from: age.from, to: age.from, exact: true, quantity: age.quantity };
}

function addGroup(groups: Map<string, AgeGroup>, group: AgeGroup): void {
  const key = `${group.outcome} ${group.from} ${group.to} ${group.exact}`;
  const before = groups.get(key);
  groups.set(key, before === undefined ? group : { ...group, quantity: before.quantity + group.quantity });
}

function agedRecords(
  config: Config,
  product: string,
  { groups, beforeDelay, returns }: AgedProduct,
  tallies: readonly FileTally[],
): ProductRecords {
  const rejected = tallies.reduce((sum, tally) => sum + (tally.rejectedUnits.get(product) ?? 0), 0);
  return {
    product,
    segment: null,
    resolution: 'age',
    cohorts: [],
    returned: [],
    withdrawn: [],
    planned: [],
    ages: [...groups.values()].sort(compareGroups),
    rejectedReturns: rejected,
    unusable: tooManyBeforeDelay(config, product, { beforeDelay, returns }),
  };
}

function compareGroups(a: AgeGroup, b: AgeGroup): number {
  return compareText(a.outcome, b.outcome) || a.from - b.from || a.to - b.to;
}
