import { route } from '@/lib/endpoint';
import { handingOut } from '@/lib/exports/handing-out';
import { listParts } from '@/lib/parts/list-parts';
import { listPartsInput } from '@/lib/rules/inputs/list-parts';
import { setValuesInput } from '@/lib/rules/inputs/set-values';
import { setValues } from '@/lib/settings/set-values';

export const GET = route(listPartsInput, handingOut('parts', listParts, (page) => page.items));
export const PATCH = route(setValuesInput, setValues);
