import { CageDraft } from './cage-draft';
import { turnSolid, type TurnStation } from './solids';

const SIDES = 64;
/** Quads that close both ends of a turned solid of 64 sides: two grids of 16 × 16. */
const CAP_QUADS = 512;

/** A waisted column of about so many quads (at least some 600), for measuring how long an import takes. `seed` makes files that differ. */
export function largeCage(faces: number, seed = 0): string {
  const rings = Math.max(2, Math.round((faces - CAP_QUADS) / SIDES) + 1);
  const profile = Array.from({ length: rings }, (_, i): TurnStation => {
    const t = i / (rings - 1);
    return { radius: 40 + 9 * Math.sin(11 * t + seed) + 3 * Math.cos(37 * t), along: 240 * t };
  });
  const draft = new CageDraft();
  turnSolid(draft, 'column', profile, { origin: [0, 0, 0], axis: [0, 1, 0], sides: SIDES });
  return draft.toObj(`column_${seed}`);
}
