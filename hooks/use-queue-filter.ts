'use client';

import { parseAsStringLiteral, useQueryState } from 'nuqs';
import { QUEUE_FILTERS } from '@/lib/rules/approval-queue';

/** What the queue is narrowed to; in the address, so that a link shows what its sender saw. */
export function useQueueFilter() {
  return useQueryState(
    'state',
    parseAsStringLiteral(QUEUE_FILTERS).withDefault('waiting').withOptions({ history: 'replace' }),
  );
}
