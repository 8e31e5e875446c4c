import { route } from '@/lib/endpoint';
import { listOutdated } from '@/lib/locks/list-outdated';
import { showRefInput } from '@/lib/rules/inputs/show-ref';

export const GET = route(showRefInput, listOutdated);
