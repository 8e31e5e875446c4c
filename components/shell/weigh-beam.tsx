import { HORN_CAGE, balanceOf, cagePath, limitPath } from './horn-outline';

const { centre, height, gyration, from, to } = balanceOf(HORN_CAGE);
/** Of the cage's own zero above the beam. */
const LIFT = -88;
const TICKS = Array.from({ length: 49 }, (_, index) => index);

function tickPath(): string {
  const step = (to - from) / (TICKS.length - 1);
  return TICKS.map((index) => `M${(from + index * step).toFixed(2)} 0v${index % 6 === 0 ? 10 : 5}`).join('');
}

/**
 * A horn in its cage on a weigh-house's beam, the fulcrum under its centre of mass. Let go once, the beam settles level,
 * since the fulcrum stands where the limit curve's area balances.
 */
export function WeighBeam({ className }: { className?: string }) {
  return (
    <svg viewBox="-30 -330 560 430" aria-hidden fill="none" className={className}>
      <path d={`M${centre} 12 ${centre + 22} 74H${centre - 22}Z`} fill="var(--brass)" />
      <path d={`M${centre - 96} 74H${centre + 96}`} stroke="var(--edge)" />
      <path d={`M${centre - 96} 74v6M${centre + 96} 74v6`} stroke="var(--edge)" />
      <g
        className="animate-[beam-settle_3.4s_ease-in-out]"
        style={{ transformOrigin: `${centre}px 12px`, transformBox: 'view-box' }}
      >
        <g transform={`translate(0 ${LIFT})`}>
          <path d={cagePath(HORN_CAGE)} stroke="var(--edge)" strokeDasharray="3 4" />
          {HORN_CAGE.map(([x, y]) => (
            <rect
              key={`${x} ${y}`}
              x={x - 2}
              y={y - 2}
              width="4"
              height="4"
              fill="var(--ground)"
              stroke="var(--edge)"
            />
          ))}
          <path
            d={limitPath(HORN_CAGE)}
            stroke="var(--ink)"
            strokeWidth="1.5"
            fill="color-mix(in srgb, var(--ink) 5%, transparent)"
          />
        </g>
        <path d={`M${from} 8H${to}M${from} -2V18M${to} -2V18`} stroke="var(--ink)" strokeWidth="2" />
        <path d={tickPath()} transform="translate(0 9)" stroke="var(--edge)" />
        <path d={`M${centre - gyration} -292v-10H${centre + gyration}v10`} stroke="var(--ink-3)" />
        <circle cx={centre} cy={LIFT + height} r="3.5" fill="var(--brass)" />
      </g>
    </svg>
  );
}
