import type { Category } from './states';

/** What a path and file name say. `version` is null where they name none. */
export interface ReadName {
  asset: string;
  category: Category;
  version: number | null;
}

const CATEGORY_FOLDERS: Record<string, Category> = {
  creature: 'creature', creatures: 'creature',
  prop: 'prop', props: 'prop',
  costume: 'costume', costumes: 'costume',
  set: 'set', sets: 'set',
  vehicle: 'vehicle', vehicles: 'vehicle',
  other: 'other',
};

/** A version token: `v` and digits, after a separator or the start, before one or the end. */
const TOKEN = /(^|[._\- ])v(\d{1,9})(?=$|[._\- ])/gi;
/** `hammerV12` and `hammerv012`: a version that nothing separates, at the very end; `nav2` is a word with a number. */
const GLUED = /^(.*[\p{L}\d)])v(\d{2,9})$/iu;
const MAX_PATTERN = 200;
const MOST_STARS = 4;

/** The category that a folder's name stands for, or null. */
export function categoryOfFolder(folder: string): Category | null {
  return CATEGORY_FOLDERS[folder.toLowerCase()] ?? null;
}

/** A path with forward slashes, without empty, `.` and `..` steps, split into folders and file name. */
export function splitPath(path: string): { folders: string[]; file: string } {
  const steps = path.split(/[\\/]+/).filter((step) => step !== '' && step !== '.' && step !== '..');
  return { folders: steps.slice(0, -1), file: steps.at(-1) ?? '' };
}

/** File name without its last extension; a leading dot is no extension. */
export function stemOf(file: string): string {
  const dot = file.lastIndexOf('.');
  const extension = file.slice(dot + 1);
  // `.v012` is a version, not an extension.
  return dot > 0 && !/^v\d+$/i.test(extension) ? file.slice(0, dot) : file;
}

/** Takes the last version token out of a name. The rest is tidied of the separators that the token leaves behind. */
export function takeVersion(name: string): { rest: string; version: number | null } {
  const last = [...name.matchAll(TOKEN)].at(-1);
  if (last) {
    const rest = `${name.slice(0, last.index)}${name.slice(last.index + last[0].length)}`.replace(/^[._\- ]+|[._\- ]+$/g, '');
    return { rest, version: Number(last[2]) };
  }
  const glued = GLUED.exec(name);
  if (glued) return { rest: glued[1].replace(/[._\- ]+$/, ''), version: Number(glued[2]) };
  return { rest: name, version: null };
}

/** Reads a name by the built-in rule: version token, the stem without it, a folder named like a category. */
export function readNameBuiltIn(path: string): ReadName | null {
  const { folders, file } = splitPath(path);
  const stem = stemOf(file);
  const own = takeVersion(stem);
  const category = folders.map(categoryOfFolder).findLast((found) => found !== null) ?? 'other';
  let version = own.version;
  for (const folder of [...folders].reverse()) version ??= takeVersion(folder).version;
  // A file that is only `v012.obj` is named by its folder.
  const asset = own.rest !== '' ? own.rest : (tellingFolders(folders).at(-1) ?? '');
  return asset === '' ? null : { asset, category, version };
}

/** Folders that tell assets apart: those that only name a version do not. */
function tellingFolders(folders: readonly string[]): string[] {
  return folders.map((folder) => takeVersion(folder).rest).filter((folder) => folder !== '');
}

/**
 * The folders that may tell the asset of a name from another one of the same name. The built-in rule takes all but those that only name
 * a version or the asset itself (`ox/v012.obj`). A show's own pattern says where the asset stands, so only what it reads as category counts.
 */
export function placeOf(path: string, pattern: string | null): string[] {
  const { folders, file } = splitPath(path);
  if (pattern === null) {
    const telling = tellingFolders(folders);
    return takeVersion(stemOf(file)).rest === '' ? telling.slice(0, -1) : telling;
  }
  const category = matchPattern(path, pattern)?.('category');
  return category === undefined ? [] : [category];
}

interface CompiledPattern {
  regex: RegExp;
  names: string[];
}

