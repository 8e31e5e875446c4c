/** The same PostgreSQL address with another database. */
export function withDatabaseName(url: string, name: string): string {
  const changed = new URL(url);
  changed.pathname = `/${name}`;
  return changed.href;
}
