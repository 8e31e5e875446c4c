/** Warnings of formats by which something of the asset may be missing from the cage, so that its numbers deserve a look before they are approved. */
export const LOSSY_CODES: ReadonlySet<string> = new Set(['not_composed', 'variants_ignored', 'layers_ignored', 'instances_ignored', 'not_polygons']);
