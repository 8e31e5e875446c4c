import type { z } from 'zod';
import { codeField } from '../fields';
import { exportRowsInput } from './export-rows';

/** What is locked for a shot, as a file. */
export const exportShotInput = exportRowsInput.pick({ show: true, guard: true, profile: true }).extend({ shot: codeField }).strict();
export type ExportShotInput = z.infer<typeof exportShotInput>;
