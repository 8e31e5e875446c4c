import type { ReactNode } from 'react';
import { RowBeam } from '@/components/beam/row-beam';
import { StateMark } from '@/components/states/state-mark';
import { ENGINEERING_WIDTHS, Figure } from '@/components/ui/figure';
import type { PartColumn } from '@/hooks/use-part-filters';
import type { AssetNode, PartNode } from '@/lib/rules/arrange-parts';
import type { AssetTotal, PartRow } from '@/lib/rules/part-row';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { VALUE_STATES } from '@/lib/rules/states';
import { METRES_PER } from '@/lib/rules/units';
import { ConstructionCell } from './construction-cell';
import { LocksCell } from './locks-cell';
import { AssetName, PartName } from './name-cell';
import { BlockedCount, ProblemCounts } from './problem-counts';
import { SourceCell } from './source-cell';

export interface ColumnSpec {
  id: PartColumn;
  label: ReactNode;
  /** Spoken name of the column. */
  name: string;
  unit?: (frame: ShowFrame) => string;
  /** Pixels; a column that grows takes what is left over. */
  width: number;
  grows?: boolean;
  /** Figures stand at the right, under the end of their header. */
  figures?: boolean;
  /** Which column gives way first where there is no room; columns without it always stay. */
  givesWay?: number;
  part: (node: PartNode, frame: ShowFrame) => ReactNode;
  asset: (node: AssetNode, frame: ShowFrame) => ReactNode;
  /** What the column is ordered by; undefined stands last. */
  order: (of: PartRow | AssetTotal) => string | number | undefined;
}

type NumberKey = 'mass_kg' | 'com_x_m' | 'com_y_m' | 'com_z_m' | 'i1_kg_m2' | 'i2_kg_m2' | 'i3_kg_m2' | 'volume_m3';

const COORDINATES = { before: 5, after: 5 };

function magnitude(
  id: PartColumn,
  label: ReactNode,
  name: string,
  key: NumberKey,
  rest: Partial<ColumnSpec> & { per?: (frame: ShowFrame) => number },
): ColumnSpec {
  const { per = () => 1, ...spec } = rest;
  const cell = (value: number | null, frame: ShowFrame, bold: boolean) => (
    <Figure
      value={value === null ? null : value / per(frame)}
      notation="engineering"
      align={ENGINEERING_WIDTHS}
      className={bold ? 'font-medium' : undefined}
    />
  );
  return {
    id,
    label,
    name,
    width: 114,
    figures: true,
    part: ({ row }, frame) => cell(row[key], frame, false),
    asset: ({ total }, frame) => cell(total[key], frame, key === 'mass_kg'),
    order: (of) => of[key] ?? undefined,
    ...spec,
  };
}

function coordinate(id: 'x' | 'y' | 'z', key: NumberKey): ColumnSpec {
  const cell = (value: number | null, frame: ShowFrame) => (
    <Figure
      value={value === null ? null : value / METRES_PER[frame.linear_unit]}
      decimals={3}
      align={{ ...COORDINATES, after: 4 }}
    />
  );
  return {
    id,
    label: id,
    name: `Centre of mass ${id}`,
    unit: (frame) => frame.linear_unit,
    width: 84,
    figures: true,
    givesWay: 4,
    part: ({ row }, frame) => cell(row[key], frame),
    asset: ({ total }, frame) => cell(total[key], frame),
    order: (of) => of[key] ?? undefined,
  };
}

function moment(index: 1 | 2 | 3): ColumnSpec {
  const label = (
    <>
      I<sub>{index}</sub>
    </>
  );
  return magnitude(`i${index}`, label, `Principal moment ${index}`, `i${index}_kg_m2`, {
    unit: () => 'kg m²',
    givesWay: 5,
  });
}

const isPart = (of: PartRow | AssetTotal): of is PartRow => 'revision' in of;

