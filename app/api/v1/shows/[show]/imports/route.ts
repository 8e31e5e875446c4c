import { route } from '@/lib/endpoint';
import { listImports } from '@/lib/imports/list-imports';
import { openImport } from '@/lib/imports/open-import';
import { listImportsInput } from '@/lib/rules/inputs/list-imports';
import { openImportInput } from '@/lib/rules/inputs/open-import';

export const GET = route(listImportsInput, listImports);
export const POST = route(openImportInput, openImport, { status: 201 });
