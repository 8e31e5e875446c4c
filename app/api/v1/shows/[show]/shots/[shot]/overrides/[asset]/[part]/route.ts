import { route } from '@/lib/endpoint';
import { dropOverride } from '@/lib/overrides/drop-overrides';
import { dropOverrideInput } from '@/lib/rules/inputs/drop-override';

export const DELETE = route(dropOverrideInput, dropOverride);
