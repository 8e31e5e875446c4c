import { z } from 'zod';
import { showRef } from '../fields';
import { BOUNDARY_WORDS, CREASING_WORDS, PARTITION_WORDS, SCHEME_WORDS, TRIANGLE_WORDS } from '../measure-words';
import { checkNamePattern } from '../name-pattern';

/** A new import; what is left out is as the show has it. */
export const openImportInput = z.strictObject({
  show: showRef,
  scheme: z.enum(SCHEME_WORDS, `scheme is one of ${SCHEME_WORDS.join(', ')}.`).optional(),
  boundary: z.enum(BOUNDARY_WORDS, `boundary is one of ${BOUNDARY_WORDS.join(', ')}.`).optional(),
  triangles: z.enum(TRIANGLE_WORDS, `triangles is one of ${TRIANGLE_WORDS.join(', ')}.`).optional(),
  creasing: z.enum(CREASING_WORDS, `creasing is one of ${CREASING_WORDS.join(', ')}.`).optional(),
  parts_by: z.enum(PARTITION_WORDS, `parts_by is one of ${PARTITION_WORDS.join(', ')}.`).optional(),
  /** Name pattern of this import alone; null for the built-in rule. */
  name_pattern: z
    .string()
    .trim()
    .superRefine((pattern, check) => {
      const fault = checkNamePattern(pattern);
      if (fault !== null) check.addIssue({ code: 'custom', message: fault });
    })
    .nullable()
    .optional(),
  /** Join vertices on open borders that lie on each other; not unless true. */
  weld: z.boolean('weld is true or false.').optional(),
  /** Turn faces one way and outwards; not unless true. */
  turn_faces: z.boolean('turn_faces is true or false.').optional(),
});
export type OpenImportInput = z.infer<typeof openImportInput>;
