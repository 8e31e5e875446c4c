/** Name of the canonical form of a value; another form of the text has another name. */
export const VALUE_FORM = 'weighhouse-value-2';

/** The row's numbers in a canonical text, under the names of their columns and in their order; free_axes follows them. */
export const VALUE_FORM_NUMBERS = [
  'density_kg_m3', 'areal_density_kg_m2', 'area_m2', 'volume_m3', 'mass_kg', 'com_x_m', 'com_y_m', 'com_z_m', 'ixx_kg_m2', 'iyy_kg_m2', 'izz_kg_m2',
  'ixy_kg_m2', 'ixz_kg_m2', 'iyz_kg_m2', 'i1_kg_m2', 'i2_kg_m2', 'i3_kg_m2', 'axes_quat_w', 'axes_quat_x', 'axes_quat_y', 'axes_quat_z', 'numeric_error',
] as const;

/** The entries of a canonical text in their order. `from` names the cell of the row, or the field of the call value-inputs. */
export const VALUE_FORM_ENTRIES: readonly { what: string; from: string }[] = [
  { what: `"${VALUE_FORM}", the name of this form`, from: '' },
  { what: 'the geometry record: [SHA-256 of the file, scheme, boundary, triangles, creasing, parts by, engine version]; where more was done to the cage, it comes after it as words joined by blanks: "weld", "turn_faces", "scaled_by_" and the factor from the file’s unit to the show’s, "y-to-z" or "z-to-y" for turned axes, "beside_" and the hash of the files read beside it', from: 'geometry' },
  { what: '[asset, part]', from: 'asset, part' },
  { what: 'metres per unit of the file', from: 'metres_per_unit' },
  { what: 'scale of the asset', from: 'scale' },
  { what: 'construction: "solid", "hollow" or "sheet"', from: 'construction' },
  { what: 'wall thickness, m', from: 'wall_m' },
  { what: 'target mass, kg', from: 'target_mass_kg' },
  { what: 'density as set on the part, kg/m³', from: 'density_set_kg_m3' },
  { what: 'material: [name, revision, density kg/m³, weight per area kg/m²]', from: 'material' },
  { what: 'weight per area as set on the part, kg/m²', from: 'areal_density_set_kg_m2' },
  { what: 'variant', from: 'variant' },
  { what: 'cavities: "signed" (a component that encloses negative volume counts as a cavity)', from: 'cavities' },
  { what: 'up axis: "y" or "z"', from: 'up_axis' },
  { what: `the numbers of the row: [${VALUE_FORM_NUMBERS.join(', ')}, free_axes]; free_axes is text, "" where no axis is free`, from: 'the columns of these names' },
];