const PLACEHOLDERS: Record<string, string> = { asset: '[^/]+?', version: '\\d{1,9}', category: '[^/]+?' };

/**
 * A show's own pattern as a sentence of what is wrong with it, or null when it can be used.
 * `{asset}` (needed), `{version}` and `{category}` stand for what is read, `*` for anything within a folder's name;
 * the pattern is matched against the end of the path, without the file's extension.
 */
export function checkNamePattern(pattern: string): string | null {
  if (pattern.length > MAX_PATTERN) return `The pattern is longer than ${MAX_PATTERN} characters.`;
  if (pattern.trim() === '') return 'The pattern is empty. Leave it out to use the built-in rule.';
  const names = [...pattern.matchAll(/\{([^{}]*)\}/g)].map((match) => match[1]);
  const unknown = names.find((name) => !(name in PLACEHOLDERS));
  if (unknown !== undefined) return `{${unknown}} is not known. Use {asset}, {version} and {category}.`;
  if (/[{}]/.test(pattern.replace(/\{[^{}]*\}/g, ''))) return 'A brace is open or closed without its partner.';
  const twice = names.find((name, index) => names.indexOf(name) !== index);
  if (twice !== undefined) return `{${twice}} stands in the pattern twice.`;
  if (!names.includes('asset')) return 'The pattern needs {asset}.';
  if (/\}\{/.test(pattern)) return 'Two placeholders touch. Put a character between them, such as _ or /.';
  if ((pattern.match(/\*/g) ?? []).length > MOST_STARS) return `The pattern has more than ${MOST_STARS} stars.`;
  if (/(^|\/)\.{1,2}(\/|$)|\\/.test(pattern)) return 'Use forward slashes, and no . or .. as a folder.';
  return null;
}

function compile(pattern: string): CompiledPattern {
  const names: string[] = [];
  const body = pattern
    .replace(/^\/+/, '')
    .split(/(\{[^{}]*\}|\*)/)
    .map((piece) => {
      if (piece === '*') return '[^/]*?';
      const name = /^\{(.*)\}$/.exec(piece)?.[1];
      if (name === undefined) return piece.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
      names.push(name);
      return `(${PLACEHOLDERS[name]})`;
    })
    .join('');
  return { regex: new RegExp(`(?:^|/)${body}$`, 'iu'), names };
}

const compiled = new Map<string, CompiledPattern>();

/** What the pattern's placeholders stand for in a path, or null when it does not match. */
function matchPattern(path: string, pattern: string): ((name: string) => string | undefined) | null {
  let known = compiled.get(pattern);
  if (!known) {
    if (compiled.size > 100) compiled.clear();
    compiled.set(pattern, (known = compile(pattern)));
  }
  const { folders, file } = splitPath(path);
  const match = known.regex.exec([...folders, stemOf(file)].join('/'));
  const { names } = known;
  return match && ((name) => (names.includes(name) ? match[1 + names.indexOf(name)] : undefined));
}

/** Whether a folder of the path, or the pattern, names a category. */
export function namesCategory(path: string, pattern: string | null): boolean {
  const read = pattern === null ? undefined : matchPattern(path, pattern)?.('category');
  return (read !== undefined && categoryOfFolder(read) !== null) || splitPath(path).folders.some((folder) => categoryOfFolder(folder) !== null);
}

/** Reads a name by the show's pattern, or by the built-in rule when it has none. Null when the name does not match. */
export function readName(path: string, pattern: string | null): ReadName | null {
  if (pattern === null) return readNameBuiltIn(path);
  const field = matchPattern(path, pattern);
  if (!field) return null;
  const version = field('version');
  const category = field('category');
  const asset = field('asset')?.trim() ?? '';
  if (asset === '') return null;
  const fallback = splitPath(path).folders.map(categoryOfFolder).findLast((found) => found !== null) ?? 'other';
  return { asset, category: category === undefined ? fallback : (categoryOfFolder(category) ?? 'other'), version: version === undefined ? null : Number(version) };
}
