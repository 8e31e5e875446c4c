import { Box3, Sphere, type BufferGeometry, type Matrix4 } from 'three';

/** A surface and where it stands; where it lies itself without a place. */
export interface Placed {
  geometry: BufferGeometry;
  place?: Matrix4;
}

/** The ball around surfaces, for a camera that shows all of them; of no size where there are none. */
export function sphereOf(surfaces: readonly Placed[]): Sphere {
  const box = new Box3();
  for (const { geometry, place } of surfaces) {
    geometry.computeBoundingBox();
    if (geometry.boundingBox !== null)
      box.union(place === undefined ? geometry.boundingBox : geometry.boundingBox.clone().applyMatrix4(place));
  }
  return box.isEmpty() ? new Sphere() : box.getBoundingSphere(new Sphere());
}
