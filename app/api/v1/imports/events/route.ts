import { route } from '@/lib/endpoint';
import { streamImports } from '@/lib/imports/stream-imports';
import { watchImportsInput } from '@/lib/rules/inputs/watch-imports';

export const GET = route(watchImportsInput, streamImports);
