import { z } from 'zod';
import { showRef } from '../fields';
import { CONSTRUCTIONS } from '../states';

const MAX_SET_ITEMS = 20_000;

const positive = (what: string) => z.number(`${what} is a number, or null to clear it.`).positive(`${what} has to be above 0.`).nullable().optional();

/**
 * Values of parts in bulk. What is left out stays, null clears. Where one of target_mass_kg, density_kg_m3, material and
 * areal_density_kg_m2 is given, the others that are not given go: the fields of a call say what the mass comes from.
 */
export const setValuesInput = z.strictObject({
  show: showRef,
  items: z
    .array(
      z
        .strictObject({
          asset: z.string().min(1, 'Name the asset.').max(128),
          part: z.string().min(1).optional(),
          body: z.string().min(1).optional(),
          revision: z.number('Give the revision of the row as it was read.').int('A revision is a whole number.').min(1),
          construction: z.enum(CONSTRUCTIONS, `construction is one of ${CONSTRUCTIONS.join(', ')}.`).optional(),
          target_mass_kg: positive('target_mass_kg'),
          density_kg_m3: positive('density_kg_m3'),
          material: z.string().trim().min(1, 'Name a material, or null to clear it.').max(200).nullable().optional(),
          areal_density_kg_m2: positive('areal_density_kg_m2'),
          wall_m: positive('wall_m'),
          variant: z.string().trim().max(64, 'A variant has at most 64 characters.').nullable().optional(),
          left_out: z.boolean('left_out is true or false.').optional(),
          shot: z.string().min(1).optional(),
          reason: z.string().max(500).optional(),
        })
        .refine((item) => (item.part === undefined) !== (item.body === undefined), { message: 'Name a part or a body.', path: ['part'] }),
    )
    .min(1, 'Send at least one item.')
    .max(MAX_SET_ITEMS, `Send at most ${MAX_SET_ITEMS} items at once.`),
});
export type SetValuesInput = z.infer<typeof setValuesInput>;
export type SetValuesItem = SetValuesInput['items'][number];
