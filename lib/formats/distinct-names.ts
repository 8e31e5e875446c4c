/** The names with " 2", " 3" … behind those that came before, so that no two things fall into one part; empty ones become `fallback` and their number. */
export function distinctNames(names: readonly string[], fallback: string): string[] {
  const taken = new Set<string>();
  const last = new Map<string, number>();
  return names.map((name, i) => {
    const base = name.trim() === '' ? `${fallback} ${i + 1}` : name.trim();
    let distinct = base;
    let n = last.get(base) ?? 1;
    // Goes on from the last number given, so that thousands of equal names are no work.
    while (taken.has(distinct)) distinct = `${base} ${++n}`;
    last.set(base, n);
    taken.add(distinct);
    return distinct;
  });
}

/** For paths such as `ox/geo/body`: the last piece where no other path ends in it, else the whole path. */
export function shortNames(paths: readonly string[]): string[] {
  const last = (path: string) => path.slice(path.lastIndexOf('/') + 1);
  const uses = new Map<string, number>();
  for (const path of paths) uses.set(last(path), (uses.get(last(path)) ?? 0) + 1);
  return paths.map((path) => (uses.get(last(path)) === 1 ? last(path) : path));
}
