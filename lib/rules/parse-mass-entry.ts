/** What somebody typed into a mass cell, in SI. */
export type MassEntry =
  | { kind: 'target_mass'; massKg: number }
  | { kind: 'density'; densityKgPerM3: number }
  | { kind: 'areal_density'; arealDensityKgPerM2: number }
  | { kind: 'material'; name: string };

export type ParsedEntry = { ok: true; entry: MassEntry } | { ok: false; message: string };

type Reading = (amount: number) => MassEntry;
const mass =
  (kg: number): Reading =>
  (amount) => ({ kind: 'target_mass', massKg: amount * kg });
const density =
  (perUnit: number): Reading =>
  (amount) => ({ kind: 'density', densityKgPerM3: amount * perUnit });
const areal =
  (perUnit: number): Reading =>
  (amount) => ({ kind: 'areal_density', arealDensityKgPerM2: amount * perUnit });

/** kg in a pound and an ounce are exact by the international agreement of 1959; a foot is 0.3048 m. */
const POUND = 0.45359237;
const OUNCE = POUND / 16;
const CUBIC_FOOT = 0.3048 ** 3;

const READINGS: Readonly<Record<string, Reading>> = {
  kg: mass(1),
  g: mass(0.001),
  mg: mass(1e-6),
  t: mass(1000),
  lb: mass(POUND),
  oz: mass(OUNCE),
  'kg/m3': density(1),
  'g/cm3': density(1000),
  'g/cc': density(1000),
  'kg/l': density(1000),
  'g/l': density(1),
  't/m3': density(1000),
  'lb/ft3': density(POUND / CUBIC_FOOT),
  'kg/m2': areal(1),
  'g/m2': areal(0.001),
};

/** Units that a mass cell takes, for its help. */
const ENTRY_UNITS = Object.keys(READINGS);

function unitKey(text: string): string {
  return text.toLowerCase().replace(/\s|\^/g, '').replace(/²/g, '2').replace(/³/g, '3');
}

/**
 * Reads `640`, `640 kg`, `85 g` as a target mass, `7.85 g/cm3` as a density, `300 g/m2` as a weight per area, and a name of
 * `materials` (upper or lower case) as a material. A bare number is read in `bareUnit`.
 */
export function parseMassEntry(text: string, materials: readonly string[] = [], bareUnit = 'kg'): ParsedEntry {
  const trimmed = text.trim();
  if (trimmed === '') return { ok: false, message: 'Type a mass, a density or a material.' };
  const material = materials.find((name) => name.toLowerCase() === trimmed.toLowerCase());
  if (material !== undefined) return { ok: true, entry: { kind: 'material', name: material } };
  const found = /^([+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?)\s*(.*)$/i.exec(trimmed);
  if (found === null) return { ok: false, message: `No material is named “${trimmed}”.` };
  const amount = Number(found[1]);
  const unit = found[2] === '' ? bareUnit : unitKey(found[2]);
  if (/^,\d/.test(found[2]))
    return { ok: false, message: 'Write the number with a point and without thousands marks.' };
  if (!Object.hasOwn(READINGS, unit))
    return { ok: false, message: `“${found[2]}” is none of ${ENTRY_UNITS.join(', ')}.` };
  if (!(amount > 0) || !Number.isFinite(amount)) return { ok: false, message: 'It must be more than zero.' };
  return { ok: true, entry: READINGS[unit](amount) };
}
