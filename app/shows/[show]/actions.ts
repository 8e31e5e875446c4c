'use server';

import { action } from '@/lib/endpoint';
import { setTold } from '@/lib/notices/set-told';
import { setToldInput } from '@/lib/rules/inputs/set-told';

export const setToldAction = action(setToldInput, setTold);
