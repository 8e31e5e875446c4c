/** A file inside what was dropped: when room is short the folders give way, since the name carries the version. */
export function FilePath({ path }: { path: string }) {
  const slash = path.lastIndexOf('/') + 1;
  return (
    <p className="flex min-w-0 font-mono text-13" title={path}>
      <span className="min-w-0 truncate text-ink-3">{path.slice(0, slash)}</span>
      <span className="max-w-full shrink-0 truncate">{path.slice(slash)}</span>
    </p>
  );
}
