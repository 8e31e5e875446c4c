import { route } from '@/lib/endpoint';
import { approveValues } from '@/lib/approvals/approve-values';
import { approveValuesInput } from '@/lib/rules/inputs/approve-values';

export const POST = route(approveValuesInput, approveValues, { status: 201 });
