/** Lower-case extension of a path's file name, without the dot; empty when it has none. */
export function extensionOf(path: string): string {
  return /\.([^./\\]+)$/.exec(path)?.[1].toLowerCase() ?? '';
}
