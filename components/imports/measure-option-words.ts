import type { ImportAnswer } from '@/lib/rules/import-answer';
import { PARTITION_NAMES, SCHEME_NAMES } from '@/lib/rules/show-words';

/** How an import's files are measured, in words. */
export function measureWords({ scheme, parts_by, weld, turn_faces }: ImportAnswer): string[] {
  return [
    scheme === 'polyhedral' ? 'The cage as it is' : SCHEME_NAMES[scheme],
    parts_by === 'whole' ? 'Each file one part' : `Parts by ${PARTITION_NAMES[parts_by].toLowerCase()}`,
    ...(turn_faces ? ['Faces turned outwards'] : []),
    ...(weld ? ['Open borders welded'] : []),
  ];
}
