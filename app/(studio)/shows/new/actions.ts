'use server';

import { action } from '@/lib/endpoint';
import { createShowInput } from '@/lib/rules/inputs/create-show';
import { createShow } from '@/lib/shows/create-show';

export const createShowAction = action(createShowInput, createShow);
