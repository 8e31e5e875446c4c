import { z } from 'zod';
import { MeshError } from './mesh-error';
import { MESH_LIMITS } from './mesh-limits';

const index = z.int().min(0);
const name = z.string().max(MESH_LIMITS.nameLength).optional();
const numbers = (length: number) => z.array(z.number()).length(length).optional();

/** Each may be a file beside the document, which is then held. */
const MOST_BUFFERS = 64;

/** What of a glTF file says something about geometry; everything else (images, animations, extensions) is dropped unread. */
const gltfSchema = z.object({
  asset: z.object({ version: z.string().regex(/^2\.\d+$/) }),
  scene: index.optional(),
  scenes: z.array(z.object({ name, nodes: z.array(index).optional() })).optional(),
  nodes: z.array(z.object({ name, children: z.array(index).optional(), mesh: index.optional(), skin: index.optional(), matrix: numbers(16), translation: numbers(3), rotation: numbers(4), scale: numbers(3) })).optional(),
  meshes: z.array(z.object({ name, primitives: z.array(z.object({ attributes: z.record(z.string(), index), indices: index.optional(), material: index.optional(), mode: z.int().min(0).max(6).optional(), extensions: z.record(z.string(), z.unknown()).optional() })).min(1) })).optional(),
  materials: z.array(z.object({ name })).optional(),
  skins: z.array(z.object({ name, joints: z.array(index).min(1), inverseBindMatrices: index.optional(), skeleton: index.optional() })).optional(),
  accessors: z.array(z.object({
    bufferView: index.optional(),
    byteOffset: index.optional(),
    componentType: z.union([z.literal(5120), z.literal(5121), z.literal(5122), z.literal(5123), z.literal(5125), z.literal(5126)]),
    normalized: z.boolean().optional(),
    count: z.int().min(1),
    type: z.enum(['SCALAR', 'VEC2', 'VEC3', 'VEC4', 'MAT2', 'MAT3', 'MAT4']),
    sparse: z.object({ count: z.int().min(1), indices: z.object({ bufferView: index, byteOffset: index.optional(), componentType: z.union([z.literal(5121), z.literal(5123), z.literal(5125)]) }), values: z.object({ bufferView: index, byteOffset: index.optional() }) }).optional(),
  })).optional(),
  bufferViews: z.array(z.object({ buffer: index, byteOffset: index.optional(), byteLength: z.int().min(1), byteStride: z.int().min(4).max(252).optional() })).optional(),
  buffers: z.array(z.object({ uri: z.string().optional(), byteLength: z.int().min(1) })).max(MOST_BUFFERS).optional(),
  extensionsRequired: z.array(z.string()).optional(),
});

export type GltfDocument = z.infer<typeof gltfSchema>;

/** Extensions without which the corners cannot be read. Others that a file requires change how it looks, not its shape. */
const COMPRESSIONS = new Set(['KHR_draco_mesh_compression', 'EXT_meshopt_compression', 'KHR_meshopt_compression']);

/** The schema's remark as other errors say it: "expected …, found …". */
function inWords(message: string): string {
  return message.replace(/^Invalid \w+: /, '').replace('received undefined', 'found nothing').replace('received', 'found').slice(0, 200);
}

/** Reads the JSON of a glTF file and keeps what concerns geometry. Errors: bad_json, bad_gltf (with the path of the property), compressed. */
export function parseGltf(text: string): GltfDocument {
  let json: unknown;
  try {
    json = JSON.parse(text);
  } catch (error) {
    throw new MeshError({ code: 'bad_json', expected: 'JSON', detail: `expected JSON: ${error instanceof Error ? error.message.slice(0, 200) : 'it cannot be read'}` });
  }
  const parsed = gltfSchema.safeParse(json);
  if (!parsed.success) {
    const { path, message } = parsed.error.issues[0];
    throw new MeshError({ code: 'bad_gltf', detail: `glTF ${path.length > 0 ? path.map(String).join('.') : 'document'}: ${inWords(message)}` });
  }
  const compressed = parsed.data.extensionsRequired?.find((extension) => COMPRESSIONS.has(extension));
  if (compressed) throw new MeshError({ code: 'compressed', expected: 'corners without compression', found: compressed, detail: `expected corners without compression, found ${compressed}: export the file without it` });
  return parsed.data;
}
