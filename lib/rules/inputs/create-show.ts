import { z } from 'zod';
import { emailField, showCodeField } from '../fields';
import { BOUNDARY_WORDS, PARTITION_WORDS, SCHEME_WORDS } from '../measure-words';
import { LINEAR_UNITS, UP_AXES } from '../units';

/** A show. Unit, up axis and scheme can be changed until the first import. */
export const createShowInput = z.strictObject({
  code: showCodeField,
  title: z.string().trim().min(1, 'Give a title.').max(200, 'A title has at most 200 characters.'),
  linear_unit: z.enum(LINEAR_UNITS, `linear_unit is one of ${LINEAR_UNITS.join(', ')}.`),
  up_axis: z.enum(UP_AXES, 'up_axis is y or z.'),
  scheme: z.enum(SCHEME_WORDS, `scheme is one of ${SCHEME_WORDS.join(', ')}.`).default('catmull-clark'),
  boundary: z.enum(BOUNDARY_WORDS).optional(),
  parts_by: z.enum(PARTITION_WORDS).optional(),
  leads: z.array(emailField).max(50).default([]),
  self_approval: z.boolean().default(false),
});
export type CreateShowInput = z.infer<typeof createShowInput>;
