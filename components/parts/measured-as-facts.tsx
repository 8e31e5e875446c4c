import type { PartDetail } from '@/lib/rules/part-detail';
import { formatFixed } from '@/lib/rules/format-figure';

/** The options that the cage was measured with, and the file they were applied to. */
export function MeasuredAsFacts({ detail }: { detail: PartDetail }) {
  const { measured_as: as } = detail;
  const facts: readonly (readonly [string, string])[] = [
    ['Scheme', as.scheme],
    ['Boundary', as.boundary],
    ['Creases', as.creasing],
    ['Parts by', as.parts_by],
    ['Mended before measuring', [as.weld ? 'borders welded' : '', as.turn_faces ? 'faces turned outwards' : ''].filter(Boolean).join(', ') || 'no'],
    ['Caps, share of area', `${formatFixed(detail.cap_area_share * 100, 3)} %`],
    ['Caps, share of volume', `${formatFixed(detail.cap_volume_share * 100, 3)} %`],
    ['Engine', as.engine_version],
    ['File, SHA-256', as.content_sha256],
  ];
  return (
    <dl className="grid grid-cols-[12rem_minmax(0,1fr)] gap-y-1 text-13 max-sm:grid-cols-1">
      {facts.map(([label, value]) => (
        <div key={label} className="contents">
          <dt className="text-ink-2">{label}</dt>
          <dd className="font-mono break-all">{value}</dd>
        </div>
      ))}
    </dl>
  );
}
