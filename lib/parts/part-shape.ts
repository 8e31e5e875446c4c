import { symmetricEigen } from '@/lib/engine/inertia/symmetric-eigen';

export type Three = [number, number, number];
type Six = [number, number, number, number, number, number];

/** A component as its geometry record has it: file units and axes, second moments about its own centroids (xx yy zz xy xz yz). */
export interface ShapeComponent {
  volume: number;
  centroid: Three;
  centralSecond: Six;
  area: number;
  surfaceCentroid: Three;
  surfaceCentralSecond: Six;
}

/** What of a part stays as it is wherever it is put, and where it is put. */
export interface PartShape {
  faces: number;
  components: number;
  volume: number;
  area: number;
  /** Principal second moments of the solid and of the surface about the centre of the surface, ascending. */
  solid: Three;
  surface: Three;
  /** Centre of the surface, in the file's axes. */
  centre: Three;
}

/** Adds a mass at an offset to second moments: S + m d dᵀ. */
function shifted(second: Six, mass: number, centroid: Three, about: Three): Six {
  const [x, y, z] = [centroid[0] - about[0], centroid[1] - about[1], centroid[2] - about[2]];
  return [second[0] + mass * x * x, second[1] + mass * y * y, second[2] + mass * z * z, second[3] + mass * x * y, second[4] + mass * x * z, second[5] + mass * y * z];
}

const sumOf = (all: readonly Six[]): Six => all.reduce<Six>((sum, one) => sum.map((value, i) => value + one[i]) as Six, [0, 0, 0, 0, 0, 0]);

/** The shape of a part; null where nothing of it was measured. */
export function partShape(faces: number, components: readonly ShapeComponent[]): PartShape | null {
  const area = components.reduce((sum, one) => sum + one.area, 0);
  if (!(area > 0)) return null;
  const centre = [0, 1, 2].map((axis) => components.reduce((sum, one) => sum + (one.area / area) * one.surfaceCentroid[axis], 0)) as Three;
  const solid = sumOf(components.map((one) => shifted(one.centralSecond, one.volume, one.centroid, centre)));
  const surface = sumOf(components.map((one) => shifted(one.surfaceCentralSecond, one.area, one.surfaceCentroid, centre)));
  return { faces, components: components.length, volume: components.reduce((sum, one) => sum + one.volume, 0), area, solid: symmetricEigen(solid).values, surface: symmetricEigen(surface).values, centre };
}

/** Relative to the size of the part: what two measurements of one geometry may differ by, wherever it lies. */
const SAME = 1e-9;

const near = (a: readonly number[], b: readonly number[], scale: number): boolean => a.every((value, i) => Math.abs(value - b[i]) <= SAME * scale);

/** Whether two parts have one geometry, wherever each is put (mirrored ones too). */
export function isSameShape(a: PartShape, b: PartShape): boolean {
  const size = Math.sqrt(a.area);
  return (
    a.faces === b.faces &&
    a.components === b.components &&
    near([a.area], [b.area], a.area) &&
    near([a.volume], [b.volume], size ** 3) &&
    near(a.surface, b.surface, size ** 4) &&
    near(a.solid, b.solid, size ** 5)
  );
}

export const distanceOf = (a: PartShape, b: PartShape): number => Math.hypot(a.centre[0] - b.centre[0], a.centre[1] - b.centre[1], a.centre[2] - b.centre[2]);

/** Whether two parts lie in one place. */
export function isSamePlace(a: PartShape, b: PartShape): boolean {
  return distanceOf(a, b) <= SAME * (Math.sqrt(a.area) + Math.hypot(...a.centre));
}
