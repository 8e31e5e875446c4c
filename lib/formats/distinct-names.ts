/** The names with " 2", " 3" … behind those that came before, so that no two things fall into one part; empty ones become `fallback` and their number. */
export function distinctNames(names: readonly string[], fallback: string): string[] {
  const taken = new Set<string>();
  return names.map((name, i) => {
    const base = name.trim() === '' ? `${fallback} ${i + 1}` : name.trim();
    let distinct = base;
    for (let n = 2; taken.has(distinct); n++) distinct = `${base} ${n}`;
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
