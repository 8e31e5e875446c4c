import { route } from '@/lib/endpoint';
import { getAsset } from '@/lib/parts/get-asset';
import { assetRefInput } from '@/lib/rules/inputs/part-ref';

export const GET = route(assetRefInput, getAsset);
