import { route } from '@/lib/endpoint';
import { submitImport } from '@/lib/imports/submit-import';
import { importRefInput } from '@/lib/rules/inputs/import-ref';

export const POST = route(importRefInput, submitImport, { status: 202 });