export const COLUMN_SPECS: readonly ColumnSpec[] = [
  {
    id: 'name',
    label: 'Asset and part',
    name: 'Asset and part',
    width: 160,
    grows: true,
    part: (node) => <PartName node={node} />,
    asset: (node) => <AssetName node={node} />,
    order: (of) => (isPart(of) ? (of.part ?? of.body ?? '') : of.asset),
  },
  {
    id: 'version',
    label: 'Version',
    name: 'Version',
    width: 72,
    givesWay: 2,
    part: ({ row }) => <span className="font-mono text-13 text-ink-3">{row.version}</span>,
    asset: ({ total }) => <span className="font-mono text-13 text-ink-2">{total.version}</span>,
    order: (of) => of.version,
  },
  {
    id: 'construction',
    label: 'Construction',
    name: 'Construction, wall thickness',
    unit: (frame) => `wall ${frame.linear_unit}`,
    width: 132,
    givesWay: 3,
    part: ({ row }, frame) => <ConstructionCell row={row} unit={frame.linear_unit} />,
    asset: () => null,
    order: (of) => (isPart(of) ? of.construction : undefined),
  },
  {
    id: 'source',
    label: 'Mass from',
    name: 'Mass from',
    width: 110,
    grows: true,
    part: ({ row }) => <SourceCell row={row} />,
    asset: ({ total }) => (
      <span className="text-13 text-ink-3">
        {total.without_mass === 0 ? null : `${total.without_mass.toLocaleString('en')} without mass`}
      </span>
    ),
    order: (of) => (isPart(of) ? (of.material ?? of.mass_source ?? undefined) : undefined),
  },
  magnitude('mass', 'Mass', 'Mass', 'mass_kg', { unit: () => 'kg' }),
  {
    id: 'beam',
    label: 'Balance along longest axis',
    name: 'Balance along longest axis',
    width: 190,
    part: ({ row, largest, partner }, frame) => (
      <RowBeam of={row} unit={frame.linear_unit} largest={largest} partner={partner} />
    ),
    asset: ({ total }, frame) => <RowBeam of={total} unit={frame.linear_unit} />,
    order: () => undefined,
  },
  coordinate('x', 'com_x_m'),
  coordinate('y', 'com_y_m'),
  coordinate('z', 'com_z_m'),
  moment(1),
  moment(2),
  moment(3),
  magnitude('volume', 'Volume', 'Volume', 'volume_m3', {
    unit: (frame) => `${frame.linear_unit}³`,
    per: (frame) => METRES_PER[frame.linear_unit] ** 3,
    givesWay: 1,
  }),
  {
    id: 'problems',
    label: 'Problems',
    name: 'Problems and warnings',
    width: 68,
    part: ({ row }) => <ProblemCounts findings={row.problems} />,
    asset: ({ total }) => <BlockedCount blocked={total.blocked} />,
    order: (of) => (isPart(of) ? problemWeight(of) : -of.blocked * 1000),
  },
  {
    id: 'locks',
    label: 'Locks',
    name: 'Shots that have it locked, and those out of date',
    width: 76,
    part: ({ row }, frame) => (
      <LocksCell show={frame.code} asset={row.asset} lockedIn={row.locked_in} outdatedIn={row.outdated_in} />
    ),
    asset: () => null,
    order: (of) => (isPart(of) && of.locked_in > 0 ? -(of.outdated_in * 1e6 + of.locked_in) : undefined),
  },
  {
    id: 'state',
    label: 'State',
    name: 'State',
    width: 112,
    part: ({ row }) => <StateMark state={row.state} />,
    asset: ({ total }) => <StateMark state={total.state} />,
    order: (of) => (of.state === 'locked' ? -1 : VALUE_STATES.indexOf(of.state)),
  },
];

/** More problems first, then more warnings. */
function problemWeight(row: PartRow): number {
  const count = (severity: string) => row.problems.filter((finding) => finding.severity === severity).length;
  return -(count('problem') * 1000 + count('warning'));
}

/** The columns asked for, in the table's own order; where none are asked for, those that fit. */
export function shownColumns(asked: readonly PartColumn[] | null, width: number): ColumnSpec[] {
  if (asked === null) return fittingColumns(COLUMN_SPECS, width);
  return COLUMN_SPECS.filter((spec) => spec.id === 'name' || asked.includes(spec.id));
}

/** The columns that fit a width: those that give way go one step after another until the rest has room. */
function fittingColumns(specs: readonly ColumnSpec[], width: number): ColumnSpec[] {
  const steps = [...new Set(specs.flatMap((spec) => spec.givesWay ?? []))].sort((a, b) => a - b);
  let kept = [...specs];
  const total = () => kept.reduce((sum, spec) => sum + spec.width, 0);
  for (const step of steps) {
    if (total() <= width) break;
    kept = kept.filter((spec) => spec.givesWay !== step);
  }
  return kept;
}

/** The same tracks for the head and every row. */
export function gridTemplate(specs: readonly ColumnSpec[]): string {
  return specs.map((spec) => (spec.grows ? `minmax(${spec.width}px, 1fr)` : `${spec.width}px`)).join(' ');
}
