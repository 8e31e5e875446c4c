import type { z } from 'zod';
import type { ActionResult } from './action-result';
import type { approveValuesInput } from './inputs/approve-values';
import type { askForApprovalInput } from './inputs/ask-for-approval';
import type { withdrawApprovalsInput } from './inputs/withdraw-approvals';

/** The server's acts on approvals, as pages hand them to their panels. */
export interface ApprovalActions {
  approve: (input: z.input<typeof approveValuesInput>) => Promise<ActionResult<unknown>>;
  withdraw: (input: z.input<typeof withdrawApprovalsInput>) => Promise<ActionResult<unknown>>;
  ask: (input: z.input<typeof askForApprovalInput>) => Promise<ActionResult<unknown>>;
}
