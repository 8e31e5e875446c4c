import { cn } from '@/components/ui/cn';

const PERSON_M = 1.8;
const HEIGHT = 34;
const WIDTH = 92;
const BASE = HEIGHT - 1.5;

interface SizeFigureProps {
  /** Box of the whole asset in its own axes, metres. */
  size: readonly [number, number, number];
  upAxis: 'y' | 'z';
  /** The size does not look right. */
  wrong: boolean;
}

/** Height and width of the box as it stands, metres. */
export function standingBox(size: readonly [number, number, number], upAxis: 'y' | 'z'): { height: number; width: number } {
  return upAxis === 'y' ? { height: size[1], width: Math.max(size[0], size[2]) } : { height: size[2], width: Math.max(size[0], size[1]) };
}

const metres = (value: number): string => Number(value.toPrecision(value < 1 ? 2 : 3)).toString();

/** An asset's box beside a figure 1.8 m tall, both to one scale: a unit that slipped is seen at a glance. */
export function SizeFigure({ size, upAxis, wrong }: SizeFigureProps) {
  const { height, width } = standingBox(size, upAxis);
  const room = WIDTH - 4;
  // The person takes 0.5 m of ground beside the box; whichever of height and width is tighter sets the scale.
  const scale = Math.min((HEIGHT - 3) / Math.max(PERSON_M, height), room / (width + 0.9));
  const tall = PERSON_M * scale;
  const box = { height: Math.max(1, height * scale), width: Math.max(1, width * scale) };
  const at = 0.25 * scale + 2;
  const left = at + 0.45 * scale + 3;
  return (
    <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} width={WIDTH} height={HEIGHT} role="img" aria-label={`${metres(height)} m high and ${metres(width)} m wide, beside a figure of 1.8 m`} className={cn('shrink-0', wrong ? 'text-wrong' : 'text-ink-2')}>
      <path d={`M0 ${BASE}H${WIDTH}`} stroke="var(--rule-strong)" />
      <g fill="var(--ink-3)" stroke="none">
        <circle cx={at} cy={BASE - tall * 0.92} r={tall * 0.075} />
        <path d={personPath(at, tall)} />
      </g>
      <rect x={left} y={BASE - box.height} width={box.width} height={box.height} fill="none" stroke="currentColor" strokeWidth={wrong ? 2 : 1.25} />
    </svg>
  );
}

/** Trunk and legs below the head, as one outline; `tall` in the drawing's unit. */
function personPath(x: number, tall: number): string {
  const [shoulder, hip, foot] = [0.13 * tall, 0.085 * tall, 0.07 * tall];
  return `M${x - shoulder} ${BASE - tall * 0.8}H${x + shoulder}L${x + hip} ${BASE - tall * 0.45}L${x + foot} ${BASE}H${x + foot * 0.25}L${x} ${BASE - tall * 0.42}L${x - foot * 0.25} ${BASE}H${x - foot}L${x - hip} ${BASE - tall * 0.45}Z`;
}
