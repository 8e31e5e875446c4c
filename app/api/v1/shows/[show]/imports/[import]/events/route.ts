import { route } from '@/lib/endpoint';
import { streamImport } from '@/lib/imports/stream-import';
import { importRefInput } from '@/lib/rules/inputs/import-ref';

export const GET = route(importRefInput, streamImport);
