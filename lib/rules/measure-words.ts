/**
 * How a cage may be measured, as words of API, forms and database. The engine has the same lists in its own room
 * (neither room may look into the other); a test holds the two equal.
 */
export const SCHEME_WORDS = ['catmull-clark', 'loop', 'doo-sabin', 'polyhedral'] as const;
export type SchemeWord = (typeof SCHEME_WORDS)[number];

export const BOUNDARY_WORDS = ['edge-and-corner', 'edge-only'] as const;
export type BoundaryWord = (typeof BOUNDARY_WORDS)[number];

export const TRIANGLE_WORDS = ['catmark', 'smooth'] as const;
export const CREASING_WORDS = ['uniform', 'chaikin'] as const;

export const PARTITION_WORDS = ['group', 'object', 'material', 'piece', 'joint', 'whole'] as const;
export type PartitionWord = (typeof PARTITION_WORDS)[number];
