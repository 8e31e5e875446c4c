import { route } from '@/lib/endpoint';
import { listValueInputsInput } from '@/lib/rules/inputs/list-value-inputs';
import { listValueInputs } from '@/lib/values/list-value-inputs';

export const GET = route(listValueInputsInput, listValueInputs);
