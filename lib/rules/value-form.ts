import { parseMassEntry } from './parse-mass-entry';
import type { PartRow } from './part-row';
import type { Construction, MassSource } from './states';
import { METRES_PER, type LinearUnit } from './units';
import { changeOf, shareByVolume, type ValueChange } from './value-change';

/** What the form of values holds while it is filled in; texts as typed. */
export interface ValueForm {
  source: MassSource | 'as_it_is' | 'none';
  amount: string;
  material: string | null;
  /** A target mass of several parts: the same on each, or one mass shared by volume. */
  shared: boolean;
  construction: Construction | 'as_it_is';
  wall: string;
}

export type FormReading =
  { ok: true; changes: ValueChange[] } | { ok: false; field: 'amount' | 'material' | 'wall'; message: string };

const BARE_UNIT: Record<MassSource, string> = {
  target_mass: 'kg',
  density: 'kg/m3',
  areal_density: 'kg/m2',
  material: 'kg',
};

const WANTED: Record<MassSource, string> = {
  target_mass: 'Type a mass, such as 640 kg or 85 g.',
  density: 'Type a density, such as 7.85 g/cm3 or 1000 kg/m3.',
  areal_density: 'Type a weight per area, such as 300 g/m2.',
  material: 'Choose a material.',
};

/** The form as it starts for these rows: what they have in common stands in it. */
export function startForm(rows: readonly PartRow[], unit: LinearUnit): ValueForm {
  const common = <K extends keyof PartRow>(key: K): PartRow[K] | undefined =>
    rows.every((row) => row[key] === rows[0]?.[key]) ? rows[0]?.[key] : undefined;
  const source = common('mass_source') ?? 'target_mass';
  const amounts: Record<MassSource, number | null | undefined> = {
    target_mass: common('target_mass_kg'),
    density: common('density_kg_m3'),
    areal_density: common('areal_density_kg_m2'),
    material: null,
  };
  const wall = common('wall_m');
  return {
    source,
    amount: amounts[source] == null ? '' : String(amounts[source]),
    material: common('material') ?? null,
    shared: false,
    construction: common('construction') ?? 'as_it_is',
    wall: wall == null ? '' : String(wall / METRES_PER[unit]),
  };
}

/** Reads the form into one change for each row, in the rows' order. */
export function readForm(form: ValueForm, rows: readonly PartRow[], unit: LinearUnit): FormReading {
  const wall = readWall(form.wall, unit);
  if (wall === undefined)
    return { ok: false, field: 'wall', message: `Type the thickness in ${unit}, more than zero.` };
  const around: ValueChange = {
    ...(form.construction === 'as_it_is' ? {} : { construction: form.construction }),
    ...(form.construction === 'hollow' || form.construction === 'sheet' ? { wall_m: wall } : {}),
  };
  if (form.source === 'as_it_is') return { ok: true, changes: rows.map(() => around) };
  if (form.source === 'none') {
    const cleared = { target_mass_kg: null, density_kg_m3: null, material: null, areal_density_kg_m2: null };
    return { ok: true, changes: rows.map(() => ({ ...around, ...cleared })) };
  }
  if (form.source === 'material') {
    if (form.material === null) return { ok: false, field: 'material', message: WANTED.material };
    const change = changeOf({ kind: 'material', name: form.material });
    return { ok: true, changes: rows.map(() => ({ ...around, ...change })) };
  }
  const parsed = parseMassEntry(form.amount, [], BARE_UNIT[form.source]);
  if (!parsed.ok)
    return { ok: false, field: 'amount', message: form.amount.trim() === '' ? WANTED[form.source] : parsed.message };
  const { entry } = parsed;
  if (entry.kind !== form.source) return { ok: false, field: 'amount', message: WANTED[form.source] };
  if (entry.kind === 'target_mass' && form.shared && rows.length > 1) {
    const shares = shareByVolume(rows, entry.massKg);
    if (shares === null)
      return {
        ok: false,
        field: 'amount',
        message: 'One of the parts has no volume, so the mass cannot be shared by it.',
      };
    return { ok: true, changes: shares.map((share) => ({ ...around, target_mass_kg: share })) };
  }
  return { ok: true, changes: rows.map(() => ({ ...around, ...changeOf(entry) })) };
}

/** Metres; null for an empty field, undefined for what is no thickness. */
function readWall(text: string, unit: LinearUnit): number | null | undefined {
  if (text.trim() === '') return null;
  const amount = Number(text);
  return Number.isFinite(amount) && amount > 0 ? amount * METRES_PER[unit] : undefined;
}
