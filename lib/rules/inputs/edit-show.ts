import { z } from 'zod';
import { showRef } from '../fields';
import { BOUNDARY_WORDS, PARTITION_WORDS, SCHEME_WORDS } from '../measure-words';
import { checkNamePattern } from '../name-pattern';
import { LINEAR_UNITS, OTHER_SPACE_WORDS, UP_AXES } from '../units';

const tolerance = z.number('Give a percentage, such as 0.5.').min(0, 'A tolerance is 0 or more.').max(100, 'A tolerance is at most 100 %.');

/** Changes of a show: what is left out stays. An empty name pattern is the built-in one. */
export const editShowInput = z
  .strictObject({
    show: showRef,
    title: z.string().trim().min(1, 'Give a title.').max(200, 'A title has at most 200 characters.').optional(),
    linear_unit: z.enum(LINEAR_UNITS).optional(),
    up_axis: z.enum(UP_AXES).optional(),
    scheme: z.enum(SCHEME_WORDS).optional(),
    boundary: z.enum(BOUNDARY_WORDS).optional(),
    parts_by: z.enum(PARTITION_WORDS).optional(),
    /** What becomes of files of later imports that state another unit or up axis. */
    other_space: z.enum(OTHER_SPACE_WORDS).optional(),
    name_pattern: z.string().trim().max(500).nullish(),
    self_approval: z.boolean().optional(),
    /** Percent of the mass, of the part's size for its centre of mass, and of the inertia. */
    tolerance_mass_percent: tolerance.optional(),
    tolerance_com_percent: tolerance.optional(),
    tolerance_moments_percent: tolerance.optional(),
    archived: z.boolean().optional(),
  })
  .superRefine((input, check) => {
    const wrong = input.name_pattern ? checkNamePattern(input.name_pattern) : null;
    if (wrong !== null) check.addIssue({ code: 'custom', path: ['name_pattern'], message: wrong });
  });
export type EditShowInput = z.infer<typeof editShowInput>;
