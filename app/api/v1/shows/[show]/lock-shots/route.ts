import { route } from '@/lib/endpoint';
import { lockShots } from '@/lib/locks/lock-shots';
import { lockShotsInput } from '@/lib/rules/inputs/lock-values';

export const POST = route(lockShotsInput, lockShots, { status: 201 });
