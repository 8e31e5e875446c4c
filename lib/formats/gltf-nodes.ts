import type { GltfDocument } from './gltf-document';
import { fromTranslationRotationScale, IDENTITY, multiply, type Matrix } from './matrix';

type Node = NonNullable<GltfDocument['nodes']>[number];

function localMatrix(node: Node): Matrix {
  if (node.matrix) return node.matrix;
  if (!node.translation && !node.rotation && !node.scale) return IDENTITY;
  return fromTranslationRotationScale(node.translation ?? [0, 0, 0], node.rotation ?? [0, 0, 0, 1], node.scale ?? [1, 1, 1]);
}

/** Where each node stands in the scene, and which nodes the scene shows: those of the file's own scene, or all where it names none. The document was checked. */
export function placeNodes({ nodes = [], scenes = [], scene }: GltfDocument): { world: Matrix[]; shown: number[] } {
  const children = new Set(nodes.flatMap((node) => node.children ?? []));
  const world: Matrix[] = nodes.map(() => IDENTITY);
  const visit = (roots: number[], see: (node: number) => void) => {
    const stack = [...roots].reverse();
    for (let node = stack.pop(); node !== undefined; node = stack.pop()) {
      see(node);
      for (const child of [...(nodes[node].children ?? [])].reverse()) stack.push(child);
    }
  };
  const roots = nodes.map((_, i) => i).filter((i) => !children.has(i));
  for (const root of roots) world[root] = localMatrix(nodes[root]);
  visit(roots, (node) => {
    for (const child of nodes[node].children ?? []) world[child] = multiply(localMatrix(nodes[child]), world[node]);
  });
  const shown: number[] = [];
  const seen = new Set<number>();
  visit(scenes[scene ?? 0]?.nodes ?? roots, (node) => {
    if (!seen.has(node)) shown.push(node);
    seen.add(node);
  });
  return { world, shown };
}
