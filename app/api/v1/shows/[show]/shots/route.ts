import { route } from '@/lib/endpoint';
import { putShots } from '@/lib/shots/put-shots';
import { putShotsInput } from '@/lib/rules/inputs/put-shots';

export const POST = route(putShotsInput, putShots, { status: 201 });
