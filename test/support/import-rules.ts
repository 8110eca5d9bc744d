import { builtinModules } from 'node:module';
import { posix } from 'node:path';

/** A rule of the house: what breaks it in a file of src/, and why it stands. */
export interface Rule {
  readonly name: string;
  readonly reason: string;
  /** What in the file breaks the rule; empty when nothing does. */
  readonly breaches: (file: SourceFile) => readonly string[];
}

/** A file of src/: `path` relative to src/ with `/`, its imports as written and resolved, its code without comments and strings. */
export interface SourceFile {
  readonly path: string;
  readonly imports: readonly { readonly written: string; readonly resolved: string }[];
  readonly code: string;
}

/** Reads the imports (static, dynamic, in types, by URL) and the bare code out of a file's text. */
export function sourceFile(path: string, text: string): SourceFile {
  const uncommented = text.replace(tokens, (token) => (/^\/[/*]/.test(token) ? ' ' : token));
  const code = text.replace(tokens, (token) => (/^['"]/.test(token) ? "''" : /^`/.test(token) ? token : ' '));
  const imports = [...uncommented.matchAll(importPattern)].map((match) => {
    const written = match.slice(1).find((group) => group !== undefined) ?? '';
    const resolved = written.startsWith('.') ? posix.join(posix.dirname(path), written) : written;
    return { written, resolved };
  });
  return { path, imports, code };
}

const stages = ['ingest', 'fit', 'forecast', 'assess', 'reserve', 'report', 'ledger'];

export const rules: readonly Rule[] = [
  {
    name: 'no stage imports another',
    reason: 'stages meet only in records.ts, so that each can be read, tested and replaced alone',
    breaches: (file) =>
      stages.includes(folderOf(file.path))
        ? imported(file, (to) => stages.includes(folderOf(to)) && folderOf(to) !== folderOf(file.path))
        : [],
  },
  {
    name: 'report imports neither fit, forecast nor families',
    reason: 'a report draws numbers that are finished; what it computed itself could differ from the JSON',
    breaches: (file) =>
      folderOf(file.path) === 'report'
        ? imported(file, (to) => ['fit', 'forecast', 'families'].includes(folderOf(to)))
        : [],
  },
  {
    name: 'only pipeline.ts, index.ts and cli/ import stages',
    reason: 'the order of the stages is written once, on one screen',
    breaches: (file) =>
      ['pipeline.ts', 'index.ts'].includes(file.path) || ['cli', ...stages].includes(folderOf(file.path))
        ? []
        : imported(file, (to) => stages.includes(folderOf(to))),
  },
  {
    name: 'no stage imports the pipeline or the index',
    reason: 'a stage that needs another receives it as a function, so that nothing runs in circles',
    breaches: (file) =>
      ['cli', ''].includes(folderOf(file.path))
        ? []
        : imported(file, (to) => ['pipeline.js', 'index.js'].includes(to)),
  },
  {
    name: 'math/ imports only math/',
    reason: 'functions of numbers know no word of the domain and no module of Node',
    breaches: (file) =>
      folderOf(file.path) === 'math'
        ? imported(file, (to) => folderOf(to) !== 'math' && (to.startsWith('node:') || isOurs(file, to)))
        : [],
  },
  {
    name: 'families/ imports only families/, math/ and the shared contracts',
    reason: 'a distribution is mathematics; it does not know who fits it',
    breaches: (file) =>
      folderOf(file.path) === 'families'
        ? imported(
            file,
            (to) => isOurs(file, to) && !['families', 'math'].includes(folderOf(to)) && to !== 'errors.js',
          )
        : [],
  },
  {
    name: 'cli/ is imported by nobody',
    reason: 'the real world comes in through Effects, so that the library stays pure',
    breaches: (file) => (folderOf(file.path) === 'cli' ? [] : imported(file, (to) => folderOf(to) === 'cli')),
  },
  {
    name: 'only cli/ touches files, processes and threads',
    reason: 'everything else is a function of its arguments; of Node it may use crypto, buffer and stream',
    breaches: (file) =>
      folderOf(file.path) === 'cli'
        ? []
        : [...imported(file, isWorldly), ...used(file, /(?<![\w.$])(?:globalThis\s*\.\s*)?process\s*\??\./g)],
  },
  {
    name: 'only cli/ knows the clock',
    reason: 'equal inputs, settings and seed give equal bytes, whenever they are run',
    breaches: (file) =>
      folderOf(file.path) === 'cli'
        ? []
        : used(
            file,
            /\bDate\s*\.\s*now\b|\bnew\s+Date\s*(?:\(\s*\)|(?![\w\s(]))|(?<![\w.$])Date\s*\(\s*\)|\bperformance\s*\./g,
          ),
  },
  {
    name: 'nothing depends on chance, locale or time zone',
    reason:
      'draws come from the seeded generator, text is sorted by code point; where Intl helps, the locale is named',
    breaches: (file) =>
      used(
        file,
        /\bMath\s*\.\s*random\b|\bIntl\s*\.\s*(?:DateTimeFormat\b|\w+(?!\w|\s*\(\s*''))|\.\s*toLocale\w*|\.\s*localeCompare\b|\.\s*getTimezoneOffset\b/g,
      ),
  },
  {
    name: 'src/ imports nothing outside src/',
    reason:
      'tests and sample data lean on the program, never the other way round; cli/ reads templates and the version',
    breaches: (file) =>
      imported(
        file,
        (to) =>
          to.startsWith('..') &&
          !(folderOf(file.path) === 'cli' && /^\.\.\/(templates\/|package\.json$)/.test(to)),
      ),
  },
  {
    name: 'imports of our own files end in .js',
    reason: 'Node resolves modules by their full names',
    breaches: (file) =>
      imported(file, (to) => isOurs(file, to) && !to.startsWith('..') && !to.endsWith('.js')),
  },
];

/** Comments, strings and templates, in the order in which they would swallow one another. */
const tokens = /\/\*[\s\S]*?\*\/|\/\/[^\n]*|'(?:\\.|[^'\\\n])*'|"(?:\\.|[^"\\\n])*"|`(?:\\[\s\S]|[^`\\])*`/g;

const importPattern =
  /\b(?:import|export)\b[^'"`;()]*?\bfrom\s*['"]([^'"]+)['"]|\b(?:import|require)\s*\(\s*['"]([^'"]+)['"]|\bimport\s*['"]([^'"]+)['"]|\bnew\s+URL\s*\(\s*['"](\.[^'"]*)['"]/g;

function folderOf(path: string): string {
  const slash = path.indexOf('/');
  return slash < 0 ? '' : path.slice(0, slash);
}

function imported(file: SourceFile, forbidden: (resolved: string) => boolean): string[] {
  return file.imports
    .filter(({ resolved }) => forbidden(resolved))
    .map(({ written }) => `imports ${written}`);
}

function used(file: SourceFile, pattern: RegExp): string[] {
  return [...file.code.matchAll(pattern)].map((match) => `uses ${match[0].trim()}`);
}

/** True when `resolved` is a file of ours rather than a package. */
function isOurs(file: SourceFile, resolved: string): boolean {
  return file.imports.some((one) => one.resolved === resolved && one.written.startsWith('.'));
}

function isWorldly(resolved: string): boolean {
  return resolved.startsWith('node:')
    ? !/^node:(crypto|buffer|stream)(\/|$)/.test(resolved)
    : builtinModules.includes(resolved.split('/')[0] ?? '');
}
