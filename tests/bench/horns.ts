import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';

/** Quads around, quads along: with the two end caps 32, 134, 746 and 3,794 faces. */
const SIZES: [number, number][] = [
  [6, 5],
  [12, 11],
  [24, 31],
  [48, 79],
];
const LENGTH_CM = 40;
const BASE_RADIUS_CM = 5;
const TIP_RADIUS_CM = 0.6;
/** The horn's axis is an arc of this angle. */
const BEND_RAD = Math.PI / 3;

/** A tapered horn along an arc in the x-y plane, closed by a polygon at each end; lengths in cm, faces outwards. */
function hornCage(around: number, along: number): Cage {
  const arcRadius = LENGTH_CM / BEND_RAD;
  const positions = new Float64Array(3 * around * (along + 1));
  for (let ring = 0; ring <= along; ring++) {
    const share = ring / along;
    const bend = BEND_RAD * share;
    const radius = BASE_RADIUS_CM + (TIP_RADIUS_CM - BASE_RADIUS_CM) * share;
    for (let spoke = 0; spoke < around; spoke++) {
      const turn = (2 * Math.PI * spoke) / around;
      const reach = arcRadius + radius * Math.cos(turn);
      positions.set([reach * Math.cos(bend), reach * Math.sin(bend), radius * Math.sin(turn)], 3 * (ring * around + spoke));
    }
  }
  const faces: number[][] = [];
  for (let ring = 0; ring < along; ring++) {
    for (let spoke = 0; spoke < around; spoke++) {
      const next = (spoke + 1) % around;
      faces.push([ring * around + spoke, (ring + 1) * around + spoke, (ring + 1) * around + next, ring * around + next]);
    }
  }
  const ends = Array.from({ length: around }, (_, spoke) => spoke);
  faces.push(ends, ends.map((spoke) => along * around + spoke).reverse());
  const faceStarts = new Uint32Array(faces.length + 1);
  faces.forEach((face, index) => (faceStarts[index + 1] = faceStarts[index] + face.length));
  return {
    positions,
    faceStarts,
    faceVertices: Uint32Array.from(faces.flat()),
    groups: null,
    objects: null,
    materials: null,
    joints: null,
    creaseVertices: new Uint32Array(0),
    creaseSharpness: new Float32Array(0),
    cornerVertices: new Uint32Array(0),
    cornerSharpness: new Float32Array(0),
    boundary: null,
    faceLines: null,
    metresPerUnit: 0.01,
    upAxis: 'y',
    warnings: [],
  };
}

/** How much of a tapered horn's cage the Catmull-Clark limit surface takes away, by number of faces. */
export function benchHorns(): { faces: number; cageCm3: number; limitCm3: number; removed: number }[] {
  return SIZES.map(([around, along]) => {
    const measured = measureCage(hornCage(around, along), {
      scheme: 'catmull-clark',
      boundary: 'edge-and-corner',
      triangles: 'catmark',
      creasing: 'uniform',
      partsBy: 'whole',
    });
    const [{ cage, solid }] = measured.parts[0].components;
    return { faces: measured.faces, cageCm3: cage.volume, limitCm3: solid.volume, removed: 1 - solid.volume / cage.volume };
  });
}
