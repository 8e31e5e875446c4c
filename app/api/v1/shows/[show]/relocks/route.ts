import { route } from '@/lib/endpoint';
import { relockValues } from '@/lib/locks/relock-values';
import { relockValuesInput } from '@/lib/rules/inputs/lock-values';

export const POST = route(relockValuesInput, relockValues, { status: 201 });
