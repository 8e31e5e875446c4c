import { route } from '@/lib/endpoint';
import { pauseImport } from '@/lib/imports/pause-import';
import { importRefInput } from '@/lib/rules/inputs/import-ref';

export const POST = route(importRefInput, pauseImport, { status: 200 });
