import type { LinearUnit, UpAxis } from './units';

/** What a screen needs to know of its show to write numbers and offer acts. */
export interface ShowFrame {
  code: string;
  title: string;
  linear_unit: LinearUnit;
  up_axis: UpAxis;
  /** Whether the reader may set masses and construction here. */
  may_set: boolean;
  /** Whether the reader may ask for approvals here, and whether they may give them. */
  may_ask: boolean;
  may_approve: boolean;
  /** Whether the reader may import cages here. */
  may_import: boolean;
}

/** A material to choose: solid density in kg/m³ or weight per area in kg/m², one of the two. */
export interface MaterialOption {
  name: string;
  category: string;
  density_kg_m3: number | null;
  areal_density_kg_m2: number | null;
}
