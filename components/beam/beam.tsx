import { BEAM_BOX, type BeamGeometry } from '@/lib/rules/beam-geometry';

const LINE = 13;
const STOP = 4;

interface BeamProps {
  geometry: BeamGeometry;
  /** The numbers in words; title and accessible name. */
  label: string;
  /** A problem forbids the value: the whole beam is in the colour of wrong. */
  blocked?: boolean;
}

/** Extent, balance and spread of a part at a glance. Places come from beamGeometry. */
export function Beam({ geometry, label, blocked = false }: BeamProps) {
  const { start, end, quarters, bracket, fulcrum, approvedAt, partnerAt, axis } = geometry;
  const line = blocked ? 'var(--wrong)' : 'var(--ink-2)';
  const broken = fulcrum !== null && fulcrum.outside !== 0;
  return (
    <svg
      width={BEAM_BOX.width}
      height={BEAM_BOX.height}
      viewBox={`0 0 ${BEAM_BOX.width} ${BEAM_BOX.height}`}
      role="img"
      aria-label={label}
      fill="none"
      className="block shrink-0"
    >
      <title>{label}</title>
      <text x="0" y={LINE + 4} fontSize="12" fill="var(--ink-3)" className="font-sans">
        {axis}
      </text>
      <path
        d={quarters.map((at) => `M${at} ${LINE - 3}V${LINE + 3}`).join('')}
        stroke="var(--edge)"
        strokeOpacity="0.8"
      />
      {bracket === null ? null : (
        <path d={`M${bracket[0]} ${LINE - 5}V5.5H${bracket[1]}V${LINE - 5}`} stroke="var(--ink-3)" />
      )}
      <path
        d={`M${start} ${LINE}H${end}M${start} ${LINE - STOP}V${LINE + STOP}M${end} ${LINE - STOP}V${LINE + STOP}`}
        stroke={line}
        strokeWidth="1.5"
      />
      {approvedAt === null ? null : (
        <path d={`M${approvedAt} ${LINE + 1}V${LINE + 12}`} stroke="var(--verdigris)" strokeWidth="1.5" />
      )}
      {partnerAt === null ? null : (
        <rect x={partnerAt - 2.5} y={LINE + 4.5} width="5" height="5" stroke="var(--ink-2)" />
      )}
      {broken ? <path d={brokenLine(geometry)} stroke="var(--wrong)" strokeWidth="1.5" /> : null}
      {fulcrum === null ? null : (
        <path d={triangle(fulcrum.at)} fill={broken || blocked ? 'var(--wrong)' : 'var(--brass)'} />
      )}
    </svg>
  );
}

function triangle(at: number): string {
  return `M${at} ${LINE + 1.5}L${at + 4.75} ${LINE + 10}H${at - 4.75}Z`;
}

/** Two short strokes between the end stop and where the fulcrum stands. */
function brokenLine({ start, end, fulcrum }: BeamGeometry): string {
  const [from, way] = fulcrum?.outside === -1 ? [start, -1] : [end, 1];
  return `M${from + 2.5 * way} ${LINE}h${2 * way}M${from + 6.5 * way} ${LINE}h${2 * way}`;
}
