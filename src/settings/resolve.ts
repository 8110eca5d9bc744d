import type { Config } from '../config.js';
import { exitCodes, type Fault, UserError } from '../errors.js';
import { type Checked, type Complaint, checkKeys } from './check.js';
import { completeConfig } from './complete.js';
import type { SettingsFile } from './file.js';
import { type Flags, flagPlace, type ReadFlags, readFlags } from './flags.js';
import { inputComplaints, inputKeys, layOver, type Said } from './inputs.js';
import { settingKeys } from './keys.js';
import type { Path } from './path.js';
import { type Rules, readProducts, type StatedProducts } from './products.js';
import { agesComplaints, layRules, rulesComplaints } from './rules.js';

/**
 * The complete configuration of a run: the flags over the settings, every default filled in.
 *
 * Flags override everything: a warranty or delay flag holds for every product, also for one that the settings give
 * that key by name. A flag that names files keeps the columns, date format and encoding the settings give them. A
 * delay that comes from a flag has as its reason that it was given there, unless the settings say the same delay.
 * @param settings null when there is no settings file.
 * @throws UserError exit 2 with every fault of the settings and the flags, each with its place.
 */
export function resolveConfig(settings: SettingsFile | null, flags: Flags): Config {
  const { products, ...values } = settings?.value ?? {};
  const read: Read = {
    settings: checkKeys(settingKeys, values, [], ['products']),
    products: readProducts(products),
    flags: readFlags(flags),
  };
  const said = layOver(read.settings.stated, read.flags.settings);
  const rules = layProducts(read.products, read.flags.rules);
  const faults = [
    ...placed([...read.settings.complaints, ...read.products.complaints], settingsPlace(settings)),
    ...placed(read.flags.complaints, flagPlace),
    ...placed(
      [...togetherInputs(read, said), ...togetherRules(read, rules), ...beside(read, said)],
      anyPlace(settings, read.flags),
    ),
  ];
  if (faults.length > 0) throw new UserError(inOrder(faults), exitCodes.unusableSettings);
  return completeConfig(said, rules.every, rules.named);
}

interface Read {
  readonly settings: Checked<typeof settingKeys>;
  readonly products: StatedProducts;
  readonly flags: ReadFlags;
}

type Products = Pick<StatedProducts, 'every' | 'named'>;
type PlaceOf = (path: Path, at: Complaint['at']) => Pick<Fault, 'file' | 'line' | 'column'>;

/** `*` under each product, key by key, and the flags over both. */
function layProducts(stated: StatedProducts, flags: Rules): Products {
  return {
    every: layRules([stated.every], flags),
    named: stated.named.map(({ product, rules }) => ({
      product,
      rules: layRules([stated.every, rules], flags),
    })),
  };
}

/** Where single inputs are at fault, what they lack together would only repeat it. */
function togetherInputs(read: Read, said: Said): readonly Complaint[] {
  const single = [...read.settings.complaints, ...read.flags.complaints];
  return single.some(({ path }) => inputKeys.includes(String(path[0]))) ? [] : inputComplaints(said);
}

function togetherRules(read: Read, laid: Products): readonly Complaint[] {
  const faulty = new Set(read.products.complaints.map(({ path }) => path[1]));
  if (read.flags.complaints.length > 0 || faulty.has('*')) return [];
  return [
    ...rulesComplaints('*', { ...read.products.every, ...read.flags.rules }, laid.every),
    ...read.products.named.flatMap(({ product, rules }, i) =>
      faulty.has(product) ? [] : rulesComplaints(product, rules, laid.named[i]?.rules ?? {}),
    ),
  ];
}

function beside(read: Read, said: Said): readonly Complaint[] {
  if ((said.ages?.files?.length ?? 0) === 0) return [];
  return [
    ...agesComplaints('*', { ...read.products.every, ...read.flags.rules }),
    ...read.products.named.flatMap(({ product, rules }) => agesComplaints(product, rules)),
  ];
}

function settingsPlace(settings: SettingsFile | null): PlaceOf {
  return (path, at) => settings?.place(path, at) ?? {};
}

/** The flag where one says it, else the settings. */
function anyPlace(settings: SettingsFile | null, flags: ReadFlags): PlaceOf {
  return (path, at) => {
    const key = String(path[0] === 'products' ? path[2] : path[0]);
    return key in flags.settings || key in flags.rules ? flagPlace([key]) : settingsPlace(settings)(path, at);
  };
}

function placed(complaints: readonly Complaint[], place: PlaceOf): Fault[] {
  return complaints.map(({ path, at, ...fault }) => ({ ...fault, ...place(path, at) }));
}

/** Those of the settings file as they stand in it, then those of the flags. */
function inOrder(faults: readonly Fault[]): Fault[] {
  const line = (fault: Fault) => fault.line ?? Number.MAX_SAFE_INTEGER;
  const column = (fault: Fault) => (typeof fault.column === 'number' ? fault.column : 0);
  return [...faults].sort((a, b) => line(a) - line(b) || column(a) - column(b));
}
