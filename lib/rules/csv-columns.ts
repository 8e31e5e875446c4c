/** A column of the standard export. `unit` is null for text and for plain numbers; `kind` tells how a cell is written and guarded. */
export interface CsvColumn {
  name: string;
  unit: 'kg/m³' | 'kg/m²' | 'm' | 'kg' | 'm²' | 'm³' | 'kg·m²' | null;
  kind: 'text' | 'number';
  about: string;
}

/** Version of the header below: columns are only ever added, at the end. */
export const CSV_SCHEMA = 'weighhouse-1';

/** The standard columns in their order. Values are SI; an empty cell means not given. */
export const CSV_COLUMNS = [
  { name: 'schema', unit: null, kind: 'text', about: 'Version of this list of columns.' },
  { name: 'show', unit: null, kind: 'text', about: 'Code of the show.' },
  { name: 'sequence', unit: null, kind: 'text', about: 'Code of the sequence; only in a shot export.' },
  { name: 'shot', unit: null, kind: 'text', about: 'Code of the shot; only in a shot export.' },
  { name: 'copy', unit: null, kind: 'text', about: 'Tells two of one asset in a shot apart; usually empty.' },
  { name: 'asset', unit: null, kind: 'text', about: 'Code of the asset.' },
  { name: 'outside_id', unit: null, kind: 'text', about: 'Id of the asset in the studio’s own systems.' },
  { name: 'category', unit: null, kind: 'text', about: 'creature, prop, costume, set, vehicle or other.' },
  { name: 'version', unit: null, kind: 'text', about: 'Version of the asset, with its take if there are several.' },
  { name: 'row', unit: null, kind: 'text', about: 'part, body or added.' },
  { name: 'part', unit: null, kind: 'text', about: 'Name of the part; empty for a body.' },
  { name: 'body', unit: null, kind: 'text', about: 'Name of the rigid body; for a part, the body it belongs to.' },
  { name: 'joint', unit: null, kind: 'text', about: 'Joint of the rigid body.' },
  { name: 'variant', unit: null, kind: 'text', about: 'Variant of the mass, such as dry or wet.' },
  { name: 'scale', unit: null, kind: 'number', about: 'Scale of the asset: acts on its geometry, not on density or wall.' },
  { name: 'construction', unit: null, kind: 'text', about: 'solid, hollow or sheet.' },
  { name: 'material', unit: null, kind: 'text', about: 'Name of the material.' },
  { name: 'density_kg_m3', unit: 'kg/m³', kind: 'number', about: 'Density used; follows from the target mass where one is set.' },
  { name: 'areal_density_kg_m2', unit: 'kg/m²', kind: 'number', about: 'Weight per area of a sheet.' },
  { name: 'wall_m', unit: 'm', kind: 'number', about: 'Wall thickness of a hollow part.' },
  { name: 'target_mass_kg', unit: 'kg', kind: 'number', about: 'Mass that was asked for.' },
  { name: 'area_m2', unit: 'm²', kind: 'number', about: 'Area of the limit surface.' },
  { name: 'volume_m3', unit: 'm³', kind: 'number', about: 'Volume inside the limit surface.' },
  { name: 'mass_kg', unit: 'kg', kind: 'number', about: 'Mass.' },
  { name: 'com_x_m', unit: 'm', kind: 'number', about: 'Centre of mass in the axes and about the origin that space names.' },
  { name: 'com_y_m', unit: 'm', kind: 'number', about: 'Centre of mass, y.' },
  { name: 'com_z_m', unit: 'm', kind: 'number', about: 'Centre of mass, z.' },
  { name: 'ixx_kg_m2', unit: 'kg·m²', kind: 'number', about: 'Inertia matrix about the centre of mass, ∫ρ(y² + z²)dV.' },
  { name: 'iyy_kg_m2', unit: 'kg·m²', kind: 'number', about: 'Inertia matrix, ∫ρ(x² + z²)dV.' },
  { name: 'izz_kg_m2', unit: 'kg·m²', kind: 'number', about: 'Inertia matrix, ∫ρ(x² + y²)dV.' },
  { name: 'ixy_kg_m2', unit: 'kg·m²', kind: 'number', about: 'Matrix entry −∫ρxy dV.' },
  { name: 'ixz_kg_m2', unit: 'kg·m²', kind: 'number', about: 'Matrix entry −∫ρxz dV.' },
  { name: 'iyz_kg_m2', unit: 'kg·m²', kind: 'number', about: 'Matrix entry −∫ρyz dV.' },
  { name: 'i1_kg_m2', unit: 'kg·m²', kind: 'number', about: 'Smallest principal moment.' },
  { name: 'i2_kg_m2', unit: 'kg·m²', kind: 'number', about: 'Middle principal moment.' },
  { name: 'i3_kg_m2', unit: 'kg·m²', kind: 'number', about: 'Largest principal moment.' },
  { name: 'axes_quat_w', unit: null, kind: 'number', about: 'Unit quaternion that turns principal axes into the axes of space, w ≥ 0.' },
  { name: 'axes_quat_x', unit: null, kind: 'number', about: 'Quaternion, x.' },
  { name: 'axes_quat_y', unit: null, kind: 'number', about: 'Quaternion, y.' },
  { name: 'axes_quat_z', unit: null, kind: 'number', about: 'Quaternion, z.' },
  { name: 'free_axes', unit: null, kind: 'text', about: 'Axes that equal moments leave free: empty, 12, 23 or 123.' },
  { name: 'space', unit: null, kind: 'text', about: 'The asset or joint whose axes and origin the numbers use.' },
  { name: 'up_axis', unit: null, kind: 'text', about: 'y or z.' },
  { name: 'numeric_error', unit: null, kind: 'number', about: 'Estimated relative error of the integration alone; coordinates and density are taken as exact.' },
  { name: 'adjusted', unit: null, kind: 'text', about: 'What a floor of the consumer profile moved.' },
  { name: 'warnings', unit: null, kind: 'text', about: 'Codes of warnings, joined by blanks.' },
  { name: 'state', unit: null, kind: 'text', about: 'unset, blocked, measured, approved, outdated, left_out or locked.' },
  { name: 'reason', unit: null, kind: 'text', about: 'Reason of a shot override.' },
  { name: 'locked_at', unit: null, kind: 'text', about: 'When the value was locked for the shot (ISO 8601, UTC).' },
  { name: 'part_id', unit: null, kind: 'text', about: 'Stable id of the part, body or added mass.' },
  { name: 'value_id', unit: null, kind: 'text', about: 'Id of the approved value.' },
  { name: 'value_sha256', unit: null, kind: 'text', about: 'Hash of everything that the value follows from.' },
] as const satisfies readonly CsvColumn[];
