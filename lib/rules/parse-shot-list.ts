import Papa from 'papaparse';

/** One shot out of a list, with the lines of the text that name it. */
export interface ListedShot {
  code: string;
  sequence: string;
  assets: { asset: string; copies: number }[];
  lines: number[];
}

/** What is wrong with a list. Lines and columns count from 1; column 0 is the whole line. */
export interface ShotListError {
  line: number;
  column: number;
  message: string;
}

export interface ShotList {
  shots: ListedShot[];
  errors: ShotListError[];
}

const COLUMNS = ['sequence', 'shot', 'assets', 'copies'] as const;
type Column = (typeof COLUMNS)[number];

/** Other words that spreadsheets head these columns with. */
const HEADS: Readonly<Record<string, Column>> = { sequence: 'sequence', seq: 'sequence', shot: 'shot', 'shot code': 'shot', code: 'shot', asset: 'assets', assets: 'assets', copies: 'copies', count: 'copies' };

const CODE = /^[A-Za-z0-9][A-Za-z0-9._-]{0,63}$/;
const CODE_RULE = 'starts with a letter or digit and has at most 64 letters, digits, dots, _ or -.';
const MOST_COPIES = 200;

interface Line {
  line: number;
  cells: string[];
}

/**
 * Reads shots as a spreadsheet gives them: sequence, shot, assets and copies with tabs, commas or semicolons between, with or without
 * a line of headings in any order. Assets stand on lines of their own or several in a cell; a number behind one (`lantern 3`) or in
 * the column of copies says how many. Lines of one shot are put together. Every line that cannot be read is an error with its place.
 */
export function parseShotList(text: string): ShotList {
  const errors: ShotListError[] = [];
  const lines = readLines(text.replace(/^\uFEFF/, ''), errors);
  if (lines.length === 0) return { shots: [], errors };
  const headed = headsOf(lines[0], errors);
  const places = headed ?? new Map(COLUMNS.map((column, index) => [column, index] as const));
  const shots = new Map<string, ListedShot>();
  const named = new Map<string, number>();
  for (const { line, cells } of headed === null ? lines : lines.slice(1)) {
    const placeOf = (column: Column) => (places.get(column) ?? COLUMNS.indexOf(column)) + 1;
    const cell = (column: Column) => cells[places.get(column) ?? -1]?.trim() ?? '';
    const add = (column: Column, message: string): void => void errors.push({ line, column: placeOf(column), message });
    if (headed === null && cells.slice(COLUMNS.length).some((one) => one.trim() !== '')) {
      errors.push({ line, column: COLUMNS.length + 1, message: `There are ${cells.length} columns; sequence, shot, assets and copies are 4.` });
      continue;
    }
    const [sequence, code] = [cell('sequence'), cell('shot')];
    if (!CODE.test(sequence)) add('sequence', sequence === '' ? 'The sequence is missing.' : `The sequence “${sequence}” is no code: it ${CODE_RULE}`);
    if (!CODE.test(code)) add('shot', code === '' ? 'The shot is missing.' : `The shot “${code}” is no code: it ${CODE_RULE}`);
    const copies = cell('copies') === '' ? 1 : readCopies(cell('copies'));
    if (copies === null) add('copies', `“${cell('copies')}” is no number of copies from 1 to ${MOST_COPIES}.`);
    const assets = parseAssetsInShot(cell('assets'), copies ?? 1);
    if (typeof assets === 'string') add('assets', assets);
    if (!CODE.test(sequence) || !CODE.test(code) || copies === null || typeof assets === 'string') continue;
    const known = shots.get(code.toLowerCase());
    if (known && known.sequence !== sequence) {
      add('sequence', `${code} is in sequence ${known.sequence} on line ${known.lines[0]}.`);
      continue;
    }
    const shot = known ?? { code, sequence, assets: [], lines: [] };
    shots.set(code.toLowerCase(), shot);
    shot.lines.push(line);
    for (const one of assets) {
      const key = `${code.toLowerCase()} ${one.asset}`;
      const before = named.get(key);
      if (before !== undefined) add('assets', `${one.asset} is named for ${code} ${before === line ? 'twice' : `on line ${before} already`}; give its copies once.`);
      else shot.assets.push(one);
      named.set(key, before ?? line);
    }
  }
  return { shots: [...shots.values()], errors: errors.sort((a, b) => a.line - b.line || a.column - b.column) };
}

/** Assets of one cell, such as `tarnOx, lantern 3` or `tarnOx lantern`; what is wrong with it as a sentence. `copies` counts where no number stands. */
export function parseAssetsInShot(text: string, copies = 1): { asset: string; copies: number }[] | string {
  const assets: { asset: string; copies: number }[] = [];
  let counted = true;
  for (const word of text.split(/[\s,;]+/).filter((one) => one !== '')) {
    const count = counted ? null : /^[x×]?(\d+)$/.exec(word);
    if (count === null) {
      assets.push({ asset: word, copies });
      counted = false;
      continue;
    }
    const number = readCopies(count[1]);
    if (number === null) return `“${word}” is no number of copies from 1 to ${MOST_COPIES}.`;
    assets[assets.length - 1].copies = number;
    counted = true;
  }
  return assets;
}

function readCopies(text: string): number | null {
  const number = Number(text);
  return /^\d+$/.test(text) && number >= 1 && number <= MOST_COPIES ? number : null;
}

/** Lines that hold something, each with its number in the text: a cell in quotes may run over several. */
function readLines(text: string, errors: ShotListError[]): Line[] {
  const lines: Line[] = [];
  const delimiter = delimiterOf(text);
  let start = 0;
  let line = 1;
  Papa.parse<string[]>(text, {
    delimiter,
    skipEmptyLines: false,
    step: ({ data, meta, errors: found }) => {
      for (const error of found) errors.push({ line, column: 0, message: error.type === 'Quotes' ? 'A quotation mark is not closed, or stands inside a cell that does not begin with one.' : error.message });
      if (found.length === 0 && data.some((cell) => cell.trim() !== '')) lines.push({ line, cells: data });
      line += text.slice(start, meta.cursor).split(/\r\n|\r|\n/).length - 1;
      start = meta.cursor;
    },
  });
  return lines;
}

/** A tab in the first line means tabs; else commas, unless semicolons alone stand there. */
function delimiterOf(text: string): string {
  const first = text.split(/\r\n|\r|\n/).find((line) => line.trim() !== '') ?? '';
  if (first.includes('\t')) return '\t';
  return first.includes(',') || !first.includes(';') ? ',' : ';';
}

/** Where the columns stand, if the first line heads them; null where it is a shot already. */
function headsOf({ line, cells }: Line, errors: ShotListError[]): Map<Column, number> | null {
  const found = cells.map((cell) => HEADS[cell.trim().toLowerCase()]);
  if (found.filter((column) => column !== undefined).length < 2) return null;
  const places = new Map<Column, number>();
  cells.forEach((cell, index) => {
    const column = found[index];
    if (column === undefined) {
      if (cell.trim() !== '') errors.push({ line, column: index + 1, message: `“${cell.trim()}” is none of ${COLUMNS.join(', ')}.` });
    } else if (places.has(column)) errors.push({ line, column: index + 1, message: `Two columns are headed ${column}.` });
    else places.set(column, index);
  });
  for (const column of ['sequence', 'shot'] as const) if (!places.has(column)) errors.push({ line, column: 0, message: `No column is headed ${column}.` });
  return places;
}
