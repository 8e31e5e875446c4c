import type { Cage } from '../cage';
import type { Place } from '../measured';
import { positionOf } from './diagnose';
import { counted, placeOf, type FindingList } from './findings';
import type { Bodies } from './partition';
import type { PieceRelations } from './relate-pieces';
import type { Topology } from './topology';

/** Names of other parts in a sentence at most. */
const NAMES_TOLD = 3;

/** What one part shares with others. */
interface Shared {
  crossing: Place[];
  enclosed: Place[];
  others: Set<string>;
}

/**
 * Warns of what would be weighed twice: bodies whose limit surfaces pass through each other, and bodies of one part that lie wholly inside another
 * part. Both parts are told. A body inside another of its own part is a matter of nesting, not of overlap.
 */
export function diagnoseOverlap(cage: Cage, mesh: Topology, bodies: Bodies, relations: PieceRelations, findings: FindingList): void {
  const shared = new Map<number, Shared>();
  const of = (part: number, other: number): Shared => {
    const entry = shared.get(part) ?? { crossing: [], enclosed: [], others: new Set<string>() };
    shared.set(part, entry);
    if (other !== part) entry.others.add(bodies.partNames[other]);
    return entry;
  };
  const placeAt = (face: number): Place => placeOf({ face, position: positionOf(cage, mesh.vertexOf[mesh.starts[face]]), line: cage.faceLines?.[face] ?? null });
  for (const { faces: [facesA, facesB] } of relations.crossings) {
    for (const [faces, other] of [[facesA, facesB[0]], [facesB, facesA[0]]] as const) {
      for (const face of faces) of(bodies.partOf[face], bodies.partOf[other]).crossing.push(placeAt(face));
    }
  }
  for (const { inner, outerFace, winding } of relations.insides) {
    const face = relations.firstFaces[inner];
    const own = bodies.partOf[face];
    const outer = bodies.partOf[outerFace];
    if (own === outer || winding < 0 || isInVoid(relations, inner)) continue;
    of(own, outer).enclosed.push(placeAt(face));
    of(outer, own).enclosed.push(placeAt(face));
  }
  for (const [part, entry] of [...shared].sort(([a], [b]) => a - b)) {
    const message = overlapMessage(entry);
    for (const place of [...entry.crossing, ...entry.enclosed]) findings.add('overlap', 'warning', bodies.partNames[part], place, () => message);
  }
  if (!relations.complete) {
    findings.add('overlap_unchecked', 'note', null, null, () => 'So many bodies lie in each other’s bounds that not all could be checked for overlap; import fewer of them in one file.');
  }
}

/** Whether what lies around a piece is hollow: as many surfaces about it are turned inwards as outwards. */
export function isInVoid(relations: PieceRelations, inner: number): boolean {
  let winding = 0;
  for (const inside of relations.insides) if (inside.inner === inner) winding += inside.winding;
  return winding <= 0;
}

function overlapMessage({ crossing, enclosed, others }: Shared): string {
  const names = [...others];
  const told = names.slice(0, NAMES_TOLD).map((name) => `“${name}”`).join(', ');
  const rest = names.length > NAMES_TOLD ? ` and ${names.length - NAMES_TOLD} more` : '';
  const whom = names.length === 0 ? 'another body of this part' : `${told}${rest}`;
  const what: string[] = [];
  if (crossing.length > 0) what.push(`${counted(crossing.length, 'face passes', 'faces pass')} through the surface`);
  if (enclosed.length > 0) what.push(`${counted(enclosed.length, 'body lies', 'bodies lie')} wholly inside`);
  return `Overlaps ${whom}: ${what.join(', ')}, so what both fill is weighed twice; move them apart, or leave one of them out.`;
}
