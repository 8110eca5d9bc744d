import type { Complaint } from './check.js';
import type { Stated, settingKeys } from './keys.js';
import { pathText } from './path.js';

/** The settings and the flags laid over each other, products apart. */
export type Said = Stated<typeof settingKeys>;

const records = ['shipments', 'returns', 'withdrawals', 'plan', 'table', 'tableWithdrawn', 'ages'] as const;
type Input = (typeof records)[number];

/** Keys that take part in what `inputComplaints` looks at. */
export const inputKeys: readonly string[] = [...records, 'asOf', 'ageUnit', 'ageStep'];

/** The flags over the settings; a flag that names files leaves how they are read. */
export function layOver(settings: Said, flags: Said): Said {
  const inputs = records
    .filter((input) => input in flags)
    .map((input) => [input, { ...settings[input], ...flags[input] }] as const);
  return { ...settings, ...flags, ...Object.fromEntries(inputs) };
}

/** What is wrong with the inputs together: two ways of giving the same thing, a part without the other. */
export function inputComplaints(said: Said): Complaint[] {
  const given = records.filter((input) => (said[input]?.files?.length ?? 0) > 0);
  const has = (input: Input) => given.includes(input);
  const clashes = (input: Input, others: readonly (keyof Said)[]) =>
    has(input) ? others.map((other) => clash(other, input)) : [];
  return [
    ...clashes(
      'ages',
      given.filter((input) => input !== 'ages'),
    ),
    ...clashes(
      'ages',
      (['asOf', 'period'] as const).filter((key) => said[key] !== undefined),
    ),
    ...clashes(
      'table',
      has('ages') ? [] : given.filter((i) => ['shipments', 'returns', 'withdrawals'].includes(i)),
    ),
    ...(has('tableWithdrawn') && !has('table') ? [lacks('tableWithdrawn', 'table')] : []),
    ...(['ageUnit', 'ageStep'] as const)
      .filter((key) => key in said && !has('ages'))
      .map((key) => lacks(key, 'ages')),
    ...(['returns', 'withdrawals', 'plan'] as const)
      .filter((key) => has(key) && !['shipments', 'table', 'ages'].some((source) => has(source as Input)))
      .map((key) => lacks(key, 'shipments')),
    ...(given.length === 0 ? [nothing] : []),
    ...(['table', 'tableWithdrawn'] as const).flatMap((input) => secondFile(input, said)),
    ...standardInputTwice(said),
  ];
}

const nothing: Complaint = {
  code: 'missing-records',
  message: 'missing shipments, table or ages',
  remedy: 'name the files in the settings or by --shipments, --table or --ages',
  path: [],
  at: 'value',
};

function clash(key: keyof Said, other: Input): Complaint {
  const message = `invalid ${key}, not allowed beside ${other}`;
  return { code: 'conflicting-input', message, remedy: 'remove one of the two', path: [key], at: 'key' };
}

function lacks(key: keyof Said, needed: Input): Complaint {
  const message = `missing ${needed}, needed by ${key}`;
  return {
    code: 'missing-records',
    message,
    remedy: `add ${needed} or remove ${key}`,
    path: [key],
    at: 'key',
  };
}

function secondFile(input: 'table' | 'tableWithdrawn', said: Said): Complaint[] {
  const { length } = said[input]?.files ?? [];
  if (length < 2) return [];
  const path = [input, 'files', 1];
  const message = `invalid ${pathText(path)}, allowed one file and not ${length}`;
  return [{ code: 'invalid-value', message, remedy: 'put the tables into one file', path, at: 'value' }];
}

function standardInputTwice(said: Said): Complaint[] {
  const places = records.flatMap((input) =>
    (said[input]?.files ?? []).flatMap((file, i) => (file === '-' ? [[input, 'files', i]] : [])),
  );
  return places.slice(1).map((path) => {
    const message = `invalid ${pathText(path)} "-", standard input can be read once only`;
    return { code: 'double-stdin', message, remedy: 'name a file', path, at: 'value' };
  });
}
