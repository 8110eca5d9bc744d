/**
 * Makes the files of this folder: node sample-data/make.mjs [folder]
 *
 * The maker, its products and every unit are invented; README.md tells the story and lists the faults planted. The same
 * bytes come out each time: an own generator with fixed seeds, and whole days instead of clock time.
 */
import { writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { addMonths, dayNumber, dotted, iso, yearOf } from './days.mjs';

const folder = process.argv[2] ?? fileURLToPath(new URL('.', import.meta.url));
const asOf = dayNumber(2026, 10, 31);
const extractedOn = dayNumber(2026, 11, 4);

/** Age at failure in days is delay + scale · E^(1/shape), E standard exponential, for a share of the units; the rest never fail. */
const products = [
  {
    name: 'QB-120',
    prefix: '120',
    seed: 11,
    from: 0,
    perMonth: [190, 320],
    warrantyMonths: 24,
    shape: 2,
    scale: 2700,
    share: 1,
    delay: 0,
  },
  {
    name: 'QB-160',
    prefix: '160',
    seed: 12,
    from: 28,
    perMonth: [90, 290],
    warrantyMonths: 24,
    shape: 1.2,
    scale: 7500,
    share: 1,
    delay: 0,
  },
  {
    name: 'QB-300',
    prefix: '300',
    seed: 13,
    from: 0,
    perMonth: [110, 150],
    warrantyMonths: 36,
    shape: 1.6,
    scale: 200,
    share: 0.06,
    delay: 14,
  },
  {
    name: 'QB-45',
    prefix: '045',
    seed: 14,
    from: 0,
    perMonth: [230, 290],
    warrantyMonths: 24,
    shape: 0.65,
    scale: 40000,
    share: 1,
    delay: 0,
  },
];
/** Sales by calendar month, January first: quiet summers, busy autumns. */
const season = [0.95, 0.95, 1, 1, 0.95, 0.9, 0.8, 0.8, 1.1, 1.25, 1.25, 1.05];

const units = products.flatMap(unitsOf);
const quiet = units.filter((u) => u.returned === null && u.withdrawn === null && u.shipped < asOf - 30);
const pick = picker(generator(99));
const shipments = shipmentRows(quiet, pick);

for (const year of [2023, 2024, 2025, 2026]) {
  const rows = shipments.filter((row) => yearOf(row.shipped) === year);
  write(
    `shipments-${year}.csv`,
    'type;serial_no;invoiced',
    rows.map((row) => `${row.product};${row.serial};${row.text}`),
  );
}
write(
  'returns.csv',
  'serial,returned',
  returnRows(quiet, pick).map((row) => `${row.serial},${row.text}`),
);
const withdrawn = units.filter((unit) => unit.withdrawn !== null).sort((a, b) => a.withdrawn - b.withdrawn);
write(
  'withdrawals.csv',
  'serial_number,scrap_date',
  withdrawn.map((unit) => `${unit.serial},${iso(unit.withdrawn)}`),
);
write('plan.csv', 'product,ship_period,quantity', [
  ...plan('QB-120', [390, 330, 300, 300, 320, 320]),
  ...plan('QB-160', [380, 340, 330, 340, 370, 380]),
]);
summary();

// ---------------------------------------------------------------- the life of a unit

function unitsOf(product) {
  const random = generator(product.seed);
  const days = shipDays(product, random);
  return days.map((shipped, i) => ({
    product: product.name,
    serial: `${product.prefix}-${String(100001 + i).slice(1)}`,
    shipped,
    ...fate(product, shipped, random),
  }));
}

/** The ship day of every unit, in order: a growing and seasonal number a month, each on some weekday of it. */
function shipDays(product, random) {
  const days = [];
  for (let month = product.from; month < 36; month++) {
    const first = dayNumber(2023, 11 + month, 1);
    const weekdays = range(first, dayNumber(2023, 12 + month, 1)).filter((day) => (day + 3) % 7 < 5);
    const [start, end] = product.perMonth;
    const trend = start + ((end - start) * (month - product.from)) / (35 - product.from);
    const quantity = Math.round(trend * season[(10 + month) % 12] * (0.95 + 0.1 * random()));
    for (let i = 0; i < quantity; i++) days.push(weekdays[Math.floor(random() * weekdays.length)]);
  }
  return days.sort((a, b) => a - b);
}

/** The days on which a unit comes back within warranty or leaves without a return (0.3 % of the units); null is never. */
function fate(product, shipped, random) {
  const start = shipped + random();
  const canFail = random() < product.share;
  const life = product.delay + product.scale * (-Math.log(1 - random())) ** (1 / product.shape);
  const leaves = random() < 0.003 ? Math.floor(start + 30 + 670 * random()) : null;
  const back =
    canFail && life <= addMonths(shipped, product.warrantyMonths) - shipped ? Math.floor(start + life) : null;
  const withdrawn = leaves !== null && leaves <= asOf && (back === null || leaves < back) ? leaves : null;
  return { returned: withdrawn === null && back !== null && back < extractedOn ? back : null, withdrawn };
}

// ---------------------------------------------------------------- the faults

/** Takes a random member out of a list. */
function picker(random) {
  return (list) => list.splice(Math.floor(random() * list.length), 1)[0];
}

/** The rows of the shipment files: one of each fault, and three units booked twice. */
function shipmentRows(quiet, pick) {
  const rows = units.map((u) => ({ ...u, text: dotted(u.shipped) }));
  const rowOf = (unit) => rows.find((row) => row.serial === unit.serial);
  const twice = [pick(quiet), pick(quiet), pick(quiet)].map((u) => ({ ...rowOf(u) }));
  const conflicting = rowOf(pick(quiet));
  const other = { ...conflicting, shipped: conflicting.shipped + 3, text: dotted(conflicting.shipped + 3) };
  rowOf(pick(quiet)).product = '';
  const february = [dayNumber(2025, 2, 1), dayNumber(2025, 3, 1)];
  rowOf(pick(quiet.filter((u) => u.shipped >= february[0] && u.shipped < february[1]))).text = '31.02.2025';
  rows.sort((a, b) => a.shipped - b.shipped || (a.serial < b.serial ? -1 : 1));
  return [...rows, ...twice, other];
}

/** The rows of the return file: one of each fault, two units that come back again and one after its warranty. */
function returnRows(quiet, pick) {
  const returned = units.filter((u) => u.returned !== null);
  const known = returned.filter((u) => u.returned <= asOf && u.returned > dayNumber(2025, 1, 1));
  const rows = returned.map((u) => ({ serial: u.serial, day: u.returned, text: iso(u.returned) }));
  const rowOf = (unit) => rows.find((row) => row.serial === unit.serial);
  rowOf(pick(known)).text = '2026-02-30';
  rowOf(pick(known)).text = '04/05/2026';
  rowOf(pick(known)).text = '';
  rowOf(pick(known)).serial = '120-90417';
  const hasty = pick(known);
  rowOf(hasty).text = iso(hasty.shipped - 21);
  const again = [pick(known), pick(known)].map((u) => [u.serial, Math.min(u.returned + 45, asOf)]);
  const old = pick(quiet.filter((u) => u.product === 'QB-45' && u.shipped < dayNumber(2024, 6, 1)));
  const favour = [old.serial, addMonths(old.shipped, 24) + 40];
  for (const [serial, day] of [...again, favour]) rows.push({ serial, day, text: iso(day) });
  return rows.sort((a, b) => a.day - b.day || (a.serial < b.serial ? -1 : 1));
}

// ---------------------------------------------------------------- files

function plan(product, quantities) {
  return quantities.map(
    (quantity, i) => `${product},${iso(dayNumber(2026, 11 + i, 1)).slice(0, 7)},${quantity}`,
  );
}

function write(name, header, rows) {
  writeFileSync(`${folder.replace(/\/$/, '')}/${name}`, `${[header, ...rows].join('\n')}\n`);
}

function summary() {
  for (const { name } of products) {
    const own = units.filter((unit) => unit.product === name);
    const back = own.filter((unit) => unit.returned !== null && unit.returned <= asOf).length;
    const left = own.filter((unit) => unit.withdrawn !== null).length;
    console.log(`${name}: ${own.length} units, ${back} returned by ${iso(asOf)}, ${left} withdrawn`);
  }
}

/** Uniform on [0, 1) with 32 bits: mulberry32, T. Ettinger, public domain. */
function generator(seed) {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

function range(from, to) {
  return Array.from({ length: to - from }, (_, i) => from + i);
}
