import { route } from '@/lib/endpoint';
import { withdrawApprovals } from '@/lib/approvals/withdraw-approvals';
import { withdrawApprovalsInput } from '@/lib/rules/inputs/withdraw-approvals';

export const POST = route(withdrawApprovalsInput, withdrawApprovals, { status: 201 });
