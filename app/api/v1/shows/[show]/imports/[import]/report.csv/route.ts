import { route } from '@/lib/endpoint';
import { reportImportAs } from '@/lib/imports/report-import';
import { reportImportInput } from '@/lib/rules/inputs/report-import';

export const GET = route(reportImportInput, reportImportAs('csv'));
