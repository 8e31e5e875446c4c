import { route } from '@/lib/endpoint';
import { handingOut } from '@/lib/exports/handing-out';
import { getPart } from '@/lib/parts/get-part';
import { partRefInput } from '@/lib/rules/inputs/part-ref';

export const GET = route(partRefInput, handingOut('parts', getPart, (part) => [part.row]));
