import { listCarryOver } from '@/lib/approvals/list-carry-over';
import { route } from '@/lib/endpoint';
import { showRefInput } from '@/lib/rules/inputs/show-ref';

export const GET = route(showRefInput, listCarryOver);
