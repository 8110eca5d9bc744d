import type { InputConfig } from '../config.js';
import { exitCodes, type Fault, UserError } from '../errors.js';
import type { InputRole } from '../records.js';
import { plainHeader, roleFields, synonyms } from './fields.js';

/** Where the fields stand in the rows of one file. */
export interface Columns {
  readonly header: readonly string[];
  /** Position of a field, -1 where the file does not have it. */
  readonly at: (field: string) => number;
  /** Headers that mean no field of the role, without the empty ones. */
  readonly unused: readonly string[];
}

/**
 * Finds the fields of a role among the headers of a file: first by the setting `columns`, then by name or synonym.
 * @throws UserError exit 3 with every fault: two headers for one field, a missing or a refused column; exit 2 when `columns`
 * names no field of the role, or gives two fields one header.
 */
export function findColumns(
  role: InputRole,
  file: string,
  header: readonly string[],
  input: InputConfig,
): Columns {
  const names = header.map((name) => name.trim());
  const { required, optional } = roleFields[role];
  const fields = [...required, ...optional];
  const mapped = mappedFields(role, file, fields, input);
  const found = new Map<string, number[]>();
  for (const field of fields) {
    const wanted = mapped.get(field);
    found.set(field, wanted === undefined ? byName(field, names) : byHeader(wanted, names));
  }
  checkShared(file, found, names);
  const faults = [...doubled(found, names), ...missing(role, found, names, mapped), ...refused(role, names)];
  if (faults.length > 0)
    throw new UserError(
      faults.map((fault) => ({ ...fault, file, line: 1 })),
      exitCodes.unusableInput,
    );
  const positions = new Map([...found].map(([field, at]) => [field, at[0] ?? -1]));
  const used = new Set(positions.values());
  return {
    header: names,
    at: (field) => positions.get(field) ?? -1,
    unused: names.filter((name, i) => name !== '' && !used.has(i)),
  };
}

function byName(field: string, header: readonly string[]): number[] {
  const plain = plainHeader(field);
  const means = (name: string) => name === plain || synonyms.get(name) === plain;
  return header.flatMap((name, i) => (means(plainHeader(name)) ? [i] : []));
}

function byHeader(wanted: string, header: readonly string[]): number[] {
  return header.flatMap((name, i) => (plainHeader(name) === plainHeader(wanted) ? [i] : []));
}

function mappedFields(
  role: InputRole,
  file: string,
  fields: readonly string[],
  input: InputConfig,
): Map<string, string> {
  const mapped = new Map<string, string>();
  for (const [name, header] of Object.entries(input.columns)) {
    const field = fields.find((candidate) => plainHeader(candidate) === plainHeader(name));
    if (field === undefined) throw unknownField(role, file, name, fields);
    mapped.set(field, header);
  }
  return mapped;
}

function unknownField(role: InputRole, file: string, name: string, fields: readonly string[]): UserError {
  const message = `unknown field ${name} in columns of ${role}`;
  return new UserError(
    { code: 'unknown-field', file, message, remedy: `use one of ${fields.join(', ')}` },
    exitCodes.unusableSettings,
  );
}

/** Names and synonyms differ by field, so that only `columns` can give a header to two of them. */
function checkShared(
  file: string,
  found: ReadonlyMap<string, readonly number[]>,
  header: readonly string[],
): void {
  const faults = header.flatMap((name, at): Fault[] => {
    const fields = [...found].filter(([, positions]) => positions.includes(at)).map(([field]) => field);
    if (fields.length < 2) return [];
    const message = `invalid columns: header ${name} is taken for ${fields.join(' and ')}`;
    return [{ code: 'shared-header', file, message, remedy: 'name a header of its own for each field' }];
  });
  if (faults.length > 0) throw new UserError(faults, exitCodes.unusableSettings);
}

function doubled(found: ReadonlyMap<string, readonly number[]>, header: readonly string[]): Fault[] {
  return [...found]
    .filter(([, at]) => at.length > 1)
    .map(([field, at]) => ({
      code: 'doubled-header',
      message: `invalid header: ${at.map((i) => header[i]).join(' and ')} both mean ${field}`,
      remedy: `rename or remove one of them, or name the right one in columns: { "${field}": "…" }`,
    }));
}

function missing(
  role: InputRole,
  found: ReadonlyMap<string, readonly number[]>,
  header: readonly string[],
  mapped: ReadonlyMap<string, string>,
): Fault[] {
  const has = (field: string) => (found.get(field)?.length ?? 0) > 0;
  const { required, oneOf } = roleFields[role];
  const lost = [...new Set([...required, ...mapped.keys()])].filter((field) => !has(field));
  const faults: Fault[] = lost.map((field) => ({
    code: 'missing-column',
    message: `missing column ${mapped.get(field) ?? field}; the headers are ${header.join(', ')}`,
    remedy: `name the header that means ${field} in the setting columns: { "${field}": "…" }`,
  }));
  if (oneOf !== null && !oneOf.sets.some((set) => set.every(has))) {
    const sets = oneOf.sets.map((set) => set.join(' and ')).join(', or ');
    const message = `missing column ${sets}; the headers are ${header.join(', ')}`;
    faults.push({ code: 'missing-column', message, remedy: oneOf.remedy });
  }
  return faults;
}

function refused(role: InputRole, header: readonly string[]): Fault[] {
  return roleFields[role].refused.flatMap((field) =>
    byHeader(field, header).map((i) => ({
      code: 'column-not-supported',
      message: `invalid column ${header[i]}: this version cannot use it, and without it the forecast would be wrong`,
      remedy: 'remove or rename the column if it does not matter',
    })),
  );
}
