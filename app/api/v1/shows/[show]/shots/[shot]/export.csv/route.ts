import { route } from '@/lib/endpoint';
import { exportShotAs } from '@/lib/exports/export-shot';
import { exportShotInput } from '@/lib/rules/inputs/export-shot';

export const GET = route(exportShotInput, exportShotAs('csv'));
