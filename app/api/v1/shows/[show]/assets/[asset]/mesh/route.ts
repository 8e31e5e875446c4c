import { route } from '@/lib/endpoint';
import { getAssetMesh } from '@/lib/exports/get-asset-mesh';
import { assetMeshInput } from '@/lib/rules/inputs/part-ref';

export const GET = route(assetMeshInput, getAssetMesh);
