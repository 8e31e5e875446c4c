import { z } from 'zod';
import { importRefInput } from './import-ref';

/** An import, and where only some of its failed files are meant, their names. */
export const retryImportInput = importRefInput.extend({ files: z.array(z.string().min(1).max(1024)).min(1).max(20_000).optional() });
export type RetryImportInput = z.infer<typeof retryImportInput>;
