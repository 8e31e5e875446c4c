import type { ApprovalActions } from '@/lib/rules/approval-actions';
import { approveValuesAction, askForApprovalAction, withdrawApprovalsAction } from './actions';

/** The acts that pages hand to their panels. */
export const approvalActions: ApprovalActions = { approve: approveValuesAction, withdraw: withdrawApprovalsAction, ask: askForApprovalAction };
