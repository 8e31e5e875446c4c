interface Compared {
  asset: string;
  part?: string | null;
  /** What stands before and after: a version's label, `approved` or `current`. */
  a?: string;
  b?: string;
  /** Of an override: its shot. */
  shot?: string | null;
}

/** Address of the page that compares two values of a part, or of an asset's parts together. */
export function compareHref(show: string, { asset, part, a, b, shot }: Compared): string {
  const query = new URLSearchParams(Object.entries({ asset, part, a, b, shot }).flatMap(([name, value]) => (value ? [[name, value]] : [])));
  return `/shows/${encodeURIComponent(show)}/compare?${query}`;
}
