/** Lines that one message holds at most. */
const MOST_LINES = 25;

/** The first lines of a long list, and how many there are more. */
export function cutList(lines: readonly string[]): string[] {
  if (lines.length <= MOST_LINES) return [...lines];
  return [...lines.slice(0, MOST_LINES), `and ${lines.length - MOST_LINES} more`];
}

/** `fer_0010`, `fer_0010 and fer_0020`, `fer_0010, fer_0020 and 3 more`. */
export function shortList(names: readonly string[]): string {
  const [first, second, ...rest] = [...new Set(names)];
  if (second === undefined) return first ?? '';
  if (rest.length === 0) return `${first} and ${second}`;
  return rest.length === 1 ? `${first}, ${second} and ${rest[0]}` : `${first}, ${second} and ${rest.length} more`;
}

/** `1 value`, `3 values`. */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count.toLocaleString('en')} ${count === 1 ? one : many}`;
}
