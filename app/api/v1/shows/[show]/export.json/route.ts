import { route } from '@/lib/endpoint';
import { exportRowsAs } from '@/lib/exports/export-rows';
import { exportRowsInput } from '@/lib/rules/inputs/export-rows';

export const GET = route(exportRowsInput, exportRowsAs('json'));
