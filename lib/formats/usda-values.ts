import { growingFloat64 } from './growing-array';
import { MOST_USD_DEPTH, type UsdValue } from './usd-prim';
import type { UsdTokens } from './usd-tokens';

const OPENS = new Map([['(', ')'], ['[', ']'], ['{', '}']]);
const CLOSES = new Set(OPENS.values());
/** Characters kept of metadata that is no plain value: enough for a list of references. */
const RAW_KEPT = 10_000;
/** Numbers in one array: the corners of the largest mesh and more. */
const MOST_NUMBERS = 256_000_000;

/**
 * Reads a value: one number, text or truth, or brackets of any nesting, whose items come out flat. All innermost tuples of an array have to be of one length.
 * `None` is null. Errors: bad_syntax, bad_tuple, too_deep.
 */
export function readUsdValue(tokens: UsdTokens): UsdValue | null {
  const { kind, text, number } = tokens;
  if (kind === 'mark' && (text === '[' || text === '(')) return readItems(tokens);
  if (kind === 'mark' && text === '{') {
    skipBrackets(tokens);
    return null;
  }
  if (kind === 'mark' || kind === 'end') throw tokens.fail('bad_syntax', 'a value');
  tokens.next();
  if (kind === 'number') return number;
  if (kind !== 'word') return text;
  return text === 'None' ? null : text === 'true' ? true : text === 'false' ? false : text;
}

function readItems(tokens: UsdTokens): UsdValue {
  const numbers = growingFloat64();
  const texts: string[] = [];
  const open: string[] = [];
  let tuple = 0;
  let width = -1;
  do {
    if (tokens.kind === 'end') throw tokens.fail('bad_syntax', `"${open.at(-1)}"`);
    if (tokens.kind === 'mark') {
      const close = OPENS.get(tokens.text);
      if (tokens.text === '{' || (!close && tokens.text !== open.at(-1))) throw tokens.fail('bad_syntax', `a value or "${open.at(-1)}"`);
      if (close) {
        if (open.length >= MOST_USD_DEPTH) throw tokens.fail('too_deep', `brackets nested at most ${MOST_USD_DEPTH} deep`);
        open.push(close);
        tuple = 0;
      } else {
        if (tokens.text === ')' && tuple > 0) {
          if (width >= 0 && tuple !== width) throw tokens.fail('bad_tuple', `${width} numbers in each tuple, as in the first`);
          width = tuple;
        }
        tuple = 0;
        open.pop();
      }
    } else if (tokens.kind === 'number') {
      if (numbers.length >= MOST_NUMBERS) throw tokens.fail('too_large', `at most ${MOST_NUMBERS} numbers in an array`);
      numbers.push(tokens.number);
      tuple++;
    } else if (tokens.kind === 'word' && (tokens.text === 'true' || tokens.text === 'false')) numbers.push(tokens.text === 'true' ? 1 : 0);
    else texts.push(tokens.text);
    tokens.next();
  } while (open.length > 0);
  return texts.length > 0 && numbers.length === 0 ? texts : numbers.take();
}

/** Steps over brackets and all that is in them. Errors: bad_syntax. */
export function skipBrackets(tokens: UsdTokens): void {
  const at = tokens.start;
  const open: string[] = [];
  do {
    if (tokens.kind === 'end') throw tokens.fail('bad_syntax', 'a bracket that is closed again', at);
    const close = tokens.kind === 'mark' ? OPENS.get(tokens.text) : undefined;
    if (close) open.push(close);
    else if (tokens.kind === 'mark' && CLOSES.has(tokens.text)) {
      if (open.at(-1) !== tokens.text) throw tokens.fail('bad_syntax', `"${open.at(-1)}"`);
      open.pop();
    }
    tokens.next();
  } while (open.length > 0);
}

/** What was authored in a `( … )` of metadata, by key; what is no plain value is its text, as a list of one. Errors: bad_syntax. */
export function readUsdMetadata(tokens: UsdTokens): Map<string, UsdValue | null> {
  const found = new Map<string, UsdValue | null>();
  tokens.take('(');
  while (!tokens.isMark(')')) {
    if (tokens.kind === 'string') {
      tokens.next();
      continue;
    }
    if (tokens.kind !== 'word') throw tokens.fail('bad_syntax', 'a key or ")"');
    let key = tokens.text;
    tokens.next();
    // A list operation such as `prepend references` comes before the key.
    if (tokens.kind === 'word') {
      key = tokens.text;
      tokens.next();
    }
    tokens.take('=');
    found.set(key, readMetadataValue(tokens));
  }
  tokens.next();
  return found;
}

function readMetadataValue(tokens: UsdTokens): UsdValue | null {
  const first = tokens.start;
  if (tokens.kind === 'mark' && OPENS.has(tokens.text)) skipBrackets(tokens);
  else if (tokens.kind === 'asset' || tokens.kind === 'path') {
    // A reference may name a prim and an offset behind the layer.
    const isAsset = tokens.kind === 'asset';
    tokens.next();
    if (isAsset && tokens.kind === 'path') tokens.next();
    if (tokens.isMark('(')) skipBrackets(tokens);
  } else return readUsdValue(tokens);
  return [tokens.source.slice(first, Math.min(tokens.start, first + RAW_KEPT))];
}
