import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { partCurrent as c } from '@/db/schema/part-current';
import { mergeMassProperties, type MassMember, type MassProperties } from '@/lib/engine/mass-properties';
import type { AssetTotal } from '@/lib/rules/part-row';
import type { ValueState } from '@/lib/rules/states';

type Member = Pick<typeof c.$inferSelect, 'asset' | 'category' | 'version' | 'state' | 'boundsM' | 'volumeM3' | 'massKg'> & {
  comXM: number | null;
  comYM: number | null;
  comZM: number | null;
  ixxKgM2: number | null;
  iyyKgM2: number | null;
  izzKgM2: number | null;
  ixyKgM2: number | null;
  ixzKgM2: number | null;
  iyzKgM2: number | null;
};

/** Totals of the named assets over their parts, in the order of the codes. The caller has checked that they may be seen. */
export async function assetTotals(db: Executor, assetIds: readonly string[]): Promise<AssetTotal[]> {
  if (assetIds.length === 0) return [];
  const rows = await db
    .select({
      asset: c.asset,
      category: c.category,
      version: c.version,
      state: c.state,
      boundsM: c.boundsM,
      volumeM3: c.volumeM3,
      massKg: c.massKg,
      comXM: c.comXM,
      comYM: c.comYM,
      comZM: c.comZM,
      ixxKgM2: c.ixxKgM2,
      iyyKgM2: c.iyyKgM2,
      izzKgM2: c.izzKgM2,
      ixyKgM2: c.ixyKgM2,
      ixzKgM2: c.ixzKgM2,
      iyzKgM2: c.iyzKgM2,
    })
    .from(c)
    .where(sql`${c.assetId} = any(${sql.param(assetIds)}::uuid[])`)
    .orderBy(sql`${c.asset} collate "C", ${c.part} collate "C"`);
  const byAsset = new Map<string, Member[]>();
  for (const row of rows) {
    const list = byAsset.get(row.asset);
    if (list) list.push(row);
    else byAsset.set(row.asset, [row]);
  }
  return [...byAsset.values()].map(totalOf);
}

function totalOf(members: readonly Member[]): AssetTotal {
  const [{ asset, category, version }] = members;
  const counted = members.filter((member) => member.state !== 'left_out');
  const masses = counted.flatMap((member) => toMassMember(member) ?? []);
  const merged = mergeMassProperties(masses);
  const volumes = counted.flatMap((member) => member.volumeM3 ?? []);
  return {
    asset,
    category,
    version,
    parts: members.length,
    without_mass: counted.filter((member) => member.state === 'unset').length,
    blocked: counted.filter((member) => member.state === 'blocked').length,
    volume_m3: volumes.length === 0 ? null : volumes.reduce((sum, volume) => sum + volume, 0),
    ...massFields(merged.ok ? merged : null),
    bounds_m: unionOf(counted),
    state: stateOf(members),
  };
}

function toMassMember(m: Member): MassMember | null {
  const numbers = [m.massKg, m.comXM, m.comYM, m.comZM, m.ixxKgM2, m.iyyKgM2, m.izzKgM2, m.ixyKgM2, m.ixzKgM2, m.iyzKgM2];
  if (!numbers.every((value) => value !== null)) return null;
  const [massKg, x, y, z, xx, yy, zz, xy, xz, yz] = numbers;
  return { massKg, comM: [x, y, z], inertiaKgM2: [xx, yy, zz, xy, xz, yz] };
}

type MassFields = Omit<AssetTotal, 'asset' | 'category' | 'version' | 'parts' | 'without_mass' | 'blocked' | 'volume_m3' | 'bounds_m' | 'state'>;

function massFields(value: MassProperties | null): MassFields {
  const [x, y, z] = value?.comM ?? [null, null, null];
  const [xx, yy, zz, xy, xz, yz] = value?.inertiaKgM2 ?? [null, null, null, null, null, null];
  const [i1, i2, i3] = value?.principalKgM2 ?? [null, null, null];
  return {
    mass_kg: value?.massKg ?? null,
    com_x_m: x,
    com_y_m: y,
    com_z_m: z,
    ixx_kg_m2: xx,
    iyy_kg_m2: yy,
    izz_kg_m2: zz,
    ixy_kg_m2: xy,
    ixz_kg_m2: xz,
    iyz_kg_m2: yz,
    i1_kg_m2: i1,
    i2_kg_m2: i2,
    i3_kg_m2: i3,
  };
}

function unionOf(members: readonly Member[]): AssetTotal['bounds_m'] {
  const boxes = members.flatMap((member) => (member.boundsM?.length === 6 ? [member.boundsM] : []));
  if (boxes.length === 0) return null;
  const low = (axis: number): number => Math.min(...boxes.map((box) => box[axis]));
  const high = (axis: number): number => Math.max(...boxes.map((box) => box[axis]));
  return [low(0), low(1), low(2), high(3), high(4), high(5)];
}

/** What is most in need of somebody decides: an asset is only as far as its last part. */
function stateOf(members: readonly Member[]): ValueState {
  const order: ValueState[] = ['blocked', 'unset', 'outdated', 'measured', 'approved', 'left_out'];
  return order.find((state) => members.some((member) => member.state === state)) ?? 'left_out';
}
