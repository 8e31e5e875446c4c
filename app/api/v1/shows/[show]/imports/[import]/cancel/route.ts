import { route } from '@/lib/endpoint';
import { cancelImport } from '@/lib/imports/cancel-import';
import { importRefInput } from '@/lib/rules/inputs/import-ref';

export const POST = route(importRefInput, cancelImport, { status: 200 });
