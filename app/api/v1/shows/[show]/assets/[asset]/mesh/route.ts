import { route } from '@/lib/endpoint';
import { getAssetMesh } from '@/lib/exports/get-asset-mesh';
import { assetRefInput } from '@/lib/rules/inputs/part-ref';

export const GET = route(assetRefInput, getAssetMesh);
