import { route } from '@/lib/endpoint';
import { getImport } from '@/lib/imports/get-import';
import { getImportInput } from '@/lib/rules/inputs/get-import';

export const GET = route(getImportInput, getImport);
