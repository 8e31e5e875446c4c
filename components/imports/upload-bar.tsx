import type { Upload } from '@/hooks/use-import-uploads';
import { byteWords } from '@/lib/rules/byte-words';

/** How far one file is on its way up. */
export function UploadBar({ upload, bytes }: { upload: Upload; bytes: number }) {
  if (upload.state === 'failed') return <p className="truncate text-13 text-wrong" title={upload.error ?? undefined}>Not sent. {upload.error}</p>;
  if (upload.state === 'sent') return <p className="text-13 text-ink-2">sent</p>;
  if (upload.state === 'checking') return <p className="text-13 text-ink-2">being read</p>;
  const share = bytes === 0 ? 1 : Math.min(1, upload.sentBytes / bytes);
  return (
    <div className="flex items-center gap-2 text-12 text-ink-2">
      <div aria-hidden className="h-1 w-24 bg-rule">
        <div className={upload.state === 'waiting' ? 'h-full bg-ink-3' : 'h-full bg-brass'} style={{ width: `${share * 100}%` }} />
      </div>
      {byteWords(upload.sentBytes)}
      {upload.state === 'waiting' ? <span className="truncate">no connection, waiting</span> : null}
    </div>
  );
}
