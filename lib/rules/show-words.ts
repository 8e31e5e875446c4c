import type { BoundaryWord, PartitionWord, SchemeWord } from './measure-words';
import type { Role } from './roles';
import type { LinearUnit, OtherSpace, UpAxis } from './units';

/** The words of a show's choices, for forms. */
export const UNIT_NAMES: Record<LinearUnit, string> = { mm: 'millimetre', cm: 'centimetre', dm: 'decimetre', m: 'metre', in: 'inch', ft: 'foot' };

export const UP_AXIS_NAMES: Record<UpAxis, string> = { y: 'Y up', z: 'Z up' };

/** What becomes of a file that states another unit or up axis than the show's. */
export const OTHER_SPACE_NAMES: Record<OtherSpace, string> = { convert: 'Converted, and shown', refuse: 'Refused' };

export const SCHEME_NAMES: Record<SchemeWord, string> = {
  'catmull-clark': 'Catmull-Clark',
  loop: 'Loop',
  'doo-sabin': 'Doo-Sabin',
  polyhedral: 'None: the cage as it is',
};

export const BOUNDARY_NAMES: Record<BoundaryWord, string> = {
  'edge-and-corner': 'Sharp edges and corners',
  'edge-only': 'Sharp edges, round corners',
};

export const PARTITION_NAMES: Record<PartitionWord, string> = {
  group: 'Group',
  object: 'Object',
  material: 'Material',
  piece: 'Connected piece',
  joint: 'Joint',
  whole: 'The whole file',
};

/** What each role may do, in a sentence beside the choice. */
export const ROLE_SENTENCES: Record<Role, string> = {
  lead: 'Settings and people of the show, and all that a character TD may.',
  td: 'Imports cages, sets masses and construction.',
  artist: 'Reads everything and exports.',
  guest: 'Reads and exports what is locked in the shots or assets named here, nothing else.',
};
