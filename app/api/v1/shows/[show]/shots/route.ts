import { route } from '@/lib/endpoint';
import { listShotsInput } from '@/lib/rules/inputs/list-shots';
import { putShotsInput } from '@/lib/rules/inputs/put-shots';
import { listShots } from '@/lib/shots/list-shots';
import { putShots } from '@/lib/shots/put-shots';

export const GET = route(listShotsInput, listShots);
export const POST = route(putShotsInput, putShots, { status: 201 });
