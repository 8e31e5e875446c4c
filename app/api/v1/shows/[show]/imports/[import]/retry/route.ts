import { route } from '@/lib/endpoint';
import { retryImport } from '@/lib/imports/retry-import';
import { importRefInput } from '@/lib/rules/inputs/import-ref';

export const POST = route(importRefInput, retryImport, { status: 202 });
