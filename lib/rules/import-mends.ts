/** What mends a finding, a failure or a remark: a title to group by, and the act for whoever made the file. In the order of a note. */
export const MENDS = {
  name: { title: 'Names that say no asset', act: 'Rename the file as the show’s pattern says, or give the asset on the import page.' },
  unit: { title: 'Unit or up axis', act: 'Export the file again in the show’s unit and up axis.' },
  damaged: { title: 'Files that are cut off or not what their name says', act: 'Export the file again and send it again; check that the copy is complete.' },
  content: { title: 'Places that cannot be read', act: 'Mend the named place in the file, or export it again from the source.' },
  format: { title: 'Files that hold no cage that can be read', act: 'Export polygons in one of the formats that the import takes.' },
  archive: { title: 'Archives', act: 'Pack mesh files alone, with plain names, without archives in archives, links or passwords.' },
  size: { title: 'Larger than is taken', act: 'Split the file or reduce it; the message has the limit.' },
  border: { title: 'Open borders', act: 'Close the border, or have the part set as a sheet.' },
  direction: { title: 'Faces turned the wrong way', act: 'Turn the faces outwards, or import again with faces turned outwards.' },
  topology: { title: 'Surfaces that are not sound', act: 'Separate, merge or delete what the message counts, so that every edge has at most two faces.' },
  overlap: { title: 'Parts that run into each other', act: 'Pull the parts apart, or say in the notes that it is meant.' },
  sharpness: { title: 'Sharpness that is not carried', act: 'Set the tags again on edges of the cage, or choose a scheme that knows them.' },
  left_out: { title: 'Left out on reading', act: 'Look whether what was left out belongs to the asset; if so, bake it into the mesh and export again.' },
  version: { title: 'Versions to look at', act: 'Check that the number in the name is the one that was meant.' },
  ours: { title: 'Not the file’s fault', act: 'Nothing to mend in the file: try it again, and give an admin the reference if it stays.' },
  other: { title: 'Others', act: 'Mend it as the message says.' },
} as const;
export type Mend = keyof typeof MENDS;
export const MEND_ORDER = Object.keys(MENDS) as Mend[];

const MEND_OF: Record<string, Mend> = {
  name_not_matched: 'name',
  ...all('unit', 'units_disagree', 'units_differ', 'axis_disagrees', 'bad_unit', 'size_unusual', 'unit_too_small', 'unit_too_large', 'unit_unlike_before', 'unit_unlike_show', 'converted_unit', 'turned_axis'),
  ...all('damaged', 'truncated', 'empty_file', 'bad_magic', 'bad_header', 'bad_packing', 'bad_paths', 'bad_offset', 'missing_section', 'not_text', 'wrong_format', 'bad_json'),
  ...all('content', 'bad_syntax', 'bad_tag', 'bad_number', 'bad_keyword', 'bad_loop', 'bad_name', 'bad_tuple', 'bad_count', 'bad_index', 'bad_vertex_reference', 'vertex_out_of_range', 'joint_out_of_range'),
  ...all('content', 'missing_coordinate', 'missing_value', 'missing_property', 'missing_buffer', 'number_too_large', 'not_finite', 'face_too_small', 'bad_transform', 'bad_gltf', 'reference_circle'),
  ...all('format', 'unknown_format', 'unknown_version', 'no_faces', 'no_meshes', 'compressed'),
  ...all('archive', 'nested_archive', 'bad_archive', 'bomb', 'duplicate', 'encrypted', 'link', 'unsafe_name', 'too_many_entries'),
  ...all('size', 'too_large', 'too_many_faces', 'too_many_corners', 'too_many_names', 'too_many_values', 'too_many_vertices', 'too_complex', 'too_deep', 'line_too_long', 'name_too_long'),
  open_border: 'border',
  ...all('direction', 'inside_out', 'flipped_face', 'one_sided', 'faces_turned'),
  ...all('topology', 'non_manifold_edge', 'non_manifold_vertex', 'duplicate_face', 'degenerate_face', 'near_coincident_vertices', 'isolated_vertex', 'welded', 'not_triangles', 'not_resolved'),
  ...all('overlap', 'overlap', 'overlap_unchecked', 'nested_component'),
  ...all('sharpness', 'crease_without_edge', 'crease_not_carried', 'corner_not_carried'),
  ...all('left_out', 'not_composed', 'variants_ignored', 'layers_ignored', 'instances_ignored', 'not_polygons'),
  ...all('version', 'next_take', 'gap', 'no_number', 'not_current', 'qualified'),
  ...all('ours', 'measuring_failed', 'gave_up', 'numbers_refused', 'storage', 'worker_lost', 'check_failed'),
};

function all(mend: Mend, ...codes: string[]): Record<string, Mend> {
  return Object.fromEntries(codes.map((code) => [code, mend]));
}

/** What mends a code of a finding, a failure or a remark; `other` for one that is not known here. */
export function mendOf(code: string): Mend {
  return Object.hasOwn(MEND_OF, code) ? MEND_OF[code] : 'other';
}
