import { z } from 'zod';
import { showRef } from '../fields';

export const listMembersInput = z.strictObject({ show: showRef });
export type ListMembersInput = z.infer<typeof listMembersInput>;
