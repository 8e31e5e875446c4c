/** Whether an If-None-Match header names the tag (a strong one, without its quotes): then the caller has these bytes. */
export function matchesEtag(header: string | null, tag: string): boolean {
  if (header === null) return false;
  return header.split(',').some((one) => {
    const text = one.trim();
    return text === '*' || text.replace(/^W\//, '') === `"${tag}"`;
  });
}
