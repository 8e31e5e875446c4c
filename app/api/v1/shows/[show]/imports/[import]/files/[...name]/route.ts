import { route } from '@/lib/endpoint';
import { putImportFile } from '@/lib/imports/put-import-file';
import { putImportFileInput } from '@/lib/rules/inputs/put-import-file';

export const PUT = route(putImportFileInput, putImportFile, { rawBody: true });
