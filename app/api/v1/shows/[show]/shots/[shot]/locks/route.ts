import { route } from '@/lib/endpoint';
import { lockValues } from '@/lib/locks/lock-values';
import { lockValuesInput } from '@/lib/rules/inputs/lock-values';

export const POST = route(lockValuesInput, lockValues, { status: 201 });
