const UTF8_BOM = [0xef, 0xbb, 0xbf];

/** What a file's first bytes say about its text: how many to skip, and the decoder label where the text is not one byte per ASCII character. */
export interface TextStart {
  skip: number;
  wide: 'utf-16le' | 'utf-16be' | null;
}

/**
 * Reads a byte order mark, or guesses UTF-16 without one from zero bytes in every other place of the first two characters
 * (mesh files begin with ASCII). Everything else is taken as a superset of ASCII: UTF-8, or Latin-1 in names.
 */
export function detectTextStart(bytes: Uint8Array): TextStart {
  if (UTF8_BOM.every((byte, i) => bytes[i] === byte)) return { skip: 3, wide: null };
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return { skip: 2, wide: 'utf-16le' };
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return { skip: 2, wide: 'utf-16be' };
  if (bytes.length >= 4) {
    if (bytes[0] !== 0 && bytes[1] === 0 && bytes[2] !== 0 && bytes[3] === 0) return { skip: 0, wide: 'utf-16le' };
    if (bytes[0] === 0 && bytes[1] !== 0 && bytes[2] === 0 && bytes[3] !== 0) return { skip: 0, wide: 'utf-16be' };
  }
  return { skip: 0, wide: null };
}

const strictUtf8 = new TextDecoder('utf-8', { fatal: true });
const latin1 = new TextDecoder('windows-1252');

/** Text of some bytes: UTF-8 where they are valid UTF-8, else Latin-1 (old exporters write the machine's code page). */
export function decodeText(bytes: Uint8Array): string {
  try {
    return strictUtf8.decode(bytes);
  } catch {
    return latin1.decode(bytes);
  }
}
