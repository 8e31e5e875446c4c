import type { BufferGeometry, Object3D } from 'three';
import { Mesh, LineSegments } from 'three';
import { GLTFLoader } from 'three-stdlib';

/** A part as it is drawn: triangles of its limit surface and edges of its cage, relative to the asset's origin point. */
export interface DrawnPart {
  name: string;
  surface: BufferGeometry | null;
  cage: BufferGeometry | null;
}

export interface DrawnAsset {
  /** Point of the asset's frame that the geometry is relative to, metres. */
  origin: [number, number, number];
  parts: DrawnPart[];
}

/** Reads the binary glTF that the mesh route answers. Geometry is in metres and the asset's axes. */
export async function readAssetMesh(bytes: ArrayBuffer): Promise<DrawnAsset> {
  const { scene } = await new GLTFLoader().parseAsync(bytes, '');
  const root = scene.children[0];
  const parts = new Map<string, DrawnPart>();
  for (const node of root?.children ?? []) {
    const { kind, part } = node.userData as { kind?: string; part?: string };
    const geometry = geometryOf(node);
    if (part === undefined || geometry === null) continue;
    const drawn = parts.get(part) ?? { name: part, surface: null, cage: null };
    parts.set(part, kind === 'cage' ? { ...drawn, cage: geometry } : { ...drawn, surface: geometry });
  }
  const at = root?.position;
  return { origin: at === undefined ? [0, 0, 0] : [at.x, at.y, at.z], parts: [...parts.values()] };
}

function geometryOf(node: Object3D): BufferGeometry | null {
  let found: BufferGeometry | null = null;
  node.traverse((one) => {
    if (one instanceof Mesh || one instanceof LineSegments) found ??= one.geometry as BufferGeometry;
  });
  return found;
}
