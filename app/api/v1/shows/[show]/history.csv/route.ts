import { route } from '@/lib/endpoint';
import { exportEvents } from '@/lib/history/export-events';
import { exportEventsInput } from '@/lib/rules/inputs/list-events';

export const GET = route(exportEventsInput, exportEvents);
