import type { Cage } from '../cage';
import { positionOf } from './diagnose';
import { counted, placeOf, type FindingList } from './findings';
import type { Bodies } from './partition';
import type { PieceRelations } from './relate-pieces';
import type { Topology } from './topology';

/** Whether each piece lies inside another one of the same part. */
export function nestedPieces(bodies: Bodies, relations: PieceRelations): Uint8Array {
  const nested = new Uint8Array(relations.firstFaces.length);
  for (const { inner, outerFace } of relations.insides) {
    if (bodies.partOf[relations.firstFaces[inner]] === bodies.partOf[outerFace]) nested[inner] = 1;
  }
  return nested;
}

/**
 * Notes the bodies that lie inside another body of their part: a cavity where they enclose negative volume, a solid of its own where they do not.
 * `inverted` marks the pieces (1) with negative volume.
 */
export function diagnoseNesting(cage: Cage, mesh: Topology, bodies: Bodies, relations: PieceRelations, nested: Uint8Array, inverted: Uint8Array, findings: FindingList): void {
  const counts = new Map<number, { cavities: number; solids: number }>();
  for (let piece = 0; piece < nested.length; piece++) {
    if (nested[piece] === 0) continue;
    const part = bodies.partOf[relations.firstFaces[piece]];
    const count = counts.get(part) ?? { cavities: 0, solids: 0 };
    counts.set(part, count);
    if (inverted[piece] === 1) count.cavities++;
    else count.solids++;
  }
  for (let piece = 0; piece < nested.length; piece++) {
    if (nested[piece] === 0) continue;
    const face = relations.firstFaces[piece];
    const part = bodies.partOf[face];
    const { cavities, solids } = counts.get(part) ?? { cavities: 0, solids: 0 };
    findings.add('nested_component', 'note', bodies.partNames[part],
      placeOf({ face, position: positionOf(cage, mesh.vertexOf[mesh.starts[face]]), line: cage.faceLines?.[face] ?? null }), () => nestingMessage(cavities, solids));
  }
}

function nestingMessage(cavities: number, solids: number): string {
  const told: string[] = [];
  if (cavities > 0) told.push(`${counted(cavities, 'body', 'bodies')} inside another ${cavities === 1 ? 'is' : 'are'} turned inwards and ${cavities === 1 ? 'counts as a cavity' : 'count as cavities'}`);
  if (solids > 0) told.push(`${counted(solids, 'body', 'bodies')} inside another ${solids === 1 ? 'is' : 'are'} turned outwards and ${solids === 1 ? 'counts as a solid of its own' : 'count as solids of their own'}`);
  return `${told.join('; ')}; reverse the faces of any that ${cavities + solids === 1 ? 'is' : 'are'} meant the other way.`;
}
