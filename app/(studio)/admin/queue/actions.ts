'use server';

import { action } from '@/lib/endpoint';
import { retryImport } from '@/lib/imports/retry-import';
import { retryImportInput } from '@/lib/rules/inputs/retry-import';

export const retryFilesAction = action(retryImportInput, retryImport);
