import { route } from '@/lib/endpoint';
import { removeFromShotInput } from '@/lib/rules/inputs/remove-from-shot';
import { removeFromShot } from '@/lib/shots/remove-from-shot';

export const DELETE = route(removeFromShotInput, removeFromShot);
