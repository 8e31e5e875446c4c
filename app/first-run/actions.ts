'use server';

import { action } from '@/lib/endpoint';
import { createFirstAdminInput } from '@/lib/rules/inputs/create-first-admin';
import { createFirstAdmin } from '@/lib/users/create-first-admin';

export const createFirstAdminAction = action(createFirstAdminInput, createFirstAdmin);
