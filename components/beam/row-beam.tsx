import { beamGeometry, longestAxis } from '@/lib/rules/beam-geometry';
import { describeBeam } from '@/lib/rules/describe-beam';
import type { AssetTotal, PartRow } from '@/lib/rules/part-row';
import type { LinearUnit } from '@/lib/rules/units';
import { Beam } from './beam';

type Weighed = Pick<
  PartRow | AssetTotal,
  'bounds_m' | 'mass_kg' | 'com_x_m' | 'com_y_m' | 'com_z_m' | 'ixx_kg_m2' | 'iyy_kg_m2' | 'izz_kg_m2' | 'state'
>;

interface RowBeamProps {
  of: Weighed;
  unit: LinearUnit;
  /** Longest box edge among the asset's parts, metres; without it the beam takes its full length. */
  largest?: number;
  partner?: Weighed | null;
  /** Centre of mass of the approved value, metres. */
  approved?: readonly [number, number, number] | null;
}

function centreOf(of: Weighed): [number, number, number] | null {
  return of.com_x_m === null || of.com_y_m === null || of.com_z_m === null
    ? null
    : [of.com_x_m, of.com_y_m, of.com_z_m];
}

function inertiaOf(of: Weighed): [number, number, number] | null {
  return of.ixx_kg_m2 === null || of.iyy_kg_m2 === null || of.izz_kg_m2 === null
    ? null
    : [of.ixx_kg_m2, of.iyy_kg_m2, of.izz_kg_m2];
}

/** The beam of a row or of an asset's total; nothing without a box. */
export function RowBeam({ of, unit, largest, partner = null, approved = null }: RowBeamProps) {
  if (of.bounds_m === null) return null;
  const geometry = beamGeometry({
    bounds: of.bounds_m,
    centre: centreOf(of),
    mass: of.mass_kg,
    inertia: inertiaOf(of),
    largest: largest ?? longestAxis(of.bounds_m).extent,
    partner: partner === null ? null : centreOf(partner),
    approved,
  });
  return (
    <Beam
      geometry={geometry}
      label={describeBeam(geometry, unit)}
      blocked={'revision' in of && of.state === 'blocked'}
    />
  );
}
