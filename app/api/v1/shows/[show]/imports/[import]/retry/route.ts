import { route } from '@/lib/endpoint';
import { retryImport } from '@/lib/imports/retry-import';
import { retryImportInput } from '@/lib/rules/inputs/retry-import';

export const POST = route(retryImportInput, retryImport, { status: 202 });
