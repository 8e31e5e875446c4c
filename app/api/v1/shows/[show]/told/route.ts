import { route } from '@/lib/endpoint';
import { getTold } from '@/lib/notices/get-told';
import { setTold } from '@/lib/notices/set-told';
import { getToldInput, setToldInput } from '@/lib/rules/inputs/set-told';

export const GET = route(getToldInput, getTold);
export const POST = route(setToldInput, setTold);
