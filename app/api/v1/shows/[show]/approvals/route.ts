import { approveValues } from '@/lib/approvals/approve-values';
import { listQueue } from '@/lib/approvals/list-queue';
import { route } from '@/lib/endpoint';
import { approveValuesInput } from '@/lib/rules/inputs/approve-values';
import { listQueueInput } from '@/lib/rules/inputs/list-queue';

export const GET = route(listQueueInput, listQueue);
export const POST = route(approveValuesInput, approveValues, { status: 201 });
