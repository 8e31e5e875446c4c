import { route } from '@/lib/endpoint';
import { resumeImport } from '@/lib/imports/resume-import';
import { importRefInput } from '@/lib/rules/inputs/import-ref';

export const POST = route(importRefInput, resumeImport, { status: 200 });
