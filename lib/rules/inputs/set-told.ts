import { z } from 'zod';
import { codeField, showRef } from '../fields';

const place = { show: showRef, shot: codeField.optional(), asset: codeField.optional() };
const onePlace = { check: (input: { shot?: string; asset?: string }) => input.shot === undefined || input.asset === undefined, error: { message: 'Name a shot or an asset, not both.', path: ['asset'] } };

/** Asks to be told of a show, or of one shot or asset of it; or not any more. */
export const setToldInput = z.strictObject({ ...place, told: z.boolean('told is true or false.') }).refine(onePlace.check, onePlace.error);
export type SetToldInput = z.infer<typeof setToldInput>;

/** Who is told of a show, a shot or an asset. */
export const getToldInput = z.strictObject(place).refine(onePlace.check, onePlace.error);
export type GetToldInput = z.infer<typeof getToldInput>;
