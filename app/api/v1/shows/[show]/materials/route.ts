import { route } from '@/lib/endpoint';
import { listMaterials } from '@/lib/materials/list-materials';
import { listMaterialsInput } from '@/lib/rules/inputs/list-materials';

export const GET = route(listMaterialsInput, listMaterials);
