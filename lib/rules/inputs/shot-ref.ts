import { z } from 'zod';
import { codeField, showRef } from '../fields';

/** A shot of a show by its code. */
export const shotRefInput = z.strictObject({ show: showRef, shot: codeField });
export type ShotRefInput = z.infer<typeof shotRefInput>;

/** A sequence of a show. */
export const sequenceRefInput = z.strictObject({ show: showRef, sequence: codeField });
export type SequenceRefInput = z.infer<typeof sequenceRefInput>;
