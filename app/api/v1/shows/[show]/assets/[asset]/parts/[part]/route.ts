import { route } from '@/lib/endpoint';
import { getPart } from '@/lib/parts/get-part';
import { partRefInput } from '@/lib/rules/inputs/part-ref';

export const GET = route(partRefInput, getPart);
