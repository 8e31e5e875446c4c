import { route } from '@/lib/endpoint';
import { unlockValues } from '@/lib/locks/unlock-values';
import { unlockValuesInput } from '@/lib/rules/inputs/lock-values';

export const POST = route(unlockValuesInput, unlockValues);
