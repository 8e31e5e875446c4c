import { route } from '@/lib/endpoint';
import { handingOut } from '@/lib/exports/handing-out';
import { getAsset } from '@/lib/parts/get-asset';
import { assetRefInput } from '@/lib/rules/inputs/part-ref';

export const GET = route(assetRefInput, handingOut('parts', getAsset, (asset) => asset.parts));
