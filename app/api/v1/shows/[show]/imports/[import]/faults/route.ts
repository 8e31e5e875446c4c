import { route } from '@/lib/endpoint';
import { listImportFaults } from '@/lib/imports/list-import-faults';
import { importRefInput } from '@/lib/rules/inputs/import-ref';

export const GET = route(importRefInput, listImportFaults);
