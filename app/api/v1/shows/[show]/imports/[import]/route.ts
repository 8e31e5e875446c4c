import { route } from '@/lib/endpoint';
import { getImport } from '@/lib/imports/get-import';
import { importRefInput } from '@/lib/rules/inputs/import-ref';

export const GET = route(importRefInput, getImport);
