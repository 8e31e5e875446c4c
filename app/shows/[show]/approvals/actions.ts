'use server';

import { approveValues } from '@/lib/approvals/approve-values';
import { askForApproval } from '@/lib/approvals/ask-for-approval';
import { withdrawApprovals } from '@/lib/approvals/withdraw-approvals';
import { action } from '@/lib/endpoint';
import { approveValuesInput } from '@/lib/rules/inputs/approve-values';
import { askForApprovalInput } from '@/lib/rules/inputs/ask-for-approval';
import { withdrawApprovalsInput } from '@/lib/rules/inputs/withdraw-approvals';

export const approveValuesAction = action(approveValuesInput, approveValues);
export const withdrawApprovalsAction = action(withdrawApprovalsInput, withdrawApprovals);
export const askForApprovalAction = action(askForApprovalInput, askForApproval);
