import { route } from '@/lib/endpoint';
import { askForApproval } from '@/lib/approvals/ask-for-approval';
import { askForApprovalInput } from '@/lib/rules/inputs/ask-for-approval';

export const POST = route(askForApprovalInput, askForApproval, { status: 201 });
