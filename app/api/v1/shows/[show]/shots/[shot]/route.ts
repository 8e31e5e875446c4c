import { route } from '@/lib/endpoint';
import { shotRefInput } from '@/lib/rules/inputs/shot-ref';
import { getShot } from '@/lib/shots/get-shot';

export const GET = route(shotRefInput, getShot);
