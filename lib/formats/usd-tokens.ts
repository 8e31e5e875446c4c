import { MeshError, type TextPlace } from './mesh-error';

export type UsdTokenKind = 'word' | 'number' | 'string' | 'path' | 'asset' | 'mark' | 'end';

const WORD = /[A-Za-z_\u0080-\uffff][\w:.\u0080-\uffff]*(?:\[\])?/y;
const NUMBER = /[+-]?(?:inf\b|nan\b|(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)/y;
const BLANK = /[\s,;]/;
const ESCAPES: Record<string, string> = { n: '\n', t: '\t', r: '\r' };
const MOST_STRING = 1 << 20;

/** Walks the tokens of a `.usda` text. Commas and semicolons only part things and count as blanks; `#` begins a comment. */
export class UsdTokens {
  /** Offset of the token that was read last. */
  start = 0;
  kind: UsdTokenKind = 'end';
  /** The token: a word, a mark, or the content of a string, path or asset. */
  text = '';
  number = 0;
  private at = 0;

  constructor(readonly source: string) {
    this.next();
  }

  /** Moves to the next token. Errors: bad_syntax. */
  next(): void {
    this.skipBlanks();
    const { source } = this;
    this.start = this.at;
    if (this.at >= source.length) {
      this.kind = 'end';
      this.text = '';
      return;
    }
    const c = source[this.at];
    if (c === '"' || c === "'") this.readString(c);
    else if (c === '<') this.readTo('>', 'path');
    else if (c === '@') this.readAsset();
    else if (this.match(NUMBER, 'number')) this.number = toNumber(this.text);
    else if (!this.match(WORD, 'word')) {
      this.kind = 'mark';
      this.text = c;
      this.at++;
    }
  }

  isMark(mark: string): boolean {
    return this.kind === 'mark' && this.text === mark;
  }

  isWord(word: string): boolean {
    return this.kind === 'word' && this.text === word;
  }

  /** Steps over a mark that has to stand here. */
  take(mark: string): void {
    if (!this.isMark(mark)) throw this.fail('bad_syntax', `"${mark}"`);
    this.next();
  }

  /** Steps over a token of a kind that has to stand here; answers its text. */
  takeText(kind: UsdTokenKind, expected: string): string {
    if (this.kind !== kind) throw this.fail('bad_syntax', expected);
    const { text } = this;
    this.next();
    return text;
  }

  /** An error at a token, by default the one at hand. */
  fail(code: string, expected: string, at = this.start): MeshError {
    const found = wordAt(this.source, at);
    return new MeshError({ code, expected, found, detail: `expected ${expected}, found ${found === '' ? 'the end of the file' : `"${found}"`}`, place: this.place(at) });
  }

  place(at: number): TextPlace {
    const from = this.source.lastIndexOf('\n', at - 1) + 1;
    const to = this.source.indexOf('\n', at);
    return { line: countLines(this.source, at), column: at - from + 1, text: this.source.slice(from, to < 0 ? this.source.length : to) };
  }

  private match(pattern: RegExp, kind: UsdTokenKind): boolean {
    pattern.lastIndex = this.at;
    const found = pattern.exec(this.source);
    if (!found) return false;
    this.kind = kind;
    this.text = found[0];
    this.at = pattern.lastIndex;
    return true;
  }

  private skipBlanks(): void {
    const { source } = this;
    for (;;) {
      while (this.at < source.length && BLANK.test(source[this.at])) this.at++;
      if (source[this.at] === '#') {
        const end = source.indexOf('\n', this.at);
        this.at = end < 0 ? source.length : end;
      } else if (source.startsWith('/*', this.at)) {
        const end = source.indexOf('*/', this.at + 2);
        this.at = end < 0 ? source.length : end + 2;
      } else if (source.startsWith('//', this.at)) {
        const end = source.indexOf('\n', this.at);
        this.at = end < 0 ? source.length : end;
      } else return;
    }
  }

  private readString(quote: string): void {
    const { source } = this;
    const long = source.startsWith(quote.repeat(3), this.at);
    const close = long ? quote.repeat(3) : quote;
    const pieces: string[] = [];
    let at = this.at + close.length;
    let from = at;
    for (;;) {
      const c = source[at];
      if (c === undefined || (!long && c === '\n') || at - this.start > MOST_STRING) throw this.fail('bad_syntax', `a string that ends in ${close}`);
      if (source.startsWith(close, at)) break;
      if (c !== '\\') {
        at++;
        continue;
      }
      const next = source[at + 1] ?? '';
      pieces.push(source.slice(from, at), ESCAPES[next] ?? next);
      at += 2;
      from = at;
    }
    pieces.push(source.slice(from, at));
    this.kind = 'string';
    this.text = pieces.join('');
    this.at = at + close.length;
  }

  private readAsset(): void {
    this.readTo(this.source.startsWith('@@@', this.at) ? '@@@' : '@', 'asset');
  }

  private readTo(close: string, kind: UsdTokenKind): void {
    const from = this.at + close.length;
    const end = this.source.indexOf(close, from);
    if (end < 0 || end - from > MOST_STRING) throw this.fail('bad_syntax', `"${close}" behind what it opens`);
    this.kind = kind;
    this.text = this.source.slice(from, end);
    this.at = end + close.length;
  }
}

function wordAt(text: string, at: number): string {
  return /^\S{0,40}/.exec(text.slice(at, at + 41))?.[0] ?? '';
}

/** Number of the line, from 1, that an offset lies on. */
function countLines(text: string, until: number): number {
  let lines = 1;
  for (let at = text.indexOf('\n'); at >= 0 && at < until; at = text.indexOf('\n', at + 1)) lines++;
  return lines;
}

function toNumber(text: string): number {
  if (/inf$/.test(text)) return text.startsWith('-') ? -Infinity : Infinity;
  return /nan$/.test(text) ? NaN : Number(text);
}
