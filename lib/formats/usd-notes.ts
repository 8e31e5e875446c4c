import type { FormatWarning } from '../engine/cage';
import { fileNote } from './bare-cage';

const PATHS_NAMED = 3;
const MOST_PATH = 200;

interface Kind {
  code: string;
  say: (whom: string) => string;
  paths: string[];
  count: number;
}

/** What a scene passes over, one warning a kind, with the first paths of each and how many there are. */
export class UsdNotes {
  private readonly kinds = new Map<string, Kind>();

  /** @param say the sentence, given the paths in words */
  add(code: string, path: string, say: (whom: string) => string, kind = code): void {
    const known = this.kinds.get(kind) ?? { code, say, paths: [], count: 0 };
    known.count++;
    if (known.paths.length < PATHS_NAMED) known.paths.push(path.slice(0, MOST_PATH));
    this.kinds.set(kind, known);
  }

  list(): FormatWarning[] {
    return [...this.kinds.values()].map(({ code, say, paths, count }) => fileNote(code, say(inWords(paths, count))));
  }

  /** The first warning of these codes; null where there is none. */
  find(codes: ReadonlySet<string>): FormatWarning | null {
    return this.list().find((note) => codes.has(note.code)) ?? null;
  }
}

function inWords(paths: readonly string[], count: number): string {
  const more = count - paths.length;
  const named = more > 0 ? paths : paths.slice(0, -1);
  const last = more > 0 ? `${more} other${more === 1 ? '' : 's'}` : paths.at(-1)!;
  return named.length === 0 ? last : `${named.join(', ')} and ${last}`;
}
