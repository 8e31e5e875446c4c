import { formatFixed } from '@/lib/rules/format-figure';
import type { PartRow } from '@/lib/rules/part-row';
import { METRES_PER, type LinearUnit } from '@/lib/rules/units';
import { Facts, type Fact } from './facts';

/** How far the limit surface's volume lies below (−) or above (+) the cage's, in percent of the cage's. */
export function smoothingPercent(row: PartRow): number | null {
  const { volume_m3: limit, cage_volume_m3: cage } = row;
  return row.construction !== 'solid' || limit === null || cage === null || cage === 0
    ? null
    : (limit / cage - 1) * 100;
}

export function GeometryFacts({ row, unit }: { row: PartRow; unit: LinearUnit }) {
  const metres = METRES_PER[unit];
  const smoothing = smoothingPercent(row);
  const box = row.bounds_m;
  const facts: Fact[] = [
    { label: 'Volume', unit: `${unit}³`, value: row.volume_m3 === null ? null : row.volume_m3 / metres ** 3 },
    { label: 'Area', unit: `${unit}²`, value: row.area_m2 === null ? null : row.area_m2 / metres ** 2 },
    { label: 'Against its cage', unit: '%', value: smoothing, notation: 'fixed', decimals: 2 },
    ...(row.density_kg_m3 === null
      ? []
      : [{ label: 'Density', unit: 'kg/m³', value: row.density_kg_m3, notation: 'fixed' as const }]),
    ...(row.areal_density_kg_m2 === null
      ? []
      : [{ label: 'Weight per area', unit: 'kg/m²', value: row.areal_density_kg_m2, notation: 'fixed' as const }]),
    ...(row.wall_m === null
      ? []
      : [{ label: 'Wall thickness', unit, value: row.wall_m / metres, notation: 'fixed' as const }]),
    {
      label: 'Box',
      unit,
      value: box === null ? null : [0, 1, 2].map((i) => formatFixed((box[i + 3] - box[i]) / metres, 3)).join(' × '),
    },
    { label: 'Faces of the cage', value: row.faces.toLocaleString('en') },
    { label: 'Highest valence', value: String(row.max_valence) },
    { label: 'Error of the integration', value: row.numeric_error },
  ];
  return <Facts facts={facts} />;
}
