import { route } from '@/lib/endpoint';
import { listImportFileRows } from '@/lib/imports/list-import-file-rows';
import { listImportFilesInput } from '@/lib/rules/inputs/list-import-files';

export const GET = route(listImportFilesInput, listImportFileRows);
